import { sampleCount, timeAt } from '../signal/time.ts';
import type { Found } from './align.ts';
import { overSeconds } from './over-seconds.ts';
import type { Side } from './types.ts';

const POINTS = 1024;
/** Below this the best lag says nothing: two unlike or flat signals. */
const LEAST = 0.6;

const durationS = (side: Side) => timeAt(side.axis, sampleCount(side.axis) - 1) - timeAt(side.axis, 0);

/** Mean 0, length 1; holes become 0. Null for a flat signal. */
function normalised(values: Float64Array): Float64Array | null {
  let sum = 0;
  let count = 0;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    sum += value;
    count += 1;
  }
  const mean = sum / count;
  let squares = 0;
  const centred = values.map((value) => (Number.isNaN(value) ? 0 : value - mean));
  for (const value of centred) squares += value * value;
  if (!(squares > 0)) return null;
  const norm = Math.sqrt(squares);
  return centred.map((value) => value / norm);
}

/** Lag of the highest normalised cross-correlation over lags of up to half the shorter signal. */
export function correlate(here: Side, reference: Side): Found {
  const none: Found = { by: 'none', shiftS: null, confidence: 0 };
  if (sampleCount(here.axis) < 2 || sampleCount(reference.axis) < 2) return none;
  const step = Math.min(durationS(here), durationS(reference)) / POINTS;
  if (!(step > 0)) return none;
  const startHere = timeAt(here.axis, 0);
  const startReference = timeAt(reference.axis, 0);
  const a = normalised(overSeconds(here, startHere, step, POINTS));
  const b = normalised(overSeconds(reference, startReference, step, POINTS));
  if (!a || !b) return none;
  let best = { lag: 0, value: -2 };
  for (let lag = -POINTS / 2; lag <= POINTS / 2; lag++) {
    let value = 0;
    const from = Math.max(0, -lag);
    const to = Math.min(POINTS, POINTS - lag);
    for (let i = from; i < to; i++) value += a[i]! * b[i + lag]!;
    if (value > best.value) best = { lag, value };
  }
  if (best.value < LEAST) return none;
  return {
    by: 'correlation',
    shiftS: startReference - startHere + best.lag * step,
    confidence: Math.min(best.value, 1) * 0.7,
  };
}
