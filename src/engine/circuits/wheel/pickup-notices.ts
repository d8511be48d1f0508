import type { Extent } from '../../signal/levels.ts';
import { quantile } from '../../signal/statistics.ts';
import { timeAt } from '../../signal/time.ts';
import type { Evidence, Notice, Value } from '../../value.ts';
import type { MeasuredSignal } from '../types.ts';
import type { Passages } from './passages.ts';

/** What a two-wire trace says about its own recording: leads, clipping, sample rate, a floating input. */
export function pickupNotices(
  signal: MeasuredSignal,
  span: Extent,
  passages: Passages,
  polarity: Value,
): Notice[] {
  const all: Evidence[] = [
    { from: timeAt(signal.axis, passages.at[0]!), to: timeAt(signal.axis, passages.at[passages.count - 1]!) },
  ];
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
  const low = lowRate(signal, passages);
  if (low) out.push({ ...low, evidence: all });
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

/** Fewest samples in the shortest tooth period for crossings to be placed well. */
const FEWEST_SAMPLES = 8;

function lowRate(signal: MeasuredSignal, passages: Passages): Omit<Notice, 'evidence'> | null {
  const intervals = passages.at.slice(1).map((at, k) => at - passages.at[k]!);
  const short = quantile(intervals, 0.05);
  if (short === null || short >= FEWEST_SAMPLES) return null;
  const step =
    (timeAt(signal.axis, passages.at[passages.count - 1]!) - timeAt(signal.axis, passages.at[0]!)) /
    (passages.at[passages.count - 1]! - passages.at[0]!);
  const rate = roundUp((1 / step) * (20 / short));
  return {
    code: 'low-sample-rate',
    severity: short < 5 ? 'bad' : 'watch',
    text: `Only about ${short.toFixed(1)} samples fall on the shortest tooth period. Heights and tooth-to-tooth speed are coarse, and teeth may be missed. About ${rate.toLocaleString('en-US')} samples a second would do at this speed.`,
  };
}

function roundUp(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  const lead = [1, 2, 5, 10].find((step) => step * power >= value) ?? 10;
  return lead * power;
}
