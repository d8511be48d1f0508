import { type Config, config } from '../config.ts';
import { ApiError } from '../errors.ts';

type OriginConfig = Pick<Config, 'origin' | 'host' | 'port'>;

const LOOPBACK = ['localhost', '127.0.0.1', '[::1]'];
const isLoopback = (host: string) => host === '::1' || LOOPBACK.includes(host);

const withPort = (host: string, port: string | number, scheme: string) =>
  String(port) === (scheme === 'https:' ? '443' : '80') ? [host, `${host}:${port}`] : [`${host}:${port}`];

/**
 * The origin that a request with this Host header came to, or null when the server does not answer for it: the public
 * origin's host, or, when we listen on loopback, a loopback name with our port.
 */
export function originOfHost(
  hostHeader: string | undefined,
  settings: OriginConfig = config(),
): string | null {
  const host = hostHeader?.toLowerCase();
  if (host === undefined || host === '') return null;
  const origin = new URL(settings.origin);
  const originPort = origin.port || (origin.protocol === 'https:' ? '443' : '80');
  if (withPort(origin.hostname, originPort, origin.protocol).includes(host)) return settings.origin;
  if (!isLoopback(settings.host)) return null;
  const allowed = LOOPBACK.flatMap((name) => withPort(name, settings.port, 'http:'));
  return allowed.includes(host) ? `http://${host}` : null;
}

/** 421 for a host that is not ours; otherwise the origin that this request may come from. */
export function checkHost(hostHeader: string | undefined, settings: OriginConfig = config()): string {
  const origin = originOfHost(hostHeader, settings);
  if (origin === null) throw new ApiError('wrong_host');
  return origin;
}

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

interface OriginCheck {
  readonly method: string;
  readonly header: (name: string) => string | undefined;
  /** What checkHost gave. */
  readonly ownOrigin: string;
  /** The name of the session cookie, to tell whether the request carries one. */
  readonly cookieName: string;
}

/**
 * Refuses what another site makes a browser send. A bearer token is never sent by a browser on its own, so it passes.
 * By cookie, `Origin` equals our own; a missing or `null` one passes only with `Sec-Fetch-Site: same-origin`. Without a
 * cookie (signing in, answering a link) the same holds whenever a browser speaks, and a browser always sends one of the two.
 */
export function checkOrigin({ method, header, ownOrigin, cookieName }: OriginCheck): void {
  if (SAFE.has(method.toUpperCase()) || header('authorization') !== undefined) return;
  const origin = header('origin');
  const site = header('sec-fetch-site');
  if (origin !== undefined && origin !== 'null') {
    if (origin === ownOrigin) return;
    throw new ApiError('wrong_origin');
  }
  if (site === 'same-origin') return;
  const hasCookie = (header('cookie') ?? '')
    .split(';')
    .some((part) => part.trim().startsWith(`${cookieName}=`));
  if (hasCookie || origin === 'null' || site !== undefined) throw new ApiError('wrong_origin');
}
