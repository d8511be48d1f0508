// @ts-check

import { multipart } from './multipart.mjs';
import { S3Error } from './s3-error.mjs';
import { encode } from './signature.mjs';
import { elements, textOf } from './xml.mjs';

/** @typedef {import('./handle.mjs').Call} Call */

const LONGEST_PAGE = 1000;

/** What is asked of the service or of a bucket. @param {import('./store.mjs').Store} store @param {string} region */
export function bucketOperations(store, region) {
  const uploads = multipart(store);

  /** @param {Call} call */
  const listBuckets = async (call) => {
    const buckets = await store.buckets();
    call.xml('ListAllMyBucketsResult', {
      Owner: { ID: 'owner', DisplayName: 'owner' },
      Buckets: { Bucket: buckets.map(({ name, created }) => ({ Name: name, CreationDate: created })) },
    });
  };

  /** @param {Call} call */
  const listUploads = async (call) => {
    const prefix = call.query.get('prefix') ?? '';
    const found = await uploads.listUploads(call.bucket, prefix);
    call.xml('ListMultipartUploadsResult', {
      Bucket: call.bucket,
      Prefix: prefix,
      MaxUploads: Math.max(found.length, LONGEST_PAGE),
      IsTruncated: false,
      Upload: found.map(({ key, uploadId, initiated }) => ({
        Key: key,
        UploadId: uploadId,
        Initiated: initiated,
      })),
    });
  };

  /** @param {Call} call */
  const list = async (call) => {
    const { query } = call;
    const second = query.get('list-type') === '2';
    const token = query.get('continuation-token');
    const prefix = query.get('prefix') ?? '';
    const delimiter = query.get('delimiter') ?? '';
    const asked = Number(query.get('max-keys') ?? LONGEST_PAGE);
    if (!Number.isInteger(asked) || asked < 0)
      throw new S3Error('InvalidArgument', 'max-keys must be a whole number.');
    const limit = Math.min(asked, LONGEST_PAGE);
    const after = second
      ? token
        ? Buffer.from(token, 'base64url').toString('utf8')
        : (query.get('start-after') ?? '')
      : (query.get('marker') ?? '');
    const page =
      limit === 0
        ? { contents: [], prefixes: [], next: null }
        : await store.list(call.bucket, { prefix, delimiter, after, limit });
    const text = query.get('encoding-type') === 'url' ? encode : (/** @type {string} */ plain) => plain;
    call.xml('ListBucketResult', {
      Name: call.bucket,
      Prefix: text(prefix),
      Delimiter: delimiter === '' ? null : text(delimiter),
      MaxKeys: limit,
      EncodingType: query.get('encoding-type') ?? null,
      IsTruncated: page.next !== null,
      ...(second
        ? {
            KeyCount: page.contents.length + page.prefixes.length,
            ContinuationToken: token ?? null,
            StartAfter: query.has('start-after') ? text(after) : null,
            NextContinuationToken: page.next === null ? null : Buffer.from(page.next).toString('base64url'),
          }
        : { Marker: text(after), NextMarker: page.next === null ? null : text(page.next) }),
      Contents: page.contents.map(({ key, description }) => ({
        Key: text(key),
        LastModified: description.modified,
        ETag: description.etag,
        Size: description.size,
        StorageClass: 'STANDARD',
      })),
      CommonPrefixes: page.prefixes.map((one) => ({ Prefix: text(one) })),
    });
  };

  /** @param {Call} call */
  const deleteMany = async (call) => {
    const xml = await call.text();
    const quiet = textOf(xml, 'Quiet') === 'true';
    const keys = elements(xml, 'Object').map((object) => textOf(object, 'Key'));
    if (keys.length === 0 || keys.length > LONGEST_PAGE || keys.includes(null)) {
      throw new S3Error('MalformedXML', 'Name between 1 and 1000 keys.');
    }
    for (const key of keys) await store.remove(call.bucket, key ?? '');
    call.xml('DeleteResult', { Deleted: quiet ? [] : keys.map((key) => ({ Key: key })) });
  };

  /** @param {Call} call */
  return async (call) => {
    const { method, bucket, query } = call;
    if (bucket === '') {
      if (method === 'GET') return listBuckets(call);
    } else if (method === 'PUT' && query.size === 0) {
      await call.text();
      await store.createBucket(bucket);
      return call.empty(200, { location: `/${bucket}` });
    } else if (method === 'HEAD') {
      await store.existing(bucket);
      return call.empty(200, { 'x-amz-bucket-region': region });
    } else if (method === 'DELETE' && query.size === 0) {
      await store.deleteBucket(bucket);
      return call.empty(204);
    } else if (method === 'POST' && query.has('delete')) {
      return deleteMany(call);
    } else if (method === 'GET' && query.has('location')) {
      await store.existing(bucket);
      return call.xml('LocationConstraint', {});
    } else if (method === 'GET' && query.has('uploads')) {
      return listUploads(call);
    } else if (method === 'GET' && !UNKNOWN.some((name) => query.has(name))) {
      return list(call);
    }
    throw new S3Error('NotImplemented', 'This store does not do that to a bucket.');
  };
}

/** Questions about a bucket that must not be answered with its list of keys. */
const UNKNOWN = [
  'acl',
  'cors',
  'lifecycle',
  'logging',
  'notification',
  'policy',
  'replication',
  'tagging',
  'versioning',
  'versions',
];
