import type { Circuit } from '../../circuit.ts';
import { SHAPE_LENGTH } from './shape-of.ts';

/** Root of the summed squares between two shapes (Euclid). */
export function shapeDistance(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < SHAPE_LENGTH; i++) sum += (a[i]! - b[i]!) ** 2;
  return Math.sqrt(sum);
}

type Part = readonly [name: string, from: number, to: number];

const CRANK: readonly Part[] = [
  ['the trace about the gap', 0, 48],
  ['the swing around the turn', 48, 96],
  ['how much the teeth differ', 96, 127],
  ['the height of the swing', 127, 128],
];
const VOLTS: readonly Part[] = [
  ['up to switch-off', 0, 40],
  ['the kick', 40, 64],
  ['what follows the kick', 64, 128],
];
const EVENT: readonly Part[] = [
  ['the curve', 0, 127],
  ['the height', 127, 128],
];
const PARTS: Readonly<Partial<Record<Circuit, readonly Part[]>>> = {
  'crank-vr': CRANK,
  'crank-hall': CRANK,
  'coil-primary-voltage': VOLTS,
  'injector-voltage': VOLTS,
  'coil-primary-current': EVENT,
  'coil-command': EVENT,
  'injector-current': EVENT,
  'starter-current': [
    ['the inrush', 0, 32],
    ['the humps', 32, 128],
  ],
};

/** Below this a part of the shape is called alike. Our choice: about twice what noise and another speed make on simulated pairs. */
const ALIKE = 0.45;

/** Where two shapes are alike and where they part, in words. */
export function whyNear(circuit: Circuit, a: ArrayLike<number>, b: ArrayLike<number>): string {
  const parts = PARTS[circuit] ?? [['the shape', 0, SHAPE_LENGTH] as const];
  const alike: string[] = [];
  const apart: string[] = [];
  for (const [name, from, to] of parts) {
    let sum = 0;
    for (let i = from; i < to; i++) sum += (a[i]! - b[i]!) ** 2;
    (Math.sqrt(sum) < ALIKE ? alike : apart).push(name);
  }
  const list = (names: string[]) => names.join(', ');
  if (apart.length === 0) return `Alike: ${list(alike)}.`;
  if (alike.length === 0) return `Differs: ${list(apart)}.`;
  return `Alike: ${list(alike)}. Differs: ${list(apart)}.`;
}
