import type { Findings } from '../capture.ts';
import { rangeMedian } from '../signal/range.ts';
import { absent, type Value } from '../value.ts';
import { bounded } from './events/bounded.ts';
import { flatLine } from './events/flat-line.ts';
import { inWords } from './events/in-words.ts';
import { stretch } from './events/whole.ts';
import { type Balance, compressionBalance } from './starter-current/balance.ts';
import { type Compressions, findCompressions } from './starter-current/compressions.ts';
import { type Cranking, findCranking, inrushPeak, meansTimeAt } from './starter-current/cranking.ts';
import { AGREE, starterNotices } from './starter-current/notices.ts';
import type { MeasuredSignal } from './types.ts';

const NO_HUMPS = 'no compression stands out from the noise';

/**
 * Current of the starter from a clamp on the battery cable: inrush, then one hump a compression. `cylinders` of a
 * four-stroke engine turn the compression rate into a speed: rate · 120 / cylinders.
 */
export function measureStarterCurrent(signal: MeasuredSignal, cylinders: number | null): Findings {
  const { values, axis, unit } = signal;
  const cranking = findCranking(values, axis);
  if (!cranking) return noCranking(signal);
  const inrush = inrushPeak(values, axis, cranking);
  const compressions = findCompressions(cranking);
  const rate = compressions ? agreedRate(compressions) : null;
  const rpm = rate !== null && cylinders !== null && cylinders > 0 ? (rate * 120) / cylinders : null;
  const balance =
    compressions && cylinders !== null ? compressionBalance(compressions.humps, cylinders) : null;

  const span = compressions ? humpSpan(cranking, compressions) : null;
  const evidence = span ? [span] : [];
  const rateReason = compressions ? 'spectrum and humps do not agree' : NO_HUMPS;
  return {
    values: [
      inrush && cranking.startSeen
        ? { key: 'inrush_peak', value: inrush.value, unit, evidence: [stretch(axis, inrush.at, inrush.at)] }
        : absent('inrush_peak', unit, 'the capture begins while the starter is already turning'),
      span
        ? { key: 'cranking_mean', value: meanOver(cranking, span.from, span.to), unit, evidence }
        : absent('cranking_mean', unit, `${NO_HUMPS}, so there is no third hump to begin with`),
      rate === null
        ? absent('compression_rate', 'Hz', rateReason, evidence)
        : { key: 'compression_rate', value: rate, unit: 'Hz', n: compressions!.humps.length, evidence },
      rpm === null
        ? absent('rpm_mean', 'rpm', rate === null ? rateReason : 'the number of cylinders is not known')
        : { key: 'rpm_mean', value: rpm, unit: 'rpm', n: compressions!.humps.length, evidence },
      balanceValue(balance, cranking, compressions, cylinders),
    ],
    notices: starterNotices(signal, cranking, compressions, balance, rpm, inrush?.value ?? null),
  };
}

/** From humps, which count exactly; null where the spectrum says otherwise. */
function agreedRate({ rateByHumpsHz, rateBySpectrumHz }: Compressions): number | null {
  const agree = rateBySpectrumHz !== null && Math.abs(rateBySpectrumHz / rateByHumpsHz - 1) <= AGREE;
  return agree ? rateByHumpsHz : null;
}

/** From the top of the third hump to the top of the last: whole humps, so that the mean is not tilted by a part of one. */
function humpSpan({ means }: Cranking, { humps }: Compressions) {
  return { from: meansTimeAt(means, humps[0]!.at), to: meansTimeAt(means, humps[humps.length - 1]!.at) };
}

function meanOver({ means }: Cranking, fromS: number, toS: number): number {
  const from = Math.round((fromS - means.startS) / means.stepS);
  const to = Math.round((toS - means.startS) / means.stepS);
  let sum = 0;
  for (let i = from; i < to; i += 1) sum += means.values[i]!;
  return sum / (to - from);
}

function balanceValue(
  balance: Balance | null,
  { means }: Cranking,
  compressions: Compressions | null,
  cylinders: number | null,
): Value {
  if (!compressions) return absent('compression_balance', '%', NO_HUMPS);
  if (cylinders === null) return absent('compression_balance', '%', 'the number of cylinders is not known');
  if (!balance) return absent('compression_balance', '%', 'fewer complete compressions than cylinders');
  const half = 0.5 / compressions.rateByHumpsHz;
  const evidence = compressions.humps.map(({ at }) => ({
    from: meansTimeAt(means, at) - half,
    to: meansTimeAt(means, at) + half,
  }));
  const { value, n, min, max, sd } = balance;
  return { key: 'compression_balance', value, unit: '%', n, min, max, sd, evidence: bounded(evidence) };
}

function noCranking(signal: MeasuredSignal): Findings {
  const { values, axis, unit } = signal;
  const level = rangeMedian(values, 0, values.length);
  const reason = level === null ? 'no samples to measure' : 'no starter current in the capture';
  return {
    values: [
      absent('inrush_peak', unit, reason),
      absent('cranking_mean', unit, reason),
      absent('compression_rate', 'Hz', reason),
      absent('rpm_mean', 'rpm', reason),
      absent('compression_balance', '%', reason),
    ],
    notices:
      level === null
        ? []
        : [
            flatLine(
              axis,
              inWords(level, unit),
              'the starter was not energised, the clamp is off, open or on another wire, or its factor (10 mV/A, 1 mV/A) was forgotten',
            ),
          ],
  };
}
