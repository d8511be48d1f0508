import type { ImportLineJson } from '../../../contract/areas/import.ts';
import { parseTable, type TableLine } from './parse-table.ts';

export const MOST_LINES = 5_000;
/** Nearest names are looked for this many different engines: a table of nothing but unknown ones must not keep the server busy. */
const MOST_LOOKS = 20;
/** Names further apart than this many letters are not mistaken for each other. */
const MOST_AWAY = 6;
const MOST_LETTERS = 80;

/** What each column may be called, in small letters. */
const COLUMNS = {
  file: ['file', 'filename', 'file name'],
  title: ['title', 'name'],
  note: ['note', 'notes', 'description'],
  cylinders: ['cylinders'],
  make: ['make'],
  model: ['model'],
  code: ['code', 'engine code'],
  condition: ['condition'],
} as const;
type Column = keyof typeof COLUMNS;

export interface Known {
  /** Names of the files that were chosen. */
  readonly files: readonly string[];
  /** Engines of the workshop's library, "make model". */
  readonly engines: readonly string[];
  /** Names of files that are captures already. */
  readonly present: ReadonlySet<string>;
  /** Engines that the library does not have are meant. */
  readonly newEngines: boolean;
}

export interface Checked {
  /** What is wrong with the table as a whole; then there are no lines. */
  readonly fault: string | null;
  readonly lines: readonly ImportLineJson[];
  /** Files chosen that no line describes. */
  readonly without: readonly string[];
}

const plain = (text: string) => text.normalize('NFC').toLowerCase().replace(/\s+/g, ' ').trim();
const nothing = (fault: string): Checked => ({ fault, lines: [], without: [] });

/** Judges every line of a table of descriptions. Each gets one sentence that says what is wrong with it, or none. */
export function checkLines(csv: string, known: Known): Checked {
  const { lines, open } = parseTable(csv);
  if (open !== null)
    return nothing(`The quote that opens in line ${open} is never closed. Close it, or take it out.`);
  const [head, ...rows] = lines;
  if (head === undefined) return nothing('The table is empty.');
  const places = placesOf(head);
  if (places.file === undefined)
    return nothing(
      `The first line must name the columns, one of them “file”. Found: ${head.cells.slice(0, 8).join(', ').slice(0, 120)}.`,
    );
  if (rows.length === 0) return nothing('There is no line under the names of the columns.');
  if (rows.length > MOST_LINES)
    return nothing(
      `The table has ${rows.length} lines; ${MOST_LINES} are taken at once. Split it, nothing was kept.`,
    );
  const files = new Map(known.files.map((name) => [plain(name), name]));
  const engines = new Map(known.engines.map((name) => [plain(name), name]));
  const seen = { files: new Map<string, number>(), titles: new Map<string, number>() };
  const near = new Map<string, string | null>();
  const described = new Set<string>();
  const checked = rows.map((row) => {
    const cell = (column: Column) => row.cells[places[column] ?? -1] ?? '';
    const line = judge(row.line, cell, { ...known, files, engines, seen, near });
    described.add(plain(cell('file')));
    return line;
  });
  return { fault: null, lines: checked, without: known.files.filter((name) => !described.has(plain(name))) };
}

function placesOf(head: TableLine): Partial<Record<Column, number>> {
  const names = head.cells.map(plain);
  return Object.fromEntries(
    Object.entries(COLUMNS).flatMap(([column, words]) => {
      const at = names.findIndex((name) => (words as readonly string[]).includes(name));
      return at < 0 ? [] : [[column, at]];
    }),
  );
}

interface Judging extends Omit<Known, 'files' | 'engines'> {
  readonly files: ReadonlyMap<string, string>;
  readonly engines: ReadonlyMap<string, string>;
  readonly seen: { readonly files: Map<string, number>; readonly titles: Map<string, number> };
  /** Engines looked for so far, each with the nearest that the library has. */
  readonly near: Map<string, string | null>;
}

function judge(line: number, cell: (column: Column) => string, known: Judging): ImportLineJson {
  const name = cell('file');
  const title = cell('title');
  const cylinders = cell('cylinders');
  const engine = [cell('make'), cell('model')].filter(Boolean).join(' ');
  const about = [engine, cell('code')].filter(Boolean).join(', ');
  const note = [
    cell('note'),
    about === '' ? '' : `Engine: ${about}.`,
    cell('condition') === '' ? '' : `Condition: ${cell('condition')}.`,
  ]
    .filter(Boolean)
    .join('\n');
  const found = known.files.get(plain(name)) ?? null;
  const count = /^\d{1,2}$/.test(cylinders) ? Number(cylinders) : null;
  const result = (verdict: ImportLineJson['verdict'], text: string): ImportLineJson => ({
    line,
    file: name,
    title: title || null,
    note,
    cylinders: count,
    verdict,
    text,
  });
  const before = known.seen.files.get(plain(name));
  const sameTitle = title === '' ? undefined : known.seen.titles.get(plain(title));
  if (name !== '' && before === undefined) known.seen.files.set(plain(name), line);
  if (title !== '' && sameTitle === undefined) known.seen.titles.set(plain(title), line);

  if (name === '') return result('bad', 'No file is named.');
  if (before !== undefined)
    return result('bad', `“${name}” stands in line ${before} already. One line a file.`);
  if (found === null) return result('bad', `“${name}” is not among the files chosen.`);
  if (title.length > 200) return result('bad', 'The title is longer than 200 characters.');
  if (note.length > 2_000) return result('bad', 'Note and engine together are longer than 2,000 characters.');
  if (/\p{Cc}/u.test((title + note).replace(/[\t\r\n]/g, '')))
    return result('bad', 'It has control characters.');
  if (cylinders !== '' && (count === null || count < 1 || count > 16))
    return result('bad', `“${cylinders.slice(0, 20)}” cylinders: a whole number from 1 to 16 is expected.`);
  if (engine !== '' && !known.engines.has(plain(engine)) && !known.newEngines)
    return result('bad', unknownEngine(engine, known));
  if (sameTitle !== undefined) return result('watch', `The same title as line ${sameTitle}.`);
  if (known.present.has(found)) return result('watch', 'A capture of a file with this name is here already.');
  return result('good', '');
}

/** The sentence for an engine that the library does not have; the same name is looked for once. */
function unknownEngine(engine: string, { engines, near }: Judging): string {
  const wanted = plain(engine);
  if (!near.has(wanted)) near.set(wanted, near.size < MOST_LOOKS ? nearest(wanted, engines) : null);
  const name = near.get(wanted);
  const hint = name ? `Is “${name}” meant?` : 'Tick “new engines are meant” if it is new.';
  return `The library has no engine “${engine}”. ${hint}`;
}

/** The engine whose name is close enough to be meant. */
function nearest(wanted: string, engines: ReadonlyMap<string, string>): string | null {
  let best: { name: string; away: number } | null = null;
  if (wanted.length > MOST_LETTERS) return null;
  for (const [key, name] of engines) {
    if (Math.abs(key.length - wanted.length) > MOST_AWAY) continue;
    const away = distance(key, wanted);
    if (away <= Math.min(MOST_AWAY, Math.max(2, wanted.length / 4)) && away < (best?.away ?? Infinity))
      best = { name, away };
  }
  return best?.name ?? null;
}

/** Edits from one word to another: Levenshtein's distance, by Wagner and Fischer (1974). */
function distance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, at) => at);
  for (let i = 1; i <= a.length; i += 1) {
    const next = [i];
    for (let j = 1; j <= b.length; j += 1)
      next.push(Math.min(row[j]! + 1, next[j - 1]! + 1, row[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1)));
    row = next;
  }
  return row[b.length]!;
}
