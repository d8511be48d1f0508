import { fork } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { request } from 'node:http';
import { createConnection } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CopyObjectCommand,
  CreateBucketCommand,
  CreateMultipartUploadCommand,
  DeleteObjectCommand,
  DeleteObjectsCommand,
  GetObjectCommand,
  HeadBucketCommand,
  HeadObjectCommand,
  ListMultipartUploadsCommand,
  ListObjectsV2Command,
  ListPartsCommand,
  PutObjectCommand,
  S3Client,
  UploadPartCommand,
} from '@aws-sdk/client-s3';
import { Upload } from '@aws-sdk/lib-storage';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import { Client as MinioClient } from 'minio';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';

/**
 * The yardstick is not ours: two published S3 clients, which sign, frame, sum and parse by themselves, and which also
 * refuse what does not follow Amazon's S3 API reference.
 */

process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED = 'true';

const credentials = { accessKeyId: 'test-key', secretAccessKey: 'test-secret' };
const MiB = 1024 * 1024;
const bucket = 'captures';
const folder = mkdtempSync(join(tmpdir(), 'object-store-'));

interface Server {
  readonly port: number;
  readonly pid: number;
  stop(signal?: NodeJS.Signals): Promise<void>;
}

/** The store as the start script runs it: a process of its own, here killable. */
async function startServer(port = 0): Promise<Server> {
  const child = fork(fileURLToPath(new URL('./object-store.mjs', import.meta.url)), {
    env: {
      PATH: process.env.PATH,
      STORE_FOLDER: folder,
      STORE_ACCESS_KEY_ID: credentials.accessKeyId,
      STORE_SECRET_ACCESS_KEY: credentials.secretAccessKey,
      STORE_DURABLE: 'no',
      SERVICE_PORTS: JSON.stringify({ store: port }),
    },
    execArgv: [],
  });
  const given = await new Promise<number>((resolve, reject) => {
    child.once('message', (message) => resolve((message as { ports: { store: number } }).ports.store));
    child.once('exit', (code) => reject(new Error(`the store ended with ${code}`)));
  });
  return {
    port: given,
    pid: child.pid!,
    stop: (signal = 'SIGTERM') =>
      new Promise((resolve) => {
        child.once('exit', () => resolve());
        child.kill(signal);
      }),
  };
}

let server: Server;

function client(mode: 'WHEN_REQUIRED' | 'WHEN_SUPPORTED', secretAccessKey = credentials.secretAccessKey) {
  return new S3Client({
    endpoint: `http://127.0.0.1:${server.port}`,
    region: 'us-east-1',
    credentials: { ...credentials, secretAccessKey },
    forcePathStyle: true,
    requestChecksumCalculation: mode,
    responseChecksumValidation: mode,
    maxAttempts: 1,
  });
}

beforeAll(async () => {
  server = await startServer();
  await client('WHEN_REQUIRED').send(new CreateBucketCommand({ Bucket: bucket }));
});

afterAll(async () => {
  await server.stop();
  rmSync(folder, { recursive: true, force: true });
});

async function text(s3: S3Client, Key: string): Promise<string> {
  const { Body } = await s3.send(new GetObjectCommand({ Bucket: bucket, Key }));
  return Body!.transformToString();
}

/** `size` bytes that differ everywhere, never all in memory. */
function* pseudoRandom(size: number, piece = 64 * 1024): Generator<Buffer> {
  for (let made = 0, i = 0; made < size; made += piece, i++) {
    const block = createHash('sha256').update(String(i)).digest();
    yield Buffer.alloc(Math.min(piece, size - made), block);
  }
}

describe.each(['WHEN_REQUIRED', 'WHEN_SUPPORTED'] as const)('AWS SDK with checksums %s', (mode) => {
  const name = (key: string) => `${mode}/${key}`;
  let s3: S3Client;
  beforeAll(() => {
    s3 = client(mode);
  });

  test('creates a bucket once and heads it', async () => {
    const Bucket = mode === 'WHEN_REQUIRED' ? 'first' : 'second';
    await s3.send(new CreateBucketCommand({ Bucket }));
    await s3.send(new HeadBucketCommand({ Bucket }));
    await expect(s3.send(new CreateBucketCommand({ Bucket }))).rejects.toThrow(/already/);
    await expect(s3.send(new HeadBucketCommand({ Bucket: 'missing' }))).rejects.toMatchObject({
      name: 'NotFound',
    });
  });

  test('puts a buffer and gives back type, metadata, length and MD5 as ETag', async () => {
    const Body = randomBytes(100_000);
    const put = await s3.send(
      new PutObjectCommand({
        Bucket: bucket,
        Key: name('buffer'),
        Body,
        ContentType: 'text/csv',
        Metadata: { engine: 'crank', note: 'two words' },
      }),
    );
    const md5 = createHash('md5').update(Body).digest('hex');
    expect(put.ETag).toBe(`"${md5}"`);
    const got = await s3.send(new GetObjectCommand({ Bucket: bucket, Key: name('buffer') }));
    expect(got).toMatchObject({
      ContentType: 'text/csv',
      ContentLength: 100_000,
      ETag: `"${md5}"`,
      Metadata: { engine: 'crank', note: 'two words' },
    });
    expect(Buffer.from(await got.Body!.transformToByteArray()).equals(Body)).toBe(true);
  });

  test('puts a stream (chunks with trailers where the SDK sends them)', async () => {
    const size = 3 * MiB + 17;
    const Body = Readable.from(pseudoRandom(size));
    await s3.send(new PutObjectCommand({ Bucket: bucket, Key: name('stream'), Body, ContentLength: size }));
    const got = await s3.send(new GetObjectCommand({ Bucket: bucket, Key: name('stream') }));
    expect(got.ContentEncoding).toBeUndefined();
    const bytes = Buffer.from(await got.Body!.transformToByteArray());
    expect(bytes.equals(Buffer.concat([...pseudoRandom(size)]))).toBe(true);
  });

  test('keeps an empty object', async () => {
    await s3.send(new PutObjectCommand({ Bucket: bucket, Key: name('empty'), Body: '' }));
    const head = await s3.send(new HeadObjectCommand({ Bucket: bucket, Key: name('empty') }));
    expect(head.ContentLength).toBe(0);
    expect(await text(s3, name('empty'))).toBe('');
  });

  test.each([
    'with space.csv',
    'Zündspule/größe ü.csv',
    'a//b',
    '../up',
    'plus+percent%20&=?#',
    'long/'.repeat(3) + 'n'.repeat(700),
  ])('takes the name %s', async (key) => {
    await s3.send(new PutObjectCommand({ Bucket: bucket, Key: name(key), Body: key }));
    expect(await text(s3, name(key))).toBe(key);
    const { Contents } = await s3.send(new ListObjectsV2Command({ Bucket: bucket, Prefix: name(key) }));
    expect(Contents?.map((object) => object.Key)).toEqual([name(key)]);
  });

  test('answers ranges from a start, of a middle and of the end, and 416 beyond it', async () => {
    const Key = name('range');
    await s3.send(new PutObjectCommand({ Bucket: bucket, Key, Body: '0123456789' }));
    const get = (Range: string) => s3.send(new GetObjectCommand({ Bucket: bucket, Key, Range }));
    const from = await get('bytes=7-');
    expect([from.ContentRange, await from.Body!.transformToString()]).toEqual(['bytes 7-9/10', '789']);
    const middle = await get('bytes=2-3');
    expect([middle.ContentRange, await middle.Body!.transformToString()]).toEqual(['bytes 2-3/10', '23']);
    const end = await get('bytes=-4');
    expect([end.ContentRange, await end.Body!.transformToString()]).toEqual(['bytes 6-9/10', '6789']);
    await expect(get('bytes=10-')).rejects.toMatchObject({
      name: 'InvalidRange',
      $metadata: { httpStatusCode: 416 },
    });
  });

  test('says NoSuchKey, NotFound and NoSuchBucket', async () => {
    const missing = { Bucket: bucket, Key: name('missing') };
    await expect(s3.send(new GetObjectCommand(missing))).rejects.toMatchObject({ name: 'NoSuchKey' });
    await expect(s3.send(new HeadObjectCommand(missing))).rejects.toMatchObject({ name: 'NotFound' });
    const elsewhere = { Bucket: 'missing', Key: 'x' };
    await expect(s3.send(new GetObjectCommand(elsewhere))).rejects.toMatchObject({ name: 'NoSuchBucket' });
    await expect(s3.send(new PutObjectCommand({ ...elsewhere, Body: 'x' }))).rejects.toMatchObject({
      name: 'NoSuchBucket',
    });
  });

  test('presigned get works with a range and a changed disposition, and not when altered or expired', async () => {
    const Key = name('präsigniert.csv');
    await s3.send(new PutObjectCommand({ Bucket: bucket, Key, Body: '0123456789' }));
    const command = new GetObjectCommand({
      Bucket: bucket,
      Key,
      ResponseContentDisposition: 'attachment; filename="x.csv"',
    });
    const url = await getSignedUrl(s3, command, { expiresIn: 60 });
    const answer = await fetch(url, { headers: { range: 'bytes=3-5' } });
    expect([answer.status, await answer.text()]).toEqual([206, '345']);
    expect(answer.headers.get('content-disposition')).toBe('attachment; filename="x.csv"');
    expect((await fetch(url.replace('attachment', 'inline'))).status).toBe(403);
    expect((await fetch(url, { method: 'DELETE' })).status).toBe(403);
    const longAgo = new Date(Date.now() - 3_600_000);
    const old = await getSignedUrl(s3, command, { expiresIn: 60, signingDate: longAgo });
    expect((await fetch(old)).status).toBe(403);
  });

  test('presigned put stores what is sent', async () => {
    const Key = name('presigned put');
    // In the other mode the SDK signs the empty body's sum into the address, so nothing else can be put with it.
    const url = await getSignedUrl(client('WHEN_REQUIRED'), new PutObjectCommand({ Bucket: bucket, Key }), {
      expiresIn: 60,
    });
    expect((await fetch(url, { method: 'PUT', body: 'sent by address' })).status).toBe(200);
    expect(await text(s3, Key)).toBe('sent by address');
  });

  test('refuses a wrong secret, an unknown key and an anonymous request with 403', async () => {
    await s3.send(new PutObjectCommand({ Bucket: bucket, Key: name('private'), Body: 'x' }));
    await expect(text(client(mode, 'wrong'), name('private'))).rejects.toMatchObject({
      name: 'SignatureDoesNotMatch',
    });
    const stranger = new S3Client({
      endpoint: `http://127.0.0.1:${server.port}`,
      region: 'us-east-1',
      forcePathStyle: true,
      credentials: { accessKeyId: 'stranger', secretAccessKey: 'x' },
    });
    await expect(text(stranger, name('private'))).rejects.toMatchObject({ name: 'InvalidAccessKeyId' });
    const anonymous = await fetch(`http://127.0.0.1:${server.port}/${bucket}/${name('private')}`);
    expect(anonymous.status).toBe(403);
    expect(await anonymous.text()).toContain('<Code>AccessDenied</Code>');
  });

  test('copies an object with its metadata, or with new ones', async () => {
    const Key = name('copy source ü');
    await s3.send(
      new PutObjectCommand({
        Bucket: bucket,
        Key,
        Body: 'copied',
        ContentType: 'text/x',
        Metadata: { a: '1' },
      }),
    );
    const CopySource = encodeURI(`${bucket}/${Key}`);
    await s3.send(new CopyObjectCommand({ Bucket: bucket, Key: name('copy'), CopySource }));
    const same = await s3.send(new HeadObjectCommand({ Bucket: bucket, Key: name('copy') }));
    expect(same).toMatchObject({ ContentType: 'text/x', Metadata: { a: '1' }, ContentLength: 6 });
    await s3.send(
      new CopyObjectCommand({
        Bucket: bucket,
        Key: name('copy'),
        CopySource,
        MetadataDirective: 'REPLACE',
        Metadata: { b: '2' },
      }),
    );
    const other = await s3.send(new HeadObjectCommand({ Bucket: bucket, Key: name('copy') }));
    expect(other.Metadata).toEqual({ b: '2' });
    expect(await text(s3, name('copy'))).toBe('copied');
  });

  test('lists by prefix, delimiter and pages, in the order of the bytes', async () => {
    const keys = [
      'list/a',
      'list/a/1',
      'list/a/2',
      'list/a!',
      'list/b/1',
      'list/b/2',
      'list/c',
      'list/ü',
      'listed',
    ].map(name);
    for (const Key of keys) await s3.send(new PutObjectCommand({ Bucket: bucket, Key, Body: 'x' }));
    const inOrder = [...keys].sort((a, b) => Buffer.compare(Buffer.from(a), Buffer.from(b)));
    const all = await s3.send(new ListObjectsV2Command({ Bucket: bucket, Prefix: name('list') }));
    expect(all.Contents?.map((object) => object.Key)).toEqual(inOrder);
    expect(all.Contents?.[0]).toMatchObject({
      Size: 1,
      ETag: `"${createHash('md5').update('x').digest('hex')}"`,
    });

    const pages: string[][] = [];
    let ContinuationToken: string | undefined;
    do {
      const page = await s3.send(
        new ListObjectsV2Command({
          Bucket: bucket,
          Prefix: name('list/'),
          Delimiter: '/',
          MaxKeys: 2,
          ContinuationToken,
        }),
      );
      pages.push([
        ...(page.Contents ?? []).map((o) => o.Key!),
        ...(page.CommonPrefixes ?? []).map((p) => p.Prefix!),
      ]);
      expect(page.IsTruncated).toBe(page.NextContinuationToken !== undefined);
      ContinuationToken = page.NextContinuationToken;
    } while (ContinuationToken);
    expect(pages.map((page) => page.map((key) => key.slice(mode.length + 6)))).toEqual([
      ['a', 'a!'],
      ['a/', 'b/'],
      ['c', 'ü'],
    ]);

    const after = await s3.send(
      new ListObjectsV2Command({ Bucket: bucket, Prefix: name('list'), StartAfter: name('list/b/1') }),
    );
    expect(after.Contents?.map((object) => object.Key)).toEqual(
      inOrder.slice(inOrder.indexOf(name('list/b/1')) + 1),
    );
  });

  test('deletes one, many and what is missing', async () => {
    for (const key of ['gone/1', 'gone/2', 'gone/3 ü & <']) {
      await s3.send(new PutObjectCommand({ Bucket: bucket, Key: name(key), Body: 'x' }));
    }
    await s3.send(new DeleteObjectCommand({ Bucket: bucket, Key: name('gone/1') }));
    await s3.send(new DeleteObjectCommand({ Bucket: bucket, Key: name('never there') }));
    const Objects = ['gone/2', 'gone/3 ü & <', 'gone/4'].map((key) => ({ Key: name(key) }));
    const { Deleted, Errors } = await s3.send(
      new DeleteObjectsCommand({ Bucket: bucket, Delete: { Objects } }),
    );
    expect(Deleted?.map((one) => one.Key)).toEqual(Objects.map((one) => one.Key));
    expect(Errors ?? []).toEqual([]);
    const { KeyCount } = await s3.send(new ListObjectsV2Command({ Bucket: bucket, Prefix: name('gone/') }));
    expect(KeyCount).toBe(0);
  });

  test('If-None-Match * lets exactly one of many writers through', async () => {
    const Key = name('only once');
    const writes = await Promise.allSettled(
      Array.from({ length: 8 }, (_, i) =>
        s3.send(new PutObjectCommand({ Bucket: bucket, Key, Body: `writer ${i}`, IfNoneMatch: '*' })),
      ),
    );
    const through = writes.flatMap((write, i) => (write.status === 'fulfilled' ? [i] : []));
    expect(through).toHaveLength(1);
    expect(await text(s3, Key)).toBe(`writer ${through[0]}`);
    await expect(
      s3.send(new PutObjectCommand({ Bucket: bucket, Key, Body: 'late', IfNoneMatch: '*' })),
    ).rejects.toMatchObject({ name: 'PreconditionFailed', $metadata: { httpStatusCode: 412 } });
  });

  test('multipart: lists parts and uploads, refuses small, wrong and unordered parts, aborts', async () => {
    const Key = name('parts ü');
    const { UploadId } = await s3.send(
      new CreateMultipartUploadCommand({ Bucket: bucket, Key, ContentType: 'text/csv' }),
    );
    const part = async (PartNumber: number, Body: Buffer) => {
      const { ETag } = await s3.send(
        new UploadPartCommand({ Bucket: bucket, Key, UploadId, PartNumber, Body }),
      );
      return { PartNumber, ETag };
    };
    const complete = (Parts: { PartNumber: number; ETag: string | undefined }[]) =>
      s3.send(
        new CompleteMultipartUploadCommand({ Bucket: bucket, Key, UploadId, MultipartUpload: { Parts } }),
      );
    const small = await part(1, Buffer.from('too small'));
    const last = await part(2, Buffer.from('last'));
    await expect(complete([small, last])).rejects.toMatchObject({ name: 'EntityTooSmall' });
    const big = await part(1, Buffer.alloc(5 * MiB, 'a'));
    await expect(complete([small, last])).rejects.toMatchObject({ name: 'InvalidPart' });
    await expect(complete([last, big])).rejects.toMatchObject({ name: 'InvalidPartOrder' });
    const { Parts } = await s3.send(new ListPartsCommand({ Bucket: bucket, Key, UploadId }));
    expect(Parts?.map(({ PartNumber, Size }) => [PartNumber, Size])).toEqual([
      [1, 5 * MiB],
      [2, 4],
    ]);
    const { Uploads } = await s3.send(new ListMultipartUploadsCommand({ Bucket: bucket, Prefix: Key }));
    expect(Uploads?.map((upload) => [upload.Key, upload.UploadId])).toEqual([[Key, UploadId]]);
    await expect(text(s3, Key)).rejects.toMatchObject({ name: 'NoSuchKey' });

    const { ETag } = await complete([big, last]);
    expect(ETag).toMatch(/^"[0-9a-f]{32}-2"$/);
    const head = await s3.send(new HeadObjectCommand({ Bucket: bucket, Key }));
    expect(head).toMatchObject({ ContentLength: 5 * MiB + 4, ContentType: 'text/csv' });
    await expect(complete([big, last])).rejects.toMatchObject({ name: 'NoSuchUpload' });

    const again = await s3.send(new CreateMultipartUploadCommand({ Bucket: bucket, Key: name('aborted') }));
    const aborted = { Bucket: bucket, Key: name('aborted'), UploadId: again.UploadId };
    await s3.send(new UploadPartCommand({ ...aborted, PartNumber: 1, Body: 'x' }));
    await s3.send(new AbortMultipartUploadCommand(aborted));
    await expect(s3.send(new ListPartsCommand(aborted))).rejects.toMatchObject({ name: 'NoSuchUpload' });
  });
});

test('refuses a body that does not match its checksum, and keeps nothing of it', async () => {
  const Key = 'damaged on the way';
  for (const sum of [
    { ChecksumCRC32: 'AAAAAA==' },
    { ContentMD5: 'AAAAAAAAAAAAAAAAAAAAAA==' },
    { ChecksumCRC32C: 'AAAAAA==' },
  ]) {
    const put = client('WHEN_REQUIRED').send(
      new PutObjectCommand({ Bucket: bucket, Key, Body: 'content', ...sum }),
    );
    await expect(put).rejects.toMatchObject({ name: 'BadDigest' });
  }
  // RFC 9260's polynomial; the value for "123456789" is the check value of CRC-32/ISCSI in the CRC catalogue (0xE3069283).
  await client('WHEN_REQUIRED').send(
    new PutObjectCommand({ Bucket: bucket, Key, Body: '123456789', ChecksumCRC32C: '4waSgw==' }),
  );
  expect(await text(client('WHEN_REQUIRED'), Key)).toBe('123456789');
});

test('200 MB through lib-storage come back whole while the store stays under 100 MB of memory', async () => {
  const size = 200 * 1000 * 1000;
  const s3 = client('WHEN_REQUIRED');
  let peakKiB = 0;
  const watch = setInterval(async () => {
    const status = await readFile(`/proc/${server.pid}/status`, 'utf8').catch(() => '');
    peakKiB = Math.max(peakKiB, Number(/VmRSS:\s+(\d+)/.exec(status)?.[1] ?? 0));
  }, 20);
  const before = createHash('sha256');
  const source = (function* () {
    for (const piece of pseudoRandom(size, MiB)) {
      before.update(piece);
      yield piece;
    }
  })();
  await new Upload({
    client: s3,
    params: { Bucket: bucket, Key: 'large', Body: Readable.from(source) },
  }).done();
  const { Body } = await s3.send(new GetObjectCommand({ Bucket: bucket, Key: 'large' }));
  const after = createHash('sha256');
  for await (const data of Body as Readable) after.update(data);
  clearInterval(watch);
  expect(after.digest('hex')).toBe(before.digest('hex'));
  expect(peakKiB).toBeGreaterThan(0);
  expect(peakKiB / 1024).toBeLessThan(100);
});

test('minio client: bucket, object, metadata, list, parts, copy, presigned and removal', async () => {
  const minio = new MinioClient({
    endPoint: '127.0.0.1',
    port: server.port,
    useSSL: false,
    accessKey: credentials.accessKeyId,
    secretKey: credentials.secretAccessKey,
  });
  await minio.makeBucket('second-client');
  expect(await minio.bucketExists('second-client')).toBe(true);
  expect(await minio.bucketExists('not-there')).toBe(false);
  await minio.putObject('second-client', 'ordner/ü 1.csv', 'time,volts', 10, {
    'Content-Type': 'text/csv',
    'X-Amz-Meta-Unit': 'V',
  });
  const stat = await minio.statObject('second-client', 'ordner/ü 1.csv');
  expect([stat.size, stat.metaData['content-type'], stat.metaData.unit]).toEqual([10, 'text/csv', 'V']);
  const part = await minio.getPartialObject('second-client', 'ordner/ü 1.csv', 5, 5);
  expect(Buffer.concat(await part.toArray()).toString()).toBe('volts');

  const size = 70 * MiB;
  await minio.putObject('second-client', 'in parts', Readable.from(pseudoRandom(size, MiB)), size);
  expect((await minio.statObject('second-client', 'in parts')).size).toBe(size);

  const names = (await minio.listObjectsV2('second-client', '', true).toArray()).map((object) => object.name);
  expect(names).toEqual(['in parts', 'ordner/ü 1.csv']);
  const first = await minio.listObjects('second-client', '', false).toArray();
  expect(first.map((object) => object.name ?? object.prefix).sort()).toEqual(['in parts', 'ordner/']);

  const url = await minio.presignedGetObject('second-client', 'ordner/ü 1.csv', 60);
  expect(await (await fetch(url)).text()).toBe('time,volts');
  await minio.removeObjects('second-client', names);
  expect(await minio.listObjectsV2('second-client', '', true).toArray()).toEqual([]);
  await minio.removeBucket('second-client');
  expect(await minio.bucketExists('second-client')).toBe(false);
});

test('an upload that breaks off leaves nothing visible and nothing behind', async () => {
  const Key = 'broken off';
  const url = await getSignedUrl(client('WHEN_REQUIRED'), new PutObjectCommand({ Bucket: bucket, Key }), {
    expiresIn: 60,
  });
  const { pathname, search } = new URL(url);
  const upload = createConnection(server.port, '127.0.0.1');
  upload.write(
    `PUT ${pathname}${search} HTTP/1.1\r\nHost: 127.0.0.1:${server.port}\r\nContent-Length: 1000000\r\n\r\n`,
  );
  upload.write(Buffer.alloc(200_000, 'x'));
  const temporary = join(folder, 'temporary');
  while (readdirSync(temporary).length === 0) await sleep(10);
  upload.destroy();
  while (readdirSync(temporary).length > 0) await sleep(10);
  await expect(text(client('WHEN_REQUIRED'), Key)).rejects.toMatchObject({ name: 'NoSuchKey' });
});

test('everything is still there after SIGKILL in the middle of an upload, and of that upload nothing', async () => {
  const s3 = client('WHEN_REQUIRED');
  await s3.send(
    new PutObjectCommand({ Bucket: bucket, Key: 'kept/before', Body: 'still here', Metadata: { a: 'b' } }),
  );
  const open = await s3.send(new CreateMultipartUploadCommand({ Bucket: bucket, Key: 'kept/parts' }));
  const parts = { Bucket: bucket, Key: 'kept/parts', UploadId: open.UploadId };
  const { ETag } = await s3.send(new UploadPartCommand({ ...parts, PartNumber: 1, Body: 'one part' }));
  const url = await getSignedUrl(s3, new PutObjectCommand({ Bucket: bucket, Key: 'kept/killed' }), {
    expiresIn: 60,
  });
  const upload = request(url, { method: 'PUT', headers: { 'content-length': 1_000_000 } });
  upload.on('error', () => {});
  upload.write(Buffer.alloc(200_000, 'x'));
  while (readdirSync(join(folder, 'temporary')).length === 0) await sleep(10);
  const { port } = server;
  await server.stop('SIGKILL');
  server = await startServer(port);

  expect(await text(s3, 'kept/before')).toBe('still here');
  const head = await s3.send(new HeadObjectCommand({ Bucket: bucket, Key: 'kept/before' }));
  expect(head.Metadata).toEqual({ a: 'b' });
  await s3.send(
    new CompleteMultipartUploadCommand({ ...parts, MultipartUpload: { Parts: [{ PartNumber: 1, ETag }] } }),
  );
  const { Contents } = await s3.send(new ListObjectsV2Command({ Bucket: bucket, Prefix: 'kept/' }));
  expect(Contents?.map((object) => object.Key)).toEqual(['kept/before', 'kept/parts']);
  expect(readdirSync(join(folder, 'temporary'))).toEqual([]);
});
