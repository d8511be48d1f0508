// @ts-check
import { createHash } from 'node:crypto';
import { Transform } from 'node:stream';
import { crc32 } from 'node:zlib';
import { crc32c } from './crc32c.mjs';
import { S3Error } from './s3-error.mjs';

/**
 * The bytes of a request as they are to be stored, checked on the way against every sum the client gave: in a header, in
 * a trailer after an aws-chunked body, or in the signature.
 *
 * @typedef {{ algorithm: string, value: string }} Checksum base64, as in the headers
 * @typedef {{ update: (data: Buffer) => void, base64: () => string }} Sum
 */

const CHUNKED = 'STREAMING-UNSIGNED-PAYLOAD-TRAILER';
const PREFIX = 'x-amz-checksum-';
const LONGEST_LINE = 4096;

/** @type {Record<string, () => Sum>} */
const SUMS = {
  crc32: () => running(crc32),
  crc32c: () => running(crc32c),
  sha1: () => hashing('sha1'),
  sha256: () => hashing('sha256'),
};

/** @param {(data: Buffer, before: number) => number} next @returns {Sum} */
function running(next) {
  let value = 0;
  return {
    update: (data) => {
      value = next(data, value);
    },
    base64: () => {
      const bytes = Buffer.alloc(4);
      bytes.writeUInt32BE(value);
      return bytes.toString('base64');
    },
  };
}

/** @param {string} algorithm @returns {Sum} */
function hashing(algorithm) {
  const hash = createHash(algorithm);
  return { update: (data) => void hash.update(data), base64: () => hash.digest('base64') };
}

/**
 * @param {import('node:http').IncomingHttpHeaders} headers
 * @returns {{ streams: Transform[], checksum: () => Checksum | null }} the streams to pass the body through, in order;
 *   the last one gives the content, and fails when it is not what the client announced
 */
export function bodyStreams(headers) {
  const payload = String(headers['x-amz-content-sha256'] ?? 'UNSIGNED-PAYLOAD');
  if (payload.startsWith('STREAMING-') && payload !== CHUNKED) {
    throw new S3Error('NotImplemented', `This store does not take bodies signed as ${payload}.`);
  }
  const chunked = payload === CHUNKED;
  /** @type {Map<string, string>} */
  const trailers = new Map();
  const wanted = announced(headers);
  const sums = wanted.map((name) => ({ name, sum: makeSum(name) }));
  const md5 = headers['content-md5'] === undefined ? null : createHash('md5');
  const sha256 = /^[0-9a-f]{64}$/.test(payload) ? createHash('sha256') : null;
  const announcedLength =
    headers['x-amz-decoded-content-length'] ?? (chunked ? undefined : headers['content-length']);
  let length = 0;
  /** @type {Checksum | null} */
  let kept = null;

  const check = () => {
    if (announcedLength !== undefined && length !== Number(announcedLength)) {
      throw new S3Error('IncompleteBody', 'The body is shorter or longer than its announced length.');
    }
    if (md5 && md5.digest('base64') !== headers['content-md5'])
      throw new S3Error('BadDigest', 'Content-MD5 does not match.');
    if (sha256 && sha256.digest('hex') !== payload) {
      throw new S3Error('XAmzContentSHA256Mismatch', 'x-amz-content-sha256 does not match the body.');
    }
    for (const { name, sum } of sums) {
      const value = String(headers[PREFIX + name] ?? trailers.get(PREFIX + name) ?? '');
      if (value !== sum.base64())
        throw new S3Error('BadDigest', `The ${name.toUpperCase()} you specified does not match.`);
      kept = { algorithm: name, value };
    }
  };

  const checking = new Transform({
    transform(data, _encoding, done) {
      length += data.length;
      md5?.update(data);
      sha256?.update(data);
      for (const { sum } of sums) sum.update(data);
      done(null, data);
    },
    flush(done) {
      try {
        check();
        done();
      } catch (error) {
        done(/** @type {Error} */ (error));
      }
    },
  });
  return { streams: chunked ? [unchunk(trailers), checking] : [checking], checksum: () => kept };
}

/** @param {import('node:http').IncomingHttpHeaders} headers @returns {string[]} */
function announced(headers) {
  const inHeaders = Object.keys(headers)
    .filter(
      (name) => name.startsWith(PREFIX) && !['algorithm', 'mode', 'type'].includes(name.slice(PREFIX.length)),
    )
    .map((name) => name.slice(PREFIX.length));
  const inTrailer = String(headers['x-amz-trailer'] ?? '')
    .split(',')
    .map((name) => name.trim().toLowerCase())
    .filter((name) => name.startsWith(PREFIX))
    .map((name) => name.slice(PREFIX.length));
  return [...inHeaders, ...inTrailer];
}

/** @param {string} name @returns {Sum} */
function makeSum(name) {
  const make = SUMS[name];
  if (!make) throw new S3Error('NotImplemented', `This store does not know the checksum ${name}.`);
  return make();
}

/**
 * Takes the aws-chunked framing off: `<hex length>\r\n<data>\r\n` … `0\r\n<trailers>\r\n\r\n`.
 * @param {Map<string, string>} trailers filled when they arrive
 */
function unchunk(trailers) {
  /** @type {'size' | 'data' | 'data end' | 'trailer' | 'over'} */
  let state = 'size';
  let left = 0;
  let line = '';

  /** One line, once it is whole. @param {string} text */
  const onLine = (text) => {
    if (state === 'size') {
      const size = text.split(';')[0] ?? '';
      if (!/^[0-9a-f]{1,8}$/i.test(size)) throw new S3Error('IncompleteBody', 'A chunk has no valid length.');
      left = Number.parseInt(size, 16);
      state = left === 0 ? 'trailer' : 'data';
    } else if (state === 'data end') {
      if (text !== '') throw new S3Error('IncompleteBody', 'A chunk is longer than its length.');
      state = 'size';
    } else if (state === 'trailer') {
      if (text === '') {
        state = 'over';
        return;
      }
      const colon = text.indexOf(':');
      if (colon > 0) trailers.set(text.slice(0, colon).trim().toLowerCase(), text.slice(colon + 1).trim());
    }
  };

  return new Transform({
    transform(data, _encoding, done) {
      try {
        let at = 0;
        while (at < data.length && state !== 'over') {
          if (state === 'data') {
            const piece = data.subarray(at, at + left);
            this.push(piece);
            at += piece.length;
            left -= piece.length;
            if (left === 0) state = 'data end';
            continue;
          }
          const end = data.indexOf(10, at);
          line += data.toString('latin1', at, end < 0 ? data.length : end);
          if (line.length > LONGEST_LINE)
            throw new S3Error('IncompleteBody', 'A line between chunks is too long.');
          if (end < 0) break;
          at = end + 1;
          const whole = line.replace(/\r$/, '');
          line = '';
          onLine(whole);
        }
        done();
      } catch (error) {
        done(/** @type {Error} */ (error));
      }
    },
    flush(done) {
      // The last empty line is left out by some clients; the end of the data is not.
      const whole = state === 'over' || state === 'trailer';
      done(whole ? null : new S3Error('IncompleteBody', 'The body ended inside a chunk.'));
    },
  });
}
