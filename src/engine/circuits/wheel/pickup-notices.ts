import type { Extent } from '../../signal/levels.ts';
import { timeAt } from '../../signal/time.ts';
import type { Evidence, Notice, Value } from '../../value.ts';
import type { MeasuredSignal } from '../types.ts';
import type { Passages } from './passages.ts';
import { lowRateNotice, PICKUP, type Sampling } from './sample-rate.ts';

/** What a two-wire trace says about its own recording: leads, clipping, sample rate, a floating input. */
export function pickupNotices(
  signal: MeasuredSignal,
  span: Extent,
  passages: Passages,
  sampling: Sampling,
  polarity: Value,
): Notice[] {
  const out: Notice[] = [];
  if (polarity.value === 'inverted') {
    out.push({
      code: 'polarity-inverted',
      severity: 'info',
      text: "Between these two leads the tooth's centre is at the rising crossing. Swapped probe leads look the same as swapped sensor wires: this is a fault only if a known-good taken with the same lead order, or the wiring diagram, says otherwise.",
      evidence: polarity.evidence,
    });
  }
  const clipped = clippedEvidence(signal, span);
  if (clipped.length > 0) {
    out.push({
      code: 'clipped-peaks',
      severity: 'watch',
      text: 'Peaks of this trace are cut flat at one value: the input was over its range there. Heights are lower bounds; the teeth and the speed are not affected. Choose a wider range or a 10:1 probe and record again if height matters.',
      evidence: clipped,
    });
  }
  const low = lowRateNotice(signal.axis, passages.at, sampling, PICKUP, 'the shortest tooth period');
  if (low) out.push(low);
  return out;
}

/** At least this many equal samples in a row at an end of the range, several times over, are no round peak. */
const FLAT_SAMPLES = 4;
const FLAT_PLACES = 3;

function clippedEvidence(signal: MeasuredSignal, span: Extent): Evidence[] {
  const { values, axis, rail } = signal;
  const high = rail?.high ?? span.highest;
  const low = rail?.low ?? span.lowest;
  const out: Evidence[] = [];
  let places = 0;
  let run = 0;
  for (let i = 0; i <= values.length; i += 1) {
    const value = values[i];
    if (value !== undefined && (value >= high || value <= low)) {
      run += 1;
      continue;
    }
    if (run >= FLAT_SAMPLES) {
      places += 1;
      if (out.length < 50) out.push({ from: timeAt(axis, i - run), to: timeAt(axis, i - 1) });
    }
    run = 0;
  }
  return places >= FLAT_PLACES ? out : [];
}
