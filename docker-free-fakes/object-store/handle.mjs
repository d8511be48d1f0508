// @ts-check
import { randomBytes } from 'node:crypto';
import { bodyStreams } from './body.mjs';
import { bucketOperations } from './bucket-operations.mjs';
import { objectOperations } from './object-operations.mjs';
import { S3Error } from './s3-error.mjs';
import { checkSignature } from './signature.mjs';
import { document } from './xml.mjs';

/**
 * @typedef {import('node:http').IncomingMessage} Request
 * @typedef {import('node:http').ServerResponse} Response
 *
 * @typedef {object} Call one request, understood
 * @property {Request} request
 * @property {Response} response
 * @property {string} method
 * @property {string} bucket empty for the service itself
 * @property {string} key empty for the bucket itself
 * @property {Map<string, string>} query
 * @property {(name: string) => string} header empty when absent
 * @property {() => import('./store.mjs').Content} content the body as a stream, checked on its way
 * @property {() => Promise<string>} text a small body at once
 * @property {(status: number, headers?: Record<string, string>) => void} empty answers without a body
 * @property {(name: string, content: import('./xml.mjs').XmlNode) => void} xml
 */

const LARGEST_XML_BYTES = 2 * 1024 * 1024;

/**
 * @param {import('./store.mjs').Store} store
 * @param {import('./signature.mjs').Credentials} credentials
 */
export function makeHandler(store, credentials) {
  const onBucket = bucketOperations(store, credentials.region);
  const onObject = objectOperations(store);

  /** @param {Request} request @param {Response} response */
  return async (request, response) => {
    response.setHeader('x-amz-request-id', randomBytes(8).toString('hex').toUpperCase());
    response.setHeader('server', 'object-store');
    try {
      const call = understand(request, response);
      checkSignature(
        {
          method: call.method,
          path: decodeURIComponent(splitUrl(request).path),
          query: [...call.query],
          headers: request.headers,
        },
        credentials,
      );
      const operation = call.key === '' ? onBucket(call) : onObject(call);
      await operation;
    } catch (error) {
      answerError(request, response, error);
    }
  };
}

/** @param {Request} request */
function splitUrl(request) {
  const url = request.url ?? '/';
  const at = url.indexOf('?');
  return at < 0 ? { path: url, query: '' } : { path: url.slice(0, at), query: url.slice(at + 1) };
}

/** @param {Request} request @param {Response} response @returns {Call} */
function understand(request, response) {
  const url = splitUrl(request);
  const [, bucket = '', key = ''] = /^\/([^/]*)\/?(.*)$/s.exec(decode(url.path)) ?? [];
  const query = new Map(
    url.query === ''
      ? []
      : url.query.split('&').map((pair) => {
          const at = pair.indexOf('=');
          return /** @type {[string, string]} */ (
            at < 0 ? [decode(pair), ''] : [decode(pair.slice(0, at)), decode(pair.slice(at + 1))]
          );
        }),
  );
  /** @returns {import('./store.mjs').Content} */
  const content = () => {
    const { streams, checksum } = bodyStreams(request.headers);
    return { source: request, through: streams, checksum };
  };
  return {
    request,
    response,
    method: request.method ?? 'GET',
    bucket,
    key,
    query,
    header: (name) => String(request.headers[name] ?? ''),
    content,
    text: () => readText(content()),
    empty: (status, headers = {}) => void response.writeHead(status, headers).end(),
    xml: (name, node) => {
      const body = document(name, node);
      response
        .writeHead(200, { 'content-type': 'application/xml', 'content-length': Buffer.byteLength(body) })
        .end(body);
    },
  };
}

/** @param {string} text */
function decode(text) {
  try {
    return decodeURIComponent(text);
  } catch {
    throw new S3Error('InvalidArgument', 'The address is not valid UTF-8.');
  }
}

/** @param {import('./store.mjs').Content} content */
async function readText({ source, through }) {
  /** @type {any} */
  let stream = source;
  for (const next of through) {
    stream.on('error', (/** @type {Error} */ error) => next.destroy(error));
    stream = stream.pipe(next);
  }
  let text = '';
  for await (const data of stream) {
    text += data.toString('utf8');
    if (text.length > LARGEST_XML_BYTES) throw new S3Error('MalformedXML', 'The body is too large.');
  }
  return text;
}

/** @param {Request} request @param {Response} response @param {unknown} error */
function answerError(request, response, error) {
  const known =
    error instanceof S3Error
      ? error
      : new S3Error('InternalError', 'The store could not do this. See its log.');
  // A client that went away in the middle of its upload is nothing to report.
  if (!(error instanceof S3Error) && !request.destroyed)
    process.stderr.write(`${request.method} failed: ${String(error)}\n`);
  if (response.headersSent || response.destroyed) {
    response.destroy();
    return;
  }
  const body = document('Error', {
    Code: known.code,
    Message: known.message,
    Resource: splitUrl(request).path,
  });
  // What remains of a refused body is not waited for.
  const rest = !request.complete;
  if (rest) response.setHeader('connection', 'close');
  response.writeHead(known.status, { 'content-type': 'application/xml' });
  if (request.method === 'HEAD') response.end();
  else response.end(body);
  if (rest) request.resume();
}
