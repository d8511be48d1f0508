import type { Circuit } from '../../../src/engine/circuit.ts';
import type { MeasuredSignal } from '../../../src/engine/circuits/types.ts';
import { normal } from '../fixtures/random.ts';

export const CONDITIONS = [
  'clean',
  'noise',
  'hum',
  'offset',
  '8-bit',
  'clipped',
  'inverted',
  'undersampled',
  'dead',
  'floating',
  'one event',
  'cut ends',
  'running up',
] as const;
export type Condition = (typeof CONDITIONS)[number];

export interface Scope {
  readonly circuit: Circuit;
  readonly unit: string;
  readonly rateHz: number;
  readonly fromS: number;
  readonly toS: number;
  readonly seed: number;
  /** White noise, rms, and hum at 50 Hz, peak, in the signal's unit. */
  readonly noise: number;
  readonly hum?: number;
  readonly offset?: number;
  readonly sign?: 1 | -1;
  /** Range of an 8-bit converter. */
  readonly eightBit?: readonly [number, number];
  /** Highest number that the input gives, and whether the file names it. */
  readonly clipAt?: number;
  readonly railNamed?: boolean;
}

/** Samples a function of time as a scope would, and prints it to four figures as its CSV does. */
export function recorded(scope: Scope, at: (timeS: number) => number): MeasuredSignal {
  const { circuit, unit, rateHz, fromS, toS, noise, hum = 0, offset = 0, sign = 1 } = scope;
  const next = normal(scope.seed);
  const clipAt = scope.clipAt === undefined ? undefined : Number(scope.clipAt.toPrecision(4));
  const count = Math.floor((toS - fromS) * rateHz);
  const values = new Float32Array(count);
  for (let i = 0; i < count; i += 1) {
    const t = fromS + i / rateHz;
    let value = sign * at(t) + offset + noise * next() + hum * Math.sin(2 * Math.PI * 50 * t);
    if (scope.eightBit) {
      const [low, high] = scope.eightBit;
      const step = (high - low) / 255;
      value = low + step * Math.round((Math.min(high, Math.max(low, value)) - low) / step);
    }
    if (clipAt !== undefined) value = Math.min(value, clipAt);
    values[i] = Number(value.toPrecision(4));
  }
  return {
    circuit,
    name: 'simulated',
    unit,
    values,
    axis: { kind: 'even', startS: fromS, stepS: 1 / rateHz, count },
    rail: scope.railNamed && clipAt !== undefined ? { low: null, high: clipAt } : null,
  };
}

/** Times at which events end: evenly apart, one alone, or running up from slow to fast. */
export function eventTimes(condition: Condition, everyS: number, next: () => number): number[] {
  const firstS = 0.03 + 0.3 * everyS * next();
  if (condition === 'one event') return [firstS];
  const intervals = condition === 'running up' ? [2.1, 1.5, 1.2, 1.05, 1, 1, 1] : [1, 1, 1, 1, 1];
  const times = [firstS];
  for (const share of intervals)
    times.push(times[times.length - 1]! + share * everyS * (1 + 0.01 * (next() - 0.5)));
  return times;
}
