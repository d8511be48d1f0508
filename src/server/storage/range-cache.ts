import { getBytes } from './get-bytes.ts';

/**
 * Pieces of immutable objects, so that a window asked for again does not go to the store. The least recently used pieces
 * go when the cache is full; a piece that is being fetched is fetched once whoever asks. Only for keys whose object never
 * changes (everything under a samples version).
 */
const PIECE_BYTES = 256 * 1024;
/** An object up to this size is one piece: a window over all of it is then read without copying. */
const WHOLE_BYTES = 1024 * 1024;

const pieceBytes = (objectBytes: number) => (objectBytes <= WHOLE_BYTES ? WHOLE_BYTES : PIECE_BYTES);
const LIMIT_BYTES = 48 * 1024 * 1024;

const pieces = new Map<string, { readonly bytes: Promise<Uint8Array>; readonly size: number }>();
let held = 0;

/** Bytes `from` up to, not including, `to` of an object that has `objectBytes`. Treat them as read-only. */
export async function readRange(
  key: string,
  objectBytes: number,
  from: number,
  to: number,
): Promise<Uint8Array> {
  const end = Math.min(to, objectBytes);
  if (end <= from) return new Uint8Array(0);
  const piece = pieceBytes(objectBytes);
  const first = Math.floor(from / piece);
  const last = Math.floor((end - 1) / piece);
  const found: Promise<Uint8Array>[] = [];
  for (let at = first; at <= last; at += 1) found.push(take(key, objectBytes, at, last));
  const parts = await Promise.all(found);
  const start = first * piece;
  if (parts.length === 1) return parts[0]!.subarray(from - start, end - start);
  const bytes = new Uint8Array(end - from);
  parts.forEach((part, k) => {
    const pieceStart = start + k * piece;
    const low = Math.max(from, pieceStart);
    const high = Math.min(end, pieceStart + part.length);
    bytes.set(part.subarray(low - pieceStart, high - pieceStart), low - from);
  });
  return bytes;
}

function take(key: string, objectBytes: number, piece: number, lastWanted: number): Promise<Uint8Array> {
  const name = `${key}#${piece}`;
  const known = pieces.get(name);
  if (known !== undefined) {
    pieces.delete(name);
    pieces.set(name, known);
    return known.bytes;
  }
  return fetchRun(key, objectBytes, piece, lastWanted);
}

/** Fetches the missing pieces from `piece` on that lie side by side with one request; gives the first of them. */
function fetchRun(key: string, objectBytes: number, piece: number, lastWanted: number): Promise<Uint8Array> {
  let stop = piece;
  while (stop <= lastWanted && !pieces.has(`${key}#${stop}`)) stop += 1;
  const each = pieceBytes(objectBytes);
  const from = piece * each;
  const whole = getBytes(key, { from, to: Math.min(stop * each, objectBytes) });
  for (let k = piece; k < stop; k += 1) {
    const name = `${key}#${k}`;
    const at = k * each;
    const size = Math.min(each, objectBytes - at);
    // A copy of its own, so that a piece that stays does not hold the whole run in memory.
    const bytes = whole.then((all) => (stop === piece + 1 ? all : all.slice(at - from, at - from + size)));
    bytes.catch(() => drop(name));
    pieces.set(name, { bytes, size });
    held += size;
  }
  const wanted = pieces.get(`${key}#${piece}`)!.bytes;
  for (const oldest of pieces.keys()) {
    if (held <= LIMIT_BYTES) break;
    drop(oldest);
  }
  return wanted;
}

function drop(name: string): void {
  const piece = pieces.get(name);
  if (piece === undefined) return;
  pieces.delete(name);
  held -= piece.size;
}
