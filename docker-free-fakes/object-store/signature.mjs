// @ts-check
import { createHash, createHmac, timingSafeEqual } from 'node:crypto';
import { S3Error } from './s3-error.mjs';

/**
 * Signature version 4, in the Authorization header and in presigned addresses.
 * Source: Amazon S3 API reference, "Authenticating Requests (AWS Signature Version 4)".
 *
 * @typedef {{ accessKeyId: string, secretAccessKey: string, region: string }} Credentials
 * @typedef {{ method: string, path: string, query: [string, string][], headers: import('node:http').IncomingHttpHeaders }} Signed
 *   `path` and `query` decoded
 */

const ALGORITHM = 'AWS4-HMAC-SHA256';
const LARGEST_SKEW_MS = 15 * 60_000;
const LONGEST_PRESIGNED_S = 7 * 24 * 3600;

/**
 * @param {Signed} request
 * @param {Credentials} credentials
 * @param {Date} now
 */
export function checkSignature(request, credentials, now = new Date()) {
  const query = new Map(request.query);
  if (query.has('X-Amz-Signature')) checkPresigned(request, query, credentials, now);
  else checkHeader(request, credentials, now);
}

/** @param {Signed} request @param {Credentials} credentials @param {Date} now */
function checkHeader(request, credentials, now) {
  const header = request.headers.authorization;
  if (!header) throw new S3Error('AccessDenied', 'Access Denied: the request is not signed.');
  const match =
    /^AWS4-HMAC-SHA256 Credential=([^,]+), ?SignedHeaders=([^,]+), ?Signature=([0-9a-f]{64})$/.exec(header);
  if (!match)
    throw new S3Error(
      'AuthorizationHeaderMalformed',
      'The authorization header is not of signature version 4.',
    );
  const [, credential = '', signedHeaders = '', signature = ''] = match;
  const time = String(request.headers['x-amz-date'] ?? '');
  if (Math.abs(parseTime(time) - now.getTime()) > LARGEST_SKEW_MS) {
    throw new S3Error(
      'RequestTimeTooSkewed',
      'The difference between the request time and the current time is too large.',
    );
  }
  const names = signedHeaders.split(';');
  const payload = String(request.headers['x-amz-content-sha256'] ?? '');
  compare(signature, { request, credential, time, names, query: request.query, payload, credentials });
}

/** @param {Signed} request @param {Map<string, string>} query @param {Credentials} credentials @param {Date} now */
function checkPresigned(request, query, credentials, now) {
  const get = (/** @type {string} */ name) => query.get(name) ?? '';
  if (get('X-Amz-Algorithm') !== ALGORITHM) throw new S3Error('AccessDenied', 'Unknown signature algorithm.');
  const time = get('X-Amz-Date');
  const expiresS = Number(get('X-Amz-Expires'));
  if (!(expiresS > 0 && expiresS <= LONGEST_PRESIGNED_S))
    throw new S3Error('AccessDenied', 'X-Amz-Expires is out of range.');
  const signedAt = parseTime(time);
  if (now.getTime() > signedAt + expiresS * 1000) throw new S3Error('AccessDenied', 'Request has expired.');
  if (signedAt > now.getTime() + LARGEST_SKEW_MS)
    throw new S3Error('AccessDenied', 'Request is not yet valid.');
  compare(get('X-Amz-Signature'), {
    request,
    credential: get('X-Amz-Credential'),
    time,
    names: get('X-Amz-SignedHeaders').split(';'),
    query: request.query.filter(([name]) => name !== 'X-Amz-Signature'),
    payload: query.get('X-Amz-Content-Sha256') ?? 'UNSIGNED-PAYLOAD',
    credentials,
  });
}

/**
 * @param {string} given
 * @param {{ request: Signed, credential: string, time: string, names: string[], query: [string, string][],
 *   payload: string, credentials: Credentials }} parts
 */
function compare(given, { request, credential, time, names, query, payload, credentials }) {
  if (!names.includes('host')) throw new S3Error('AccessDenied', 'The host header must be signed.');
  // What the store acts upon must be what was signed.
  for (const name of Object.keys(request.headers)) {
    if (name.startsWith('x-amz-') && !names.includes(name)) {
      throw new S3Error(
        'AccessDenied',
        `There were headers present in the request which were not signed: ${name}`,
      );
    }
  }
  const [accessKeyId, date = '', region = '', service, end] = credential.split('/');
  if (accessKeyId !== credentials.accessKeyId) {
    throw new S3Error('InvalidAccessKeyId', 'The access key id does not exist here.');
  }
  if (!time.startsWith(date) || region !== credentials.region || service !== 's3' || end !== 'aws4_request') {
    throw new S3Error(
      'AuthorizationHeaderMalformed',
      `The credential's scope is wrong; expected region ${credentials.region}.`,
    );
  }
  const canonicalQuery = query
    .map(([name, value]) => [encode(name), encode(value)])
    .sort(([a = '', b = ''], [c = '', d = '']) => (a < c || (a === c && b < d) ? -1 : 1))
    .map((pair) => pair.join('='))
    .join('&');
  const canonicalHeaders = names.map((name) => `${name}:${headerText(request.headers[name])}\n`).join('');
  const path = request.path.split('/').map(encode).join('/');
  const canonical = [request.method, path, canonicalQuery, canonicalHeaders, names.join(';'), payload].join(
    '\n',
  );
  const scope = `${date}/${region}/s3/aws4_request`;
  const toSign = [ALGORITHM, time, scope, createHash('sha256').update(canonical).digest('hex')].join('\n');
  const key = [date, region, 's3', 'aws4_request'].reduce(
    (secret, part) => createHmac('sha256', secret).update(part).digest(),
    Buffer.from(`AWS4${credentials.secretAccessKey}`),
  );
  const expected = createHmac('sha256', key).update(toSign).digest();
  const actual = Buffer.from(given, 'hex');
  if (actual.length !== expected.length || !timingSafeEqual(actual, expected)) {
    throw new S3Error(
      'SignatureDoesNotMatch',
      'The request signature does not match; check the secret key and the method.',
    );
  }
}

/** @param {string | string[] | undefined} value */
function headerText(value) {
  return String(Array.isArray(value) ? value.join(',') : (value ?? ''))
    .trim()
    .replace(/ +/g, ' ');
}

/** Everything but A-Z a-z 0-9 - . _ ~ becomes %XX. @param {string} text */
export function encode(text) {
  return encodeURIComponent(text).replace(
    /[!'()*]/g,
    (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`,
  );
}

/** `20261201T101500Z`; anything else is NaN, so every comparison with it fails. @param {string} text */
function parseTime(text) {
  const match = /^(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z$/.exec(text);
  if (!match) throw new S3Error('AccessDenied', 'The request has no valid date.');
  const [, year, month, day, hour, minute, second] = match;
  return Date.parse(`${year}-${month}-${day}T${hour}:${minute}:${second}Z`);
}
