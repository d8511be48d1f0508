import { cellKind, cellNumber } from './cellKind.ts';
import { splitCells } from './cells.ts';
import type { Decimal, Delimiter, TimeUnit } from './types.ts';
import { parseUnit, timeUnitOf } from './units.ts';

/** What the free text above a table says about it. */
export interface Preamble {
  readonly intervalS: number | null;
  readonly startS: number | null;
  readonly recordedAt: string | null;
  readonly timeUnit: TimeUnit | null;
}

const INTERVAL =
  /\b(sampl\w*|record\w*|scan|time|x|horizontal|store)?[ _-]*(interval|period|increment|step|spacing|resolution|distance)\b|^(dt|delta ?t|Δt|∆t|dx|per sample|abtastintervall|abtastzeit|abtastperiode|zeitschritt|zeitintervall|messintervall|pas|intervalle?|intervallo|intervalo)\b/i;
const RATE =
  /\b(sampl\w*|scan|record\w*|data|acquisition)[ _-]*(rate|freq\w*|speed)\b|^(fs|f_s|rate|abtastrate|abtastfrequenz|samplerate|samplingrate|fr[ée]quence.*|cadence|samples? per second|samples?\/s)\b/i;
const START =
  /^(start|first)[ _-]*(time|x|sample|offset)?$|\b(x[ _-]*(zero|start|offset|origin)|t0|start[ _-]*time|time[ _-]*(offset|zero|of first sample)|trigger[ _-]*(offset|delay|position|time)|startzeit|beginn)\b/i;
const DATE =
  /\b(date|datum|recorded|recording time|created|captured|saved|exported|measured|start(ed)?|start ?time|time ?stamp|time|zeit|aufgenommen|aufnahme|fecha|data|uhrzeit)\b/i;
const TIME_UNIT = /\b(time|horizontal|x|zeit)[ _-]*(units?|einheit|scale)\b/i;
const DATE_VALUE =
  /\d{4}[-/.]\d{1,2}[-/.]\d{1,2}|\d{1,2}[-/.]\d{1,2}[-/.]\d{2,4}|\d{1,2}[ -][A-Za-zäé]{3,9}\.?[ -]\d{4}|\b\d{1,2}:\d{2}:\d{2}/;

interface Entry {
  readonly key: string;
  readonly value: string;
}

/** True for a line that says something about the recording, so that it cannot be the line of names. */
export function isPreambleLine(text: string, delimiter: Delimiter): boolean {
  return entriesOf(text, delimiter).some(({ key, value }) => {
    if (DATE.test(key) && DATE_VALUE.test(value)) return true;
    if (TIME_UNIT.test(key)) return value !== '';
    return /\d/.test(value) && (INTERVAL.test(key) || RATE.test(key) || START.test(key));
  });
}

/** Reads sample interval or rate, start, date and time unit from the lines above the table; the first of each counts. */
export function readPreamble(lines: readonly string[], delimiter: Delimiter, decimal: Decimal): Preamble {
  let intervalS: number | null = null;
  let startS: number | null = null;
  let recordedAt: string | null = null;
  let timeUnit: TimeUnit | null = null;
  for (const [i, line] of lines.entries()) {
    const below = entriesBelow(line, lines[i + 1] ?? '', delimiter);
    for (const { key, value } of [...entriesOf(line, delimiter), ...below]) {
      if (RATE.test(key)) {
        const rate = quantity(key, value, decimal, 'Hz');
        if (rate !== null && rate > 0) intervalS ??= 1 / rate;
      } else if (INTERVAL.test(key)) {
        const interval = quantity(key, value, decimal, 's');
        if (interval !== null && interval > 0) intervalS ??= interval;
      } else if (TIME_UNIT.test(key)) {
        timeUnit ??= timeUnitOf(parseUnit(value));
      } else if (DATE_VALUE.test(value) && (DATE.test(key) || START.test(key))) {
        recordedAt =
          recordedAt === null ? value : recordedAt.includes(value) ? recordedAt : `${recordedAt} ${value}`;
      } else if (START.test(key)) {
        startS ??= quantity(key, value, decimal, 's');
      }
    }
  }
  return { intervalS, startS, recordedAt, timeUnit };
}

/** "Key: value", "Key = value", "Key;value;unit", and several of these in one line. */
function entriesOf(text: string, delimiter: Delimiter): Entry[] {
  const bare = text.replace(/^[\s#%;/"'*!]+/, '');
  const inOne = /^([^:=]{1,60}?)\s*[:=]\s*(.*)$/.exec(bare);
  const entries: Entry[] = [];
  if (inOne !== null)
    entries.push({
      key: inOne[1]!.replace(/["']$/, ''),
      value: inOne[2]!.replace(/^["'\s,;]+|["'\s,;]+$/g, ''),
    });
  // The lines above a table of one column need not use its delimiter.
  for (const mark of new Set<Delimiter>([delimiter === ' ' ? '\t' : delimiter, ';', '\t', ','])) {
    const cells = splitCells(bare, mark);
    for (let i = 0; i + 1 < cells.length; i++) {
      const key = cells[i]!.replace(/\s*[:=]$/, '');
      const unit = parseUnit(cells[i + 2] ?? '') === null ? '' : ` ${cells[i + 2]}`;
      if (/[A-Za-zΔ∆]/.test(key)) entries.push({ key, value: `${cells[i + 1]}${unit}` });
    }
  }
  const spaced = /^([A-Za-z][A-Za-z _-]*?)\s+([-+]?\d.*)$/.exec(bare);
  if (entries.length === 0 && spaced !== null) entries.push({ key: spaced[1]!, value: spaced[2]! });
  return entries;
}

/** Keys in one line and their values in the next, cell under cell; none where a key holds a number or the counts differ. */
function entriesBelow(text: string, next: string, delimiter: Delimiter): Entry[] {
  const keys = splitCells(text, delimiter);
  const values = splitCells(next, delimiter);
  if (keys.length < 2 || keys.length !== values.length) return [];
  if (keys.some((key) => /^[-+−]?[\d.,]/.test(key))) return [];
  return keys.flatMap((key, i) =>
    /[A-Za-zΔ∆]/.test(key) && /\d/.test(values[i]!) ? [{ key, value: values[i]! }] : [],
  );
}

/** "20 µs", "50 kS/s", "2e-5", or a bare number with the unit in the key: "Interval (ms)". In seconds or hertz. */
function quantity(key: string, value: string, decimal: Decimal, wanted: 's' | 'Hz'): number | null {
  const match = /^([-+−]?[\d.,]*\d(?:\.(?=\s|$))?(?:[eE][-+]?\d+)?)\s*([^\d\s].*)?$/.exec(value.trim());
  if (match === null) return null;
  const text = match[1]!;
  const mark: Decimal = readable(text, decimal) ? decimal : decimal === '.' ? ',' : '.';
  if (!readable(text, mark)) return null;
  const number = cellNumber(text, mark);
  const said = (match[2] ?? /[([]\s*([^()[\]]+)\s*[)\]]/.exec(key)?.[1] ?? / in (\S+)$/.exec(key)?.[1] ?? '')
    .trim()
    .replace(/[;,]+$/, '');
  if (said === '') return number;
  const unit = wanted === 'Hz' ? rateUnit(said) : parseUnit(said.split(/\s/)[0]!);
  if (unit?.unit === wanted) return Number((number * unit.factor).toPrecision(15));
  // A period told under a rate's name, or the other way round, is still clear from its unit.
  if (wanted === 's' && rateUnit(said)?.unit === 'Hz') return 1 / (number * rateUnit(said)!.factor);
  if (wanted === 'Hz' && unit === null && parseUnit(said)?.unit === 's')
    return 1 / (number * parseUnit(said)!.factor);
  return null;
}

function readable(text: string, decimal: Decimal): boolean {
  const kind = cellKind(text, decimal);
  return kind === 'number' || kind === 'grouped';
}

/** Samples a second: "S/s", "Sa/s", "kS/s", "MSPS", "samples/s", "Hz". */
function rateUnit(text: string) {
  const match =
    /^([kKMG]?)\s*(?:s\/s|sa\/s|sps|samples?\/s(?:ec(?:ond)?)?|samples? per second|hz|hertz)$/i.exec(text);
  if (match === null) return null;
  const factor = { '': 1, k: 1e3, m: 1e6, g: 1e9 }[match[1]!.toLowerCase()] ?? 1;
  return { unit: 'Hz', factor };
}
