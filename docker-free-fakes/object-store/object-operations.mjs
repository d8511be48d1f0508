// @ts-check
import { once } from 'node:events';
import { pipeline } from 'node:stream/promises';
import { multipart } from './multipart.mjs';
import { S3Error } from './s3-error.mjs';
import { elements, textOf } from './xml.mjs';

/**
 * @typedef {import('./handle.mjs').Call} Call
 * @typedef {import('./stored-file.mjs').Description} Description
 */

/** Headers that are kept with an object and come back with it. */
const KEPT = [
  'cache-control',
  'content-disposition',
  'content-encoding',
  'content-language',
  'content-type',
  'expires',
];

/** What is asked of one object. @param {import('./store.mjs').Store} store */
export function objectOperations(store) {
  const uploads = multipart(store);

  /** @param {Call} call */
  const get = async (call) => {
    const { file, description } = await store.open(call.bucket, call.key);
    try {
      const unchanged = precondition(call, description);
      if (unchanged) return call.empty(304, { etag: description.etag });
      const range = rangeOf(call.header('range'), description.size);
      const { start, end } = range ?? { start: 0, end: description.size - 1 };
      const headers = {
        ...answerHeaders(call, description, range === null),
        'content-length': String(end - start + 1),
        ...(range ? { 'content-range': `bytes ${start}-${end}/${description.size}` } : {}),
      };
      call.response.writeHead(range ? 206 : 200, headers);
      if (call.method === 'HEAD' || end < start) {
        call.response.end();
        await once(call.response, 'close').catch(() => {});
      } else {
        await pipeline(file.createReadStream({ start, end, autoClose: false }), call.response);
      }
    } finally {
      await file.close();
    }
  };

  /** @param {Call} call */
  const put = async (call) => {
    const onlyIfNew = mustBeNew(call);
    const description = await store.put(call.bucket, call.key, call.content(), keptHeaders(call), {
      onlyIfNew,
    });
    call.empty(200, { etag: description.etag, ...checksumHeaders(description) });
  };

  /** @param {Call} call */
  const copy = async (call) => {
    const { file, description } = await openSource(call);
    try {
      const headers =
        call.header('x-amz-metadata-directive') === 'REPLACE' ? keptHeaders(call) : description.headers;
      const source = bytesOf(file, 0, description.size - 1);
      const made = await store.put(
        call.bucket,
        call.key,
        { source, through: [], checksum: () => description.checksum },
        headers,
        {
          onlyIfNew: mustBeNew(call),
        },
      );
      call.xml('CopyObjectResult', { ETag: made.etag, LastModified: made.modified });
    } finally {
      await file.close();
    }
  };

  /** @param {Call} call @param {string} uploadId @param {number} number */
  const copyPart = async (call, uploadId, number) => {
    const { file, description } = await openSource(call);
    try {
      const range = rangeOf(call.header('x-amz-copy-source-range'), description.size);
      const source = bytesOf(file, range?.start ?? 0, range?.end ?? description.size - 1);
      const made = await uploads.putPart(uploadId, call.bucket, call.key, number, {
        source,
        through: [],
        checksum: () => null,
      });
      call.xml('CopyPartResult', { ETag: made.etag, LastModified: made.modified });
    } finally {
      await file.close();
    }
  };

  /** @param {Call} call */
  const openSource = async (call) => {
    const source = decodeURIComponent(call.header('x-amz-copy-source'))
      .replace(/^\//, '')
      .replace(/\?versionId=.*$/, '');
    const at = source.indexOf('/');
    if (at < 1) throw new S3Error('InvalidArgument', 'x-amz-copy-source must be bucket/key.');
    return store.open(source.slice(0, at), source.slice(at + 1));
  };

  /** @param {Call} call @param {string} uploadId */
  const putPart = async (call, uploadId) => {
    const number = Number(call.query.get('partNumber'));
    if (call.header('x-amz-copy-source') !== '') return copyPart(call, uploadId, number);
    const description = await uploads.putPart(uploadId, call.bucket, call.key, number, call.content());
    call.empty(200, { etag: description.etag, ...checksumHeaders(description) });
  };

  /** @param {Call} call @param {string} uploadId */
  const complete = async (call, uploadId) => {
    const parts = elements(await call.text(), 'Part').map((part) => ({
      number: Number(textOf(part, 'PartNumber')),
      etag: textOf(part, 'ETag') ?? '',
    }));
    const made = await uploads.complete(uploadId, call.bucket, call.key, parts, {
      onlyIfNew: mustBeNew(call),
    });
    call.xml('CompleteMultipartUploadResult', {
      Location: `http://${call.header('host')}/${call.bucket}/${encodeURIComponent(call.key)}`,
      Bucket: call.bucket,
      Key: call.key,
      ETag: made.etag,
    });
  };

  /** @param {Call} call @param {string} uploadId */
  const listParts = async (call, uploadId) => {
    const parts = await uploads.listParts(uploadId, call.bucket, call.key);
    const after = Number(call.query.get('part-number-marker') ?? 0);
    const limit = Math.min(Number(call.query.get('max-parts') ?? 1000), 1000);
    const rest = parts.filter(({ number }) => number > after);
    const page = rest.slice(0, limit);
    call.xml('ListPartsResult', {
      Bucket: call.bucket,
      Key: call.key,
      UploadId: uploadId,
      PartNumberMarker: after,
      NextPartNumberMarker: page.at(-1)?.number ?? after,
      MaxParts: limit,
      IsTruncated: rest.length > page.length,
      Part: page.map(({ number, description }) => ({
        PartNumber: number,
        LastModified: description.modified,
        ETag: description.etag,
        Size: description.size,
      })),
    });
  };

  /** @param {Call} call */
  return async (call) => {
    const { method, bucket, key, query } = call;
    const uploadId = query.get('uploadId');
    if (UNKNOWN.some((name) => query.has(name)))
      throw new S3Error('NotImplemented', 'This store keeps nothing of that kind.');
    if (uploadId !== undefined) {
      if (method === 'PUT') return putPart(call, uploadId);
      if (method === 'POST') return complete(call, uploadId);
      if (method === 'GET') return listParts(call, uploadId);
      if (method === 'DELETE') {
        await uploads.abort(uploadId, bucket, key);
        return call.empty(204);
      }
    } else if (method === 'POST' && query.has('uploads')) {
      await call.text();
      const made = await uploads.create(bucket, key, keptHeaders(call));
      return call.xml('InitiateMultipartUploadResult', { Bucket: bucket, Key: key, UploadId: made });
    } else if (method === 'GET' || method === 'HEAD') {
      return get(call);
    } else if (method === 'PUT') {
      return call.header('x-amz-copy-source') === '' ? put(call) : copy(call);
    } else if (method === 'DELETE') {
      await store.remove(bucket, key);
      return call.empty(204);
    }
    throw new S3Error('MethodNotAllowed', 'This store does not do that to an object.');
  };
}

const UNKNOWN = [
  'acl',
  'attributes',
  'legal-hold',
  'restore',
  'retention',
  'select',
  'tagging',
  'torrent',
  'versionId',
];

/** @param {import('node:fs/promises').FileHandle} file @param {number} start @param {number} end inclusive */
async function* bytesOf(file, start, end) {
  if (end >= start) yield* file.createReadStream({ start, end, autoClose: false });
}

/** @param {Call} call */
function keptHeaders(call) {
  /** @type {Record<string, string>} */
  const kept = {};
  for (const [name, value] of Object.entries(call.request.headers)) {
    if (KEPT.includes(name) || name.startsWith('x-amz-meta-')) kept[name] = String(value);
  }
  // aws-chunked is how the body came, not what it is.
  const encodings = (kept['content-encoding'] ?? '').split(',').map((one) => one.trim());
  const real = encodings.filter((one) => one !== '' && one !== 'aws-chunked').join(',');
  if (real === '') delete kept['content-encoding'];
  else kept['content-encoding'] = real;
  kept['content-type'] ??= 'binary/octet-stream';
  return kept;
}

/** @param {Call} call */
function mustBeNew(call) {
  const condition = call.header('if-none-match');
  if (condition !== '' && condition !== '*')
    throw new S3Error('NotImplemented', 'If-None-Match on a write takes only *.');
  if (call.header('if-match') !== '')
    throw new S3Error('NotImplemented', 'This store does not write under If-Match.');
  return condition === '*';
}

/** Whether the caller has the object already. @param {Call} call @param {Description} description */
function precondition(call, description) {
  const names = (/** @type {string} */ header) =>
    header.split(',').map((one) => one.trim().replace(/^W\//, ''));
  const match = call.header('if-match');
  if (match !== '' && match !== '*' && !names(match).includes(description.etag)) {
    throw new S3Error('PreconditionFailed', 'The object is not the one named by If-Match.');
  }
  const noneMatch = call.header('if-none-match');
  return noneMatch !== '' && (noneMatch === '*' || names(noneMatch).includes(description.etag));
}

/**
 * One range, as RFC 9110 section 14.1.2 has it; what is not understood counts as no range.
 * @param {string} header @param {number} size
 * @returns {{ start: number, end: number } | null} null: everything
 */
export function rangeOf(header, size) {
  const match = /^bytes=(\d*)-(\d*)$/.exec(header);
  if (!match || (match[1] === '' && match[2] === '')) return null;
  const [, first = '', last = ''] = match;
  if (first !== '' && last !== '' && Number(last) < Number(first)) return null;
  const start = first === '' ? Math.max(0, size - Number(last)) : Number(first);
  const end = first === '' || last === '' ? size - 1 : Math.min(Number(last), size - 1);
  if (start >= size || (first === '' && Number(last) === 0)) {
    throw new S3Error('InvalidRange', 'The requested range is not satisfiable.');
  }
  return { start, end };
}

/** @param {Description} description @returns {Record<string, string>} */
function checksumHeaders({ checksum }) {
  return checksum ? { [`x-amz-checksum-${checksum.algorithm}`]: checksum.value } : {};
}

/** @param {Call} call @param {Description} description @param {boolean} whole */
function answerHeaders(call, description, whole) {
  /** @type {Record<string, string>} */
  const headers = {
    ...description.headers,
    etag: description.etag,
    'last-modified': new Date(description.modified).toUTCString(),
    'accept-ranges': 'bytes',
    ...(whole && call.header('x-amz-checksum-mode') === 'ENABLED' ? checksumHeaders(description) : {}),
  };
  for (const name of KEPT) {
    const changed = call.query.get(`response-${name}`);
    if (changed !== undefined) headers[name] = changed;
  }
  return headers;
}
