import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { CaptureFindings, TimeAxis } from '../../src/engine/capture.ts';
import type { Circuit } from '../../src/engine/circuit.ts';
import { measureCapture } from '../../src/engine/measure.ts';
import type { CrankSignal } from '../../src/engine/testing/crank-signal.ts';
import type { Value } from '../../src/engine/value.ts';

const root = (folder: string) => fileURLToPath(new URL(`../../../shared/${folder}/`, import.meta.url));

/** Text of a shared file, or null where the folder is not beside the checkout. */
export function sharedFile(folder: 'captures' | 'recordings', name: string): string | null {
  const path = root(folder) + name;
  return existsSync(path) ? readFileSync(path, 'utf8') : null;
}

/** Rows of numbers of a plain table; lines with anything else are left out. Only for these files: the product reads with `reading/`. */
export function table(text: string, delimiter: string): number[][] {
  return text
    .replace(/^\uFEFF/, '')
    .split(/\r?\n/)
    .map((line) => line.split(delimiter).map((cell) => cell.trim()))
    .filter((cells) => cells.length > 1 && cells[0] !== '')
    .map((cells) => cells.map((cell) => Number(delimiter === ';' ? cell.replace(',', '.') : cell)))
    .filter((row) => row.every((value) => Number.isFinite(value)));
}

export const column = (rows: readonly number[][], index: number) =>
  Float32Array.from(rows, (row) => row[index]!);

export function evenAxis(rows: readonly number[][], secondsPerUnit = 1): TimeAxis {
  const count = rows.length;
  const startS = rows[0]![0]! * secondsPerUnit;
  const stepS = (rows[count - 1]![0]! * secondsPerUnit - startS) / (count - 1);
  return { kind: 'even', startS, stepS, count };
}

export const changesOnly = (rows: readonly number[][]): TimeAxis => ({
  kind: 'uneven',
  timesS: Float64Array.from(rows, (row) => row[0]!),
  holds: true,
});

export function measure(
  axis: TimeAxis,
  signals: ReadonlyArray<readonly [Circuit, Float32Array]>,
  cylinders: number | null = null,
): CaptureFindings {
  return measureCapture({
    axis,
    cylinders,
    signals: signals.map(([circuit, samples], index) => ({
      index,
      name: circuit,
      circuit,
      unit: 'V',
      factor: 1,
      offset: 0,
      samples,
    })),
  });
}

export function measureSignal(
  signal: CrankSignal,
  circuit: Circuit,
  cylinders: number | null = null,
): CaptureFindings {
  return measure(
    { kind: 'even', startS: 0, stepS: signal.stepS, count: signal.samples.length },
    [[circuit, signal.samples]],
    cylinders,
  );
}

export function value(findings: CaptureFindings, key: string, index = 0): Value {
  const all = [
    ...(findings.signals.find((s) => s.index === index)?.values ?? []),
    ...findings.relations.flatMap((r) => r.values),
  ];
  const found = all.find((v) => v.key === key);
  if (!found) throw new Error(`no value "${key}"`);
  return found;
}

export const number = (findings: CaptureFindings, key: string, index = 0): number => {
  const found = value(findings, key, index).value;
  if (typeof found !== 'number')
    throw new Error(`"${key}" is ${JSON.stringify(found)}: ${value(findings, key, index).reason}`);
  return found;
};

export const codes = (findings: CaptureFindings, index = 0) =>
  findings.signals.find((s) => s.index === index)!.notices.map((notice) => notice.code);
