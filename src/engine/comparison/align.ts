import type { Evidence } from '../value.ts';
import { correlate } from './correlate.ts';
import { firstRisingEdgeS } from './first-edge.ts';
import type { Alignment, Side } from './types.ts';

/** Moments of switch-off of coils and injectors: the ends of the events behind the width. */
function switchOffS(side: Side): number | null {
  const width = side.measured.find((value) => value.key === 'dwell' || value.key === 'pulse_width');
  if (!width || width.value === null) return null;
  const first: Evidence | undefined = width.evidence[0];
  return first?.to ?? null;
}

const SWITCHED = new Set([
  'coil-primary-voltage',
  'coil-primary-current',
  'injector-voltage',
  'injector-current',
]);

export type Found = Pick<Alignment, 'by' | 'shiftS' | 'confidence'>;

/**
 * Where two signals are laid on each other: at the reference mark when both have a wheel and belong to it; at the first
 * switch-off for coils and injectors; at the first rising edge for signals of two levels; else by best correlation.
 */
export function align(here: Side, reference: Side): Found {
  if (SWITCHED.has(here.circuit)) {
    const a = switchOffS(here);
    const b = switchOffS(reference);
    if (a !== null && b !== null) return { by: 'switch-off', shiftS: b - a, confidence: 0.95 };
  }
  const turning = here.circuit.startsWith('crank-') || here.circuit.startsWith('cam-');
  if (turning && here.wheel && reference.wheel) {
    const samePattern = here.wheel.pattern === reference.wheel.pattern;
    const shiftS = reference.wheel.marksS[0]! - here.wheel.marksS[0]!;
    return { by: 'reference mark', shiftS, confidence: samePattern ? 0.98 : 0.5 };
  }
  const a = firstRisingEdgeS(here);
  const b = firstRisingEdgeS(reference);
  if (a !== null && b !== null) return { by: 'edge', shiftS: b - a, confidence: turning ? 0.4 : 0.7 };
  return correlate(here, reference);
}
