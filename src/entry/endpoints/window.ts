import type { z } from 'zod';
import { windowQuery } from '../../contract/areas/captures.ts';
import type { Caller } from '../../server/access.ts';
import { authorize, OPENERS, type PersonCaller } from '../../server/access.ts';
import { shareCaller } from '../../server/captures/sharing/share-caller.ts';
import { BoundedCache } from '../../server/captures/window/bounded-cache.ts';
import { captureWindow } from '../../server/captures/window/capture-window.ts';
import { Fresh } from '../../server/captures/window/fresh.ts';
import { quickDoor, type WindowRow } from '../../server/captures/window/quick-door.ts';
import { resolveCaller } from '../../server/http/caller.ts';
import { limitApi } from '../../server/http/limits.ts';
import { hashSecret } from '../../server/ids.ts';
import { readQuery } from '../query.ts';
import type { FrontRequest } from '../types.ts';

interface Opened {
  readonly caller: Caller;
  readonly row: WindowRow;
}

/**
 * Who is asking and what may be seen, looked up for every request anew; several at the same moment by the same caller for the
 * same capture share one look-up that began after all of them came.
 */
const doors = new Fresh<Opened>();

type Query = z.output<typeof windowQuery>;

/** Queries that were checked before: the same text asks for the same. */
const checked = new BoundedCache<Query>(512 * 1024);

function queryOf({ url }: FrontRequest): Query {
  const known = checked.get(url.search);
  if (known !== undefined) return known;
  const query = readQuery(windowQuery, url.searchParams);
  checked.set(url.search, query, 200 + url.search.length * 2);
  return query;
}

/** People whom the door resolved within the last minute, by their credential. */
const known = new BoundedCache<{ readonly caller: PersonCaller; readonly at: number }>(256 * 1024);
/** Then the door resolves them again itself: it also notes that a token is in use and keeps a session alive. */
const KNOWN_MS = 60_000;

/** GET /captures/{id}/window */
export async function windowEndpoint(front: FrontRequest): Promise<void> {
  const { header, address } = front;
  const query = queryOf(front);
  const id = front.params.id ?? '';
  const who = hashSecret(`${header('authorization') ?? ''}\n${header('cookie') ?? ''}`);
  const { caller, row } = await doors.get(`${who} ${id}`, async () => {
    const before = known.get(who);
    if (before !== undefined && Date.now() - before.at < KNOWN_MS) {
      const quick = await quickDoor(before.caller, id);
      if (quick !== null) return { caller: before.caller, row: quick };
    }
    const asking = await resolveCaller({ header, address });
    const opened = { caller: asking, row: await OPENERS.capture(asking, 'captures.window', id) };
    if (asking.kind === 'person') known.set(who, { caller: asking, at: Date.now() }, 512);
    return opened;
  });
  await limitApi(caller, address);
  await answer(front, row, query, false);
}

/** GET /shared/{secret}/window: the same, never kept by anybody on the way. */
export async function sharedWindowEndpoint(front: FrontRequest): Promise<void> {
  const query = queryOf(front);
  const secret = front.params.secret ?? '';
  const { caller, row } = await doors.get(`share ${hashSecret(secret)}`, async () => {
    const asking = await shareCaller(secret);
    authorize('shared.window', asking);
    return { caller: asking, row: await OPENERS.capture(asking, 'shared.window', asking.captureId) };
  });
  await limitApi(caller, front.address);
  await answer(front, row, query, true);
}

async function answer(
  { request, response, header }: FrontRequest,
  row: WindowRow,
  query: Query,
  shared: boolean,
): Promise<void> {
  const { headers, body } = await captureWindow(row, query);
  const etag = `"w${row.samplesVersion}"`;
  const caching = shared
    ? { 'Cache-Control': 'no-store' }
    : query.v === undefined
      ? { 'Cache-Control': 'private, no-cache', ETag: etag }
      : { 'Cache-Control': 'private, max-age=31536000, immutable' };
  if (!shared && query.v === undefined && header('if-none-match') === etag) {
    response.writeHead(304, caching).end();
    return;
  }
  response.writeHead(200, {
    'Content-Type': 'application/octet-stream',
    'Content-Length': body.length,
    ...headers,
    ...caching,
  });
  response.end(request.method === 'HEAD' ? undefined : body);
}
