/**
 * Reading a CSV of about 100 MB: time against a loop that only counts newlines, uDSV and Papa Parse, both with number
 * conversion, and memory over the arrays made. Prints one JSON line a ratio. Limits: at most 5 times the newline count
 * (aim 3), at least 4 times as fast as uDSV and 7 times as Papa Parse, at most 90 MB over 1.2 times the arrays.
 */
import { readTable } from '../src/engine/reading/read.ts';

const MEGABYTES = Number(process.env.BENCH_MEGABYTES ?? 100);

/** Time and two signals as a scope exports them: 50 kS/s, four significant digits. */
function madeFile(bytes: number): Uint8Array {
  const file = Buffer.alloc(bytes);
  let at = file.write('Time (s),Crank (V),Cam (V)\n');
  for (let i = 0; ; i++) {
    const crank = (4 * Math.sin(i / 40)).toPrecision(4);
    const cam = (i % 4000 < 2000 ? 0.1 + (i % 7) / 1000 : 4.9 - (i % 11) / 1000).toFixed(4);
    const row = `${(i * 2e-5).toFixed(5)},${crank},${cam}\n`;
    if (at + row.length > bytes) return file.subarray(0, at);
    at += file.write(row, at, 'latin1');
  }
}

async function* chunks(file: Uint8Array): AsyncGenerator<Uint8Array> {
  for (let at = 0; at < file.length; at += 65_536) yield file.subarray(at, at + 65_536);
}

function countNewlines(file: Uint8Array): number {
  let lines = 0;
  for (let i = 0; i < file.length; i++) if (file[i] === 10) lines++;
  return lines;
}

async function timeOf(work: () => unknown): Promise<number> {
  const start = performance.now();
  await work();
  return performance.now() - start;
}

async function fastest(times: number, work: () => unknown): Promise<number> {
  let best = Number.POSITIVE_INFINITY;
  for (let i = 0; i < times; i++) best = Math.min(best, await timeOf(work));
  return best;
}

/** Highest resident memory while `work` runs, over what it was before, in bytes. */
async function memoryOver(work: (look: () => void) => Promise<number>) {
  globalThis.gc?.();
  const before = process.memoryUsage.rss();
  let most = before;
  const arrays = await work(() => {
    most = Math.max(most, process.memoryUsage.rss());
  });
  most = Math.max(most, process.memoryUsage.rss());
  return { over: most - before, arrays };
}

const file = madeFile(MEGABYTES * 1e6);
const print = (what: string, ratio: number, limit: string) =>
  console.log(JSON.stringify({ bench: 'reading', what, ratio: Number(ratio.toFixed(2)), limit }));

const memory = await memoryOver(async (look) => {
  const table = await readTable(chunks(file), { onProgress: look });
  if (!table.ok) throw new Error(table.message);
  const axis = table.axis.kind === 'uneven' ? 8 * table.axis.timesS.length : 0;
  return axis + table.columns.reduce((sum, column) => sum + 4 * column.samples.length, 0);
});
print('memory in MB over 1.2 x the arrays', (memory.over - 1.2 * memory.arrays) / 1e6, '<= 90');

/** Both take turns, so that a busy machine touches both. */
let ours = Number.POSITIVE_INFINITY;
let newlines = Number.POSITIVE_INFINITY;
for (let turn = 0; turn < 8; turn++) {
  ours = Math.min(ours, await timeOf(() => readTable(chunks(file))));
  newlines = Math.min(newlines, await timeOf(() => countNewlines(file)));
}
print('time / counting newlines', ours / newlines, '<= 5, aim 3');

// The packages keep every row in memory and slow down with size: they get a fifth, counted five times.
const PART = 5;
const fifth = file.subarray(0, file.lastIndexOf(10, Math.floor(file.length / PART)) + 1);
const text = new TextDecoder('latin1').decode(fifth);
const { inferSchema, initParser } = await import('udsv');
const udsv = PART * (await fastest(3, () => initParser(inferSchema(text.slice(0, 4096))).typedCols(text)));
print('uDSV, typed columns / time', udsv / ours, '>= 4');
const { default: papa } = await import('papaparse');
const papaparse =
  PART * (await fastest(2, () => papa.parse(text, { dynamicTyping: true, skipEmptyLines: true })));
print('Papa Parse, dynamic typing / time', papaparse / ours, '>= 7');
