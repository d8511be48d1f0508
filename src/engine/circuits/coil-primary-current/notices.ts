import type { Notice } from '../../value.ts';
import { bounded } from '../events/bounded.ts';
import { counted, inWords } from '../events/in-words.ts';
import { whole } from '../events/whole.ts';
import type { MeasuredSignal } from '../types.ts';
import type { ChargeShape } from './charge-shape.ts';
import type { CurrentTrace } from './trace.ts';

/** What a reader should know beside the numbers of a coil's current. Usual 3 to 20 A: common practice, no source. */
export function currentNotices(
  signal: MeasuredSignal,
  trace: CurrentTrace,
  shapes: readonly ChargeShape[],
): readonly Notice[] {
  const notices: Notice[] = [];
  const peak = Math.max(0, ...shapes.map((shape) => shape.peak));
  const add = (
    code: string,
    severity: Notice['severity'],
    text: string,
    wanted?: (shape: ChargeShape) => boolean,
  ) => {
    const evidence = wanted
      ? bounded(
          shapes.filter(wanted).map(({ startS, endS, charge }) => ({
            from: startS ?? endS - 1e-3 * Number(charge.first === null),
            to: endS,
          })),
        )
      : whole(signal.axis);
    if (evidence.length > 0) notices.push({ code, severity, text, evidence });
  };
  if (trace.reversed) {
    add(
      'clamp-reversed',
      'info',
      'The current points down: the clamp sits the other way round on the wire. It is measured as if turned; amperes are given as positive.',
    );
  }
  if (Math.abs(trace.zero) > Math.max(0.03 * peak, 3 * trace.noise)) {
    add(
      'clamp-zero',
      'info',
      `Without current the clamp shows ${inWords(trace.zero, signal.unit)}; that is taken off. Set the clamp to zero before recording.`,
    );
  }
  if (shapes.length > 0 && (peak < 1.5 || peak > 60)) {
    add(
      'probe-factor',
      'watch',
      `The current peaks at ${inWords(peak, signal.unit)}; ignition coils usually take some amperes (common practice, no source). The clamp's factor (100 mV/A, ` +
        '10 mV/A) may be forgotten or wrong: set it on the signal if so; the recorded numbers stay. The trace alone cannot tell.',
    );
  }
  const rail = signal.rail && (trace.reversed ? signal.rail.low : signal.rail.high);
  if (rail != null && peak > 0 && Math.abs(rail - trace.zero) <= 1.005 * peak + trace.noise) {
    add(
      'clipped',
      'watch',
      'The current reaches the limit of the input, so its peak is a lower bound and a flat top may be the input, not a limiter. Use a wider range.',
      () => true,
    );
  }
  add(
    'current-limited',
    'info',
    'The current is held flat before the switch-off although the rise would have gone further: usually the driver limits it. A long flat means that the dwell is ' +
      'longer than this coil needs at this feed; it does not tell a good coil from a bad one.',
    (shape) => shape.limiter,
  );
  add(
    'early-flat',
    'watch',
    'The current has run up to the end of its own curve and stays there: feed voltage over the resistance of the circuit sets it. A low and early flat usually means high ' +
      'resistance in feed, ground, connector or winding; compare with the known-good and measure the voltage drop while it flows.',
    (shape) => shape.flat && !shape.limiter,
  );
  add(
    'current-step',
    'bad',
    'The current jumps at once when the driver switches on, before the L/R curve begins: usually shorted turns in the coil. A second load on the same wire looks the ' +
      'same; clamp the coil alone before replacing it.',
    (shape) => shape.step > 0,
  );
  const bent = shapes.filter((shape) => shape.bendsUp).length;
  add(
    'bends-upwards',
    'info',
    `${counted(bent, 'charge')} of ${shapes.length} get steeper towards the end instead of flattening: the core saturates, as with a dwell that is long for the coil. No time ` +
      'constant is given for these.',
    (shape) => shape.bendsUp,
  );
  return notices;
}
