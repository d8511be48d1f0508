import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Circuit } from '../../../src/engine/circuit.ts';
import type { MeasuredSignal } from '../../../src/engine/circuits/types.ts';

/** ngspice (a general-purpose circuit simulator, a Debian package) is optional. */
export const ngspicePresent = spawnSync('ngspice', ['--version']).status === 0;

/** Columns of one run of a netlist in this folder: time, then what its `wrdata` names, at even steps. */
export function simulate(netlist: string): readonly Float64Array[] {
  const folder = mkdtempSync(join(tmpdir(), 'netlist-'));
  try {
    const text = readFileSync(new URL(`./${netlist}`, import.meta.url), 'utf8');
    writeFileSync(join(folder, 'run.cir'), text.replace('OUTPUT', join(folder, 'out')));
    const run = spawnSync('ngspice', ['-b', 'run.cir'], { cwd: folder, encoding: 'utf8', timeout: 60_000 });
    const lines = readFileSync(join(folder, 'out'), 'utf8').split('\n').slice(1);
    const rows = lines
      .filter((line) => line.trim() !== '')
      .map((line) => line.trim().split(/\s+/).map(Number));
    if (rows.length === 0) throw new Error(run.stdout);
    return rows[0]!.map((_, column) => Float64Array.from(rows, (row) => row[column]!));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** One column as a signal; `factor` −1 turns a source's current into the current that it delivers. */
export function signalOf(
  columns: readonly Float64Array[],
  column: number,
  circuit: Circuit,
  unit: string,
  factor = 1,
): MeasuredSignal {
  const timesS = columns[0]!;
  const count = timesS.length;
  return {
    circuit,
    name: 'simulated circuit',
    unit,
    values: Float32Array.from(columns[column]!, (value) => factor * value),
    axis: { kind: 'even', startS: timesS[0]!, stepS: (timesS[count - 1]! - timesS[0]!) / (count - 1), count },
    rail: null,
  };
}
