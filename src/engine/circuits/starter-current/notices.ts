import { atHighRail, atLowRail } from '../../signal/rail.ts';
import type { Notice } from '../../value.ts';
import { inWords } from '../events/in-words.ts';
import { whole } from '../events/whole.ts';
import type { MeasuredSignal } from '../types.ts';
import type { Balance } from './balance.ts';
import type { Compressions } from './compressions.ts';
import type { Cranking } from './cranking.ts';

/** The two ways to the rate must agree within this share. */
export const AGREE = 0.05;
/** A compression this much lower than the mean, and clearly so, is worth a sentence. Common practice, no source. */
const WEAK_PERCENT = -20;

export function starterNotices(
  signal: MeasuredSignal,
  cranking: Cranking,
  compressions: Compressions | null,
  balance: Balance | null,
  rpm: number | null,
  inrush: number | null,
): readonly Notice[] {
  const notices: Notice[] = [];
  const add = (code: string, severity: Notice['severity'], text: string) =>
    notices.push({ code, severity, text, evidence: whole(signal.axis) });
  if (cranking.reversed) {
    add(
      'clamp-reversed',
      'info',
      'The current points down: the clamp sits the other way round. It is measured as if turned; amperes are given as positive.',
    );
  }
  const cut =
    inrush !== null &&
    (cranking.reversed ? atLowRail(-inrush, signal.rail) : atHighRail(inrush, signal.rail));
  if (cut) {
    add(
      'inrush-lower-bound',
      'watch',
      'The inrush reaches the limit of the input, so its peak is a lower bound. Use a wider range or a larger clamp.',
    );
  }
  if (compressions === null) {
    add(
      'no-humps',
      'watch',
      `The current (${inWords(cranking.level, signal.unit)}) shows no regular humps. An engine that turns fast and evenly without them has no compression (timing belt); a very high current ` +
        'without them means that the engine does not turn: stop, and look for liquid in a cylinder or a seized part before cranking again. A short or noisy capture shows none either.',
    );
    return notices;
  }
  const { rateByHumpsHz, rateBySpectrumHz } = compressions;
  if (rateBySpectrumHz !== null && Math.abs(rateBySpectrumHz / rateByHumpsHz - 1) > AGREE) {
    add(
      'rates-disagree',
      'watch',
      `The humps give ${rateByHumpsHz.toFixed(2)} compressions a second and the spectrum ${rateBySpectrumHz.toFixed(2)}. The speed changes a lot, humps are missing, or something else pulses; the rate is left out.`,
    );
  }
  const weakest = balance ? Math.min(...balance.value) : 0;
  if (balance && weakest < WEAK_PERCENT) {
    const place = balance.value.indexOf(weakest);
    const error = balance.sd[place]! / Math.sqrt(balance.n);
    if (balance.n >= 2 && -weakest > 3 * error) {
      add(
        'uneven-compression',
        'bad',
        `Compression ${place + 1} in the order of the capture draws ${Math.round(-weakest)} % less than the mean. Usually that cylinder has less compression. The trace does not say ` +
          'which cylinder it is without a cam or ignition signal, nor why; prove it with a gauge.',
      );
    }
  }
  if (rpm !== null && rpm < 120) {
    add(
      'slow-cranking',
      'watch',
      `The engine is cranked at ${Math.round(rpm)} rev/min; usual are 150 to 300 (common practice, no source). Look at battery, cables, starter and drag first. Liquid in a cylinder also slows it: stop, plugs out first.`,
    );
  }
  return notices;
}
