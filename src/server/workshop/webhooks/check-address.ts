import { isIP } from 'node:net';
import { config } from '../../config.ts';
import { AddressRefused } from './checked-lookup.ts';
import { isPublicAddress } from './public-address.ts';

const bareHost = (url: URL) => url.hostname.replace(/^\[|\]$/g, '');

/** `host:port` exceptions of GAPMARK_WEBHOOK_ALLOW, which is for tests and refused in production. */
export function isExcepted(url: URL, allowed: readonly string[] = config().webhookAllow): boolean {
  const port = url.port || (url.protocol === 'https:' ? '443' : '80');
  return allowed.includes(`${url.hostname}:${port}`);
}

/**
 * Reads a webhook's address and refuses what can be refused by its text: other schemes, a name and password in it, an address
 * that points inward. Names are looked at when the socket connects.
 * @throws AddressRefused with a sentence.
 */
export function checkAddress(address: string, allowed?: readonly string[]): URL {
  const url = URL.canParse(address) ? new URL(address) : null;
  if (url === null || !['http:', 'https:'].includes(url.protocol))
    throw new AddressRefused('It is no address that begins with http:// or https://.');
  if (url.username !== '' || url.password !== '')
    throw new AddressRefused('It has a name and password in it; events are signed instead.');
  if (isExcepted(url, allowed)) return url;
  const host = bareHost(url);
  const isLocalName = host === 'localhost' || /\.(localhost|local|internal)\.?$/.test(host);
  if (isLocalName || (isIP(host) !== 0 && !isPublicAddress(host)))
    throw new AddressRefused('It points inward, to this machine or its network. That is refused.');
  return url;
}
