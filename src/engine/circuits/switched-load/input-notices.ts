import type { TimeAxis } from '../../capture.ts';
import type { Notice } from '../../value.ts';
import { inWords } from '../events/in-words.ts';
import { whole } from '../events/whole.ts';

/** Rest at zero and the on level below it: alternating-voltage coupling. */
export function acCoupledNotice(axis: TimeAxis): Notice {
  return {
    code: 'ac-coupled',
    severity: 'watch',
    text:
      'The trace rests at zero and goes below it when the driver is on, so the input seems to block direct voltage (AC coupling). ' +
      'Levels then mean nothing and are left out; times are still good. Set the input to DC and record again to see feed, on level and kick.',
    evidence: whole(axis),
  };
}

const COMMON_FACTORS = [10, 20, 50, 100] as const;
const USUAL_FEED = { low: 9, high: 15.5 };

/** The usual attenuation that would turn `rest` into a battery's voltage; null when none does or none is needed. */
export function forgottenFactor(rest: number): number | null {
  if (!(rest > 0) || rest >= 5) return null;
  return (
    COMMON_FACTORS.find((factor) => rest * factor >= USUAL_FEED.low && rest * factor <= USUAL_FEED.high) ??
    null
  );
}

/** A feed of about a tenth (a twentieth …) of a battery's voltage: the attenuator was not told to the scope. */
export function probeFactorNotice(axis: TimeAxis, rest: number, highest: number, factor: number): Notice {
  return {
    code: 'probe-factor',
    severity: 'watch',
    text:
      `The feed reads ${inWords(rest, 'V')} and the highest point ${inWords(highest, 'V')}: about a ${factor}th of what a 12 V ` +
      `circuit shows, so a ${factor}:1 probe or attenuator factor seems to be forgotten. Set the signal's factor to ${factor} if that is ` +
      'what was used; the recorded numbers stay. It cannot be told from the trace whether the feed really is that low.',
    evidence: whole(axis),
  };
}

/** Kicks point down: probe and ground were swapped, or the scale was turned over. */
export function upsideDownNotice(axis: TimeAxis): Notice {
  return {
    code: 'upside-down',
    severity: 'watch',
    text:
      'The switch-off kicks point down, which a load switched to ground cannot do: the probe and its ground seem to be swapped, or the ' +
      'trace is turned over. Nothing is measured from it. Set the factor to −1 if the leads were swapped, or record again.',
    evidence: whole(axis),
  };
}
