import type { Found } from './align.ts';
import type { Side } from './types.ts';

const measuredOf = (side: Side, key: string) =>
  side.measured.find((value) => value.key === key)?.value ?? null;
const numberOf = (side: Side, key: string): number | null => {
  const value = measuredOf(side, key);
  return typeof value === 'number' && value > 0 ? value : null;
};

/** A two-wire swing turned over against the reference. */
export function turnedOver(here: Side, reference: Side): boolean {
  const a = measuredOf(here, 'polarity');
  const b = measuredOf(reference, 'polarity');
  return a !== null && b !== null && a !== b;
}

/** Quantities that one part has much the same in every recording of a circuit, so that a power of ten between them is the probe's. */
const STEADY = [
  'kick_peak',
  'supply_level',
  'level_high',
  'peak_current',
  'clamp_peak',
  'rest_level',
  'inrush_peak',
];
const FACTORS = [10, 20, 100, 1000];
const NEAR = 0.25;

/** The factor of a probe or clamp that was likely left out: how many times larger here, or null. */
function factorBetween(here: Side, reference: Side): number | null {
  for (const key of STEADY) {
    const a = numberOf(here, key);
    const b = numberOf(reference, key);
    if (a === null || b === null) continue;
    for (const factor of FACTORS)
      for (const times of [factor, 1 / factor]) if (Math.abs(Math.log(a / b / times)) < NEAR) return times;
    return null;
  }
  return null;
}

/** What the two sides differ in before they can be compared, in words: said, not hidden. */
export function allowances(here: Side, reference: Side, found: Found): string[] {
  const notes: string[] = [];
  if (turnedOver(here, reference))
    notes.push(
      'The polarity is the other way round here; for the overlay the trace is turned over. The sensor’s wires or only the probe leads may be swapped.',
    );
  const times = factorBetween(here, reference);
  if (times !== null)
    notes.push(
      times > 1
        ? `Everything is about ${times} times as large here: probably a probe factor of ${times}:1 is missing in the reference, or applied twice here.`
        : `Everything is about ${Math.round(1 / times)} times smaller here: probably the probe’s factor is not set for this capture. Set it and compare again.`,
    );
  const turning = here.circuit.startsWith('crank-') || here.circuit.startsWith('cam-');
  if (here.circuit.startsWith('cam-') && (!here.wheel || !reference.wheel)) {
    const where =
      !here.wheel && !reference.wheel ? 'either capture' : !here.wheel ? 'this capture' : 'the reference';
    notes.push(
      `There is no crank signal with a gap in ${where}, so the cam’s angle to the crank cannot be compared: only its levels and edges.`,
    );
  } else if (turning && (!here.wheel || !reference.wheel))
    notes.push(
      `No repeating tooth pattern was found in ${!here.wheel ? 'this capture' : 'the reference'}; the two cannot be laid over crank degrees.`,
    );
  if (here.wheel && reference.wheel && turning && here.wheel.pattern !== reference.wheel.pattern)
    notes.push(
      `The wheels differ: ${here.wheel.pattern} here, ${reference.wheel.pattern} in the reference. Probably another engine.`,
    );
  if (turning && here.circuit.endsWith('-vr') && found.by === 'reference mark')
    notes.push(
      'The swing is drawn at the reference’s size, since it grows with speed and a closer gap; the table has both.',
    );
  if (here.wheel && reference.wheel && turning) {
    const turns = Math.min(here.wheel.marksS.length, reference.wheel.marksS.length) - 1;
    if (turns < 2)
      notes.push(
        `Only ${turns < 1 ? 'part of a turn' : 'one whole turn'} was recorded on one side: what repeats cannot be told from what happened once.`,
      );
  }
  return notes;
}
