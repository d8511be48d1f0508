import { createHmac } from 'node:crypto';

/** HMAC-SHA256 (RFC 2104, FIPS 180-4) in hex. */
export const hmacSha256 = (key: string | Buffer, message: string | Buffer): string =>
  createHmac('sha256', key).update(message).digest('hex');

/** What a receiver computes anew: the time in seconds, a full stop, the body as it came. */
export const signature = (key: string, timeS: number, body: string): string =>
  `sha256=${hmacSha256(key, `${timeS}.${body}`)}`;
