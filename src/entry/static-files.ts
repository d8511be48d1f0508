import { createReadStream, readdirSync, statSync } from 'node:fs';
import type { IncomingMessage, ServerResponse } from 'node:http';
import { extname, join, relative, sep } from 'node:path';

interface StaticFile {
  readonly path: string;
  readonly size: number;
  readonly type: string;
  readonly etag: string;
  readonly cacheControl: string;
  /** Compressed at build. */
  readonly packed: Readonly<Record<'br' | 'gzip', { readonly path: string; readonly size: number } | null>>;
}

const TYPES: Readonly<Record<string, string>> = {
  '.css': 'text/css; charset=utf-8',
  '.csv': 'text/csv; charset=utf-8',
  '.html': 'text/html; charset=utf-8',
  '.ico': 'image/x-icon',
  '.jpg': 'image/jpeg',
  '.js': 'text/javascript; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.map': 'application/json; charset=utf-8',
  '.mjs': 'text/javascript; charset=utf-8',
  '.png': 'image/png',
  '.svg': 'image/svg+xml',
  '.txt': 'text/plain; charset=utf-8',
  '.webmanifest': 'application/manifest+json',
  '.webp': 'image/webp',
  '.woff2': 'font/woff2',
};

/**
 * The files of a folder by their address, listed once at the start: an address that is not in the list is no file, whatever
 * it spells. Names with a hash in them never change; others are asked for again by ETag.
 */
export function staticFiles(
  folder: string,
): (request: IncomingMessage, response: ServerResponse, path: string) => boolean {
  const files = list(folder);
  return (request, response, path) => {
    if (request.method !== 'GET' && request.method !== 'HEAD') return false;
    const file = files.get(path);
    if (file === undefined) return false;
    serve(file, request, response);
    return true;
  };
}

function serve(file: StaticFile, request: IncomingMessage, response: ServerResponse): void {
  const headers = { 'Cache-Control': file.cacheControl, ETag: file.etag, Vary: 'Accept-Encoding' };
  if (request.headers['if-none-match']?.split(',').some((tag) => tag.trim() === file.etag)) {
    response.writeHead(304, headers).end();
    return;
  }
  const encoding = choose(file, request.headers['accept-encoding']);
  const chosen = encoding === null ? file : file.packed[encoding]!;
  response.writeHead(200, {
    ...headers,
    'Content-Type': file.type,
    'Content-Length': chosen.size,
    ...(encoding === null ? {} : { 'Content-Encoding': encoding }),
  });
  if (request.method === 'HEAD') {
    response.end();
    return;
  }
  createReadStream(chosen.path)
    .on('error', () => response.destroy())
    .pipe(response);
}

function choose(file: StaticFile, accepted: string | undefined): 'br' | 'gzip' | null {
  const names = new Set(
    (accepted ?? '')
      .split(',')
      .map((part) => part.trim().toLowerCase())
      .filter((part) => !/;\s*q=0(\.0*)?$/.test(part))
      .map((part) => part.split(';')[0]!),
  );
  if (file.packed.br !== null && names.has('br')) return 'br';
  return file.packed.gzip !== null && names.has('gzip') ? 'gzip' : null;
}

function list(folder: string): Map<string, StaticFile> {
  const files = new Map<string, StaticFile>();
  const paths = new Map<string, { size: number; modified: number }>();
  for (const entry of entriesOf(folder)) {
    const path = join(entry.parentPath, entry.name);
    const { size, mtimeMs } = statSync(path);
    paths.set(path, { size, modified: mtimeMs });
  }
  for (const [path, { size, modified }] of paths) {
    if (/\.(br|gz)$/.test(path)) continue;
    const address = `/${relative(folder, path).split(sep).map(encodeURIComponent).join('/')}`;
    const beside = (ending: string) => {
      const found = paths.get(path + ending);
      return found === undefined ? null : { path: path + ending, size: found.size };
    };
    files.set(address, {
      path,
      size,
      type: TYPES[extname(path).toLowerCase()] ?? 'application/octet-stream',
      etag: `W/"${size.toString(36)}-${Math.round(modified).toString(36)}"`,
      cacheControl: address.startsWith('/_astro/')
        ? 'public, max-age=31536000, immutable'
        : 'public, max-age=300',
      packed: { br: beside('.br'), gzip: beside('.gz') },
    });
  }
  return files;
}

function entriesOf(folder: string) {
  try {
    return readdirSync(folder, { recursive: true, withFileTypes: true }).filter((entry) => entry.isFile());
  } catch {
    // In development there is no built client; Vite serves the files.
    return [];
  }
}
