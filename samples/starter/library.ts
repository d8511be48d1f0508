import { STARTER_ENGINES, type StarterEngine } from './engines.ts';
import { FAULT_WORDS, type StarterFault } from './faults.ts';
import { csvOf, RECORDERS, type RecordingKind } from './record.ts';

/** One recording of the starting library. `title` names it for good: seeding that was broken off goes on by it. */
export interface StarterItem {
  readonly title: string;
  readonly text: string;
  readonly kind: RecordingKind;
  readonly engine: StarterEngine;
  readonly condition: 'cranking' | 'idle';
  readonly fault: StarterFault;
  readonly csv: () => string;
}

/** How many of each are kept as known-good on every engine: three make a band. */
const KEPT: Readonly<Record<RecordingKind, number>> = {
  'crank and cam': 3,
  coil: 3,
  injector: 3,
  starter: 2,
};
const IDLE_RPM = 820;

function item(
  kind: RecordingKind,
  engine: StarterEngine,
  seed: number,
  more: { readonly fault?: StarterFault; readonly rpm?: number; readonly vehicle: string },
): StarterItem {
  const { fault = 'none', rpm, vehicle } = more;
  const condition = rpm === undefined ? 'cranking' : 'idle';
  return {
    title: `${engine.model} ${kind}, ${condition}, ${vehicle}`,
    text: `Simulated: ${kind}, ${FAULT_WORDS[fault]}.`,
    kind,
    engine,
    condition,
    fault,
    csv: () => csvOf(RECORDERS[kind](engine, { seed, fault, ...(rpm === undefined ? {} : { rpm }) }), seed),
  };
}

/** What is sound, to be kept as known-good: 7 engines, 82 recordings. */
export const STARTER_KNOWN_GOODS: readonly StarterItem[] = STARTER_ENGINES.flatMap((engine, at) => [
  ...Object.entries(KEPT).flatMap(([kind, count]) =>
    Array.from({ length: count }, (_, i) =>
      item(kind as RecordingKind, engine, 1000 + at * 100 + i * 7 + kind.length, {
        vehicle: `vehicle ${i + 1}`,
      }),
    ),
  ),
  ...(at < 5
    ? [item('crank and cam', engine, 1090 + at * 100, { rpm: IDLE_RPM + 15 * at, vehicle: 'vehicle 1' })]
    : []),
]);

/** Faults to practise on; the titles do not give the fault away. */
const PRACTICE: readonly (readonly [RecordingKind, StarterFault, number])[] = [
  ['crank and cam', 'wide air gap', 0],
  ['crank and cam', 'chipped tooth', 0],
  ['crank and cam', 'bent wheel', 1],
  ['crank and cam', 'reversed wires', 1],
  ['crank and cam', 'belt slipped one tooth', 2],
  ['crank and cam', 'belt slipped two teeth', 4],
  ['coil', 'shorted turns', 0],
  ['coil', 'open secondary', 1],
  ['coil', 'weak driver', 2],
  ['starter', 'low supply', 3],
  ['starter', 'no compression', 4],
  ['starter', 'one weak cylinder', 0],
  ['injector', 'injector without hump', 5],
];

export const STARTER_PRACTICE: readonly StarterItem[] = PRACTICE.map(([kind, fault, at], i) =>
  item(kind, STARTER_ENGINES[at]!, 5000 + i * 11, { fault, vehicle: `case ${i + 1}` }),
);
