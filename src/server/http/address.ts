import { BlockList, isIP, isIPv6 } from 'node:net';
import { config } from '../config.ts';

/** `::ffff:192.0.2.1` is written as the IPv4 address that it is. */
function plain(address: string): string {
  const mapped = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i.exec(address);
  return mapped?.[1] ?? address;
}

/** A list of addresses and networks (`192.0.2.7`, `198.51.100.0/24`). */
export function addressList(entries: readonly string[]): BlockList {
  const list = new BlockList();
  for (const entry of entries) {
    const [network = '', bits] = entry.split('/');
    const family = isIPv6(network) ? 'ipv6' : 'ipv4';
    if (bits === undefined) list.addAddress(network, family);
    else list.addSubnet(network, Number(bits), family);
  }
  return list;
}

const contains = (list: BlockList, address: string) =>
  isIP(address) !== 0 && list.check(address, isIPv6(address) ? 'ipv6' : 'ipv4');

let trusted: BlockList | undefined;

function trustedProxies(): BlockList {
  trusted ??= addressList(config().trustedProxies);
  return trusted;
}

/**
 * The client's address: the socket's, unless a trusted proxy holds the socket; then the last address in X-Forwarded-For that
 * is not a trusted proxy's itself. Without trusted proxies the header is ignored.
 */
export function clientAddress(
  socketAddress: string | undefined,
  forwardedFor: string | undefined,
  proxies: BlockList = trustedProxies(),
): string {
  let address = plain(socketAddress ?? '');
  if (!contains(proxies, address)) return address;
  for (const hop of (forwardedFor ?? '').split(',').reverse()) {
    const next = plain(hop.trim());
    if (isIP(next) === 0) return address;
    address = next;
    if (!contains(proxies, address)) return address;
  }
  return address;
}

/**
 * Overwrites X-Forwarded-For with the client's true address and drops the other forwarded headers. The front handler calls it
 * first for every request, since Astro takes its `clientAddress` from that header whoever sent it.
 */
export function pinAddress(
  headers: Record<string, string | string[] | undefined>,
  socketAddress: string | undefined,
): string {
  const forwarded = headers['x-forwarded-for'];
  const address = clientAddress(socketAddress, Array.isArray(forwarded) ? forwarded.join(',') : forwarded);
  for (const name of ['forwarded', 'x-forwarded-host', 'x-forwarded-port', 'x-forwarded-proto'])
    delete headers[name];
  headers['x-forwarded-for'] = address;
  return address;
}

/** What limits count: an IPv4 address, or the /64 network of an IPv6 one, which a single customer holds. */
export function addressGroup(address: string): string {
  if (!isIPv6(address)) return address;
  const [head = '', tail = ''] = address.split('%')[0]!.split('::');
  const left = head === '' ? [] : head.split(':');
  const right = tail === '' ? [] : tail.split(':');
  const zeros = Array.from({ length: Math.max(0, 8 - left.length - right.length) }, () => '0');
  const groups = address.includes('::') ? [...left, ...zeros, ...right] : left;
  return `${groups
    .slice(0, 4)
    .map((group) => Number.parseInt(group, 16).toString(16))
    .join(':')}::/64`;
}
