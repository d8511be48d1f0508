/**
 * The engine's measuring against yardsticks of the same run: a pass that sums the samples, and NumPy and SciPy on the same arrays
 * (left out, and said so, where Python with SciPy is not there). Prints one JSON line a ratio. Limits: levels and crossings 2 × the
 * pass and 0.5 × NumPy, peaks 0.5 × SciPy, spectrum 6 × NumPy, a crank capture of 10 M samples 12 × the pass, cost linear in samples.
 * BENCH_MILLIONS sets the crank capture's size.
 */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Circuit } from '../src/engine/circuit.ts';
import { measureCapture } from '../src/engine/measure.ts';
import { crossings } from '../src/engine/signal/crossings.ts';
import { stateLevels } from '../src/engine/signal/levels.ts';
import { findPeaks } from '../src/engine/signal/peaks.ts';
import { spectrum } from '../src/engine/signal/spectrum.ts';

const MILLIONS = Number(process.env.BENCH_MILLIONS ?? 10);
const print = (what: string, ratio: number, limit: string) =>
  console.log(JSON.stringify({ bench: 'measuring', what, ratio: Number(ratio.toFixed(2)), limit }));

function fastestMs(work: () => unknown, times = 3): number {
  let best = Number.POSITIVE_INFINITY;
  for (let i = 0; i < times; i += 1) {
    const start = performance.now();
    work();
    best = Math.min(best, performance.now() - start);
  }
  return best;
}

function sum(values: Float32Array): number {
  let all = 0;
  for (let i = 0; i < values.length; i += 1) all += values[i]!;
  return all;
}

/** Cheap even noise of mean 0 (a linear congruential generator), the same on every run. */
function noiseOf(reach: number): () => number {
  let state = 1;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return reach * (state / 2147483648 - 1);
  };
}

function made(count: number, at: (i: number) => number, noise: number): Float32Array {
  const next = noiseOf(noise);
  const values = new Float32Array(count);
  for (let i = 0; i < count; i += 1) values[i] = at(i) + next();
  return values;
}

const PER_TOOTH = 250;
/** A 60-2 pick-up at 200 rev/min and 50 kS/s. */
const pickUp = (i: number) =>
  Math.floor(i / PER_TOOTH) % 60 < 58 ? 2 * Math.sin((2 * Math.PI * (i % PER_TOOTH)) / PER_TOOTH) : 0;
const during = (i: number, period: number, from: number, to: number) => i % period >= from && i % period < to;
const coilVolts = (i: number) => {
  const at = i % 15_000;
  if (at < 1_000) return 1 + at / 1_000;
  if (at < 1_005) return 250;
  return at < 1_300 ? 40 : at < 1_500 ? 12 + 25 * Math.exp(-(at - 1_300) / 60) * Math.cos(at / 6) : 12;
};
const injectorVolts = (i: number) => {
  const at = i % 12_000;
  return at < 900 ? 0.4 : at < 915 ? 60 : 12 + (at < 1_200 ? 48 * Math.exp(-(at - 915) / 40) : 0);
};
const circuits: readonly (readonly [Circuit, string, number, (i: number) => number])[] = [
  [
    'crank-hall',
    'V',
    50_000,
    (i) => (during(i, PER_TOOTH, 0, 125) && Math.floor(i / PER_TOOTH) % 60 < 58 ? 4.9 : 0.1),
  ],
  [
    'cam-hall',
    'V',
    50_000,
    (i) => (during(i, 30_000, 2_000, 9_000) || during(i, 30_000, 14_000, 17_000) ? 4.9 : 0.1),
  ],
  ['coil-primary-voltage', 'V', 250_000, coilVolts],
  [
    'coil-primary-current',
    'A',
    100_000,
    (i) => (during(i, 6_000, 0, 400) ? 8 * -Math.expm1(-(i % 6_000) / 300) : 0),
  ],
  ['coil-command', 'V', 100_000, (i) => (during(i, 6_000, 0, 400) ? 4.9 : 0.1)],
  ['injector-voltage', 'V', 100_000, injectorVolts],
  [
    'injector-current',
    'A',
    100_000,
    (i) => (during(i, 12_000, 0, 900) ? -Math.expm1(-(i % 12_000) / 150) : 0),
  ],
  [
    'starter-current',
    'A',
    50_000,
    (i) => (i < 5_000 ? 0 : 150 + 40 * Math.sin(i / 1_200) + 300 * Math.exp(-(i - 5_000) / 3_000)),
  ],
  [
    'supply-voltage',
    'V',
    50_000,
    (i) => (i < 5_000 ? 12.6 : 10.4 + 0.3 * Math.sin(i / 1_200) - 2 * Math.exp(-(i - 5_000) / 3_000)),
  ],
  ['fuel-pump-current', 'A', 50_000, (i) => 5 + 0.4 * Math.abs(Math.sin(i / 22))],
  ['other', 'V', 50_000, (i) => 3 * Math.sin(i / 80)],
];

function measured(circuit: Circuit, unit: string, rateHz: number, samples: Float32Array) {
  const axis = { kind: 'even', startS: 0, stepS: 1 / rateHz, count: samples.length } as const;
  const signal = { index: 0, name: '', circuit, unit, factor: 1, offset: 0, samples };
  return measureCapture({ axis, cylinders: 4, signals: [signal] });
}

const wave = made(5_000_000, (i) => (i % 400 < 180 ? 4.8 : 0.2), 0.1);
const curve = Float64Array.from(made(1 << 20, (i) => Math.sin(i / 15) + 0.3 * Math.sin(i / 4.7), 0.05));
const passMs = fastestMs(() => sum(wave), 7);
const levelsMs = fastestMs(() => {
  const states = stateLevels(wave)!;
  return crossings(wave, { level: states.mesial, hysteresis: 0.4 * (states.high - states.low) });
}, 5);
const peaksMs = fastestMs(() => findPeaks(curve, { distance: 20, prominence: 0.1 }), 5);
const spectrumMs = fastestMs(() => spectrum(curve, { sampleRateHz: 1 }), 5);
print('levels and crossings / summing pass', levelsMs / passMs, '<= 2');

const folder = mkdtempSync(join(tmpdir(), 'gapmark-bench-'));
try {
  writeFileSync(join(folder, 'wave'), wave);
  writeFileSync(join(folder, 'curve'), curve);
  const script = join(process.cwd(), 'bench', 'measuring.py');
  const python = ['/usr/bin/python3', 'python3']
    .map((program) =>
      spawnSync(program, [script, join(folder, 'wave'), join(folder, 'curve')], { encoding: 'utf8' }),
    )
    .find((run) => run.status === 0);
  if (!python)
    console.log('Python with NumPy and SciPy is not there: the comparison with them was left out.');
  else {
    const theirs = JSON.parse(python.stdout) as { levelsMs: number; peaksMs: number; spectrumMs: number };
    print('levels and crossings / NumPy', levelsMs / theirs.levelsMs, '<= 0.5');
    print('peaks / SciPy find_peaks', peaksMs / theirs.peaksMs, '<= 0.5');
    print('spectrum / NumPy rfft', spectrumMs / theirs.spectrumMs, '<= 6');
  }
} finally {
  rmSync(folder, { recursive: true, force: true });
}

const many = made(MILLIONS * 1e6, pickUp, 0.02);
const manyPassMs = fastestMs(() => sum(many), 5);
const crankMs = fastestMs(() => measured('crank-vr', 'V', 50_000, many));
print(`crank-vr, ${MILLIONS} M samples / summing pass`, crankMs / manyPassMs, '<= 12');

globalThis.gc?.();
const before = process.memoryUsage();
measured('crank-vr', 'V', 50_000, many);
const after = process.memoryUsage();
print(
  'memory grown in MB beside the samples',
  (after.rss - before.rss) / 1e6,
  `flat; samples are ${(many.byteLength / 1e6).toFixed(0)} MB`,
);

// Exponent of cost over samples: 1 is linear. A straight line through the logarithms.
const sizes = [0.1, 0.3, 1, 3, 10, ...(MILLIONS >= 50 ? [50] : [])].filter((size) => size <= MILLIONS);
const points = sizes.map((size) => {
  const part = many.subarray(0, size * 1e6);
  return [Math.log(size), Math.log(fastestMs(() => measured('crank-vr', 'V', 50_000, part)))] as const;
});
const meanX = points.reduce((all, [x]) => all + x, 0) / points.length;
const meanY = points.reduce((all, [, y]) => all + y, 0) / points.length;
const slope =
  points.reduce((all, [x, y]) => all + (x - meanX) * (y - meanY), 0) /
  points.reduce((all, [x]) => all + (x - meanX) ** 2, 0);
print(
  `crank-vr, exponent of cost over ${sizes[0]} to ${sizes[sizes.length - 1]} M samples`,
  slope,
  'about 1',
);

for (const [circuit, unit, rateHz, at] of circuits) {
  const samples = made(5_000_000, at, 0.02);
  const ms = fastestMs(() => measured(circuit, unit, rateHz, samples), 2);
  print(`${circuit}, 5 M samples / summing pass`, ms / passMs, 'no limit set');
}
