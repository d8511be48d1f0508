import type { TimeAxis } from '../../capture.ts';
import { timeAt } from '../../signal/time.ts';
import type { Evidence, Notice } from '../../value.ts';
import { bounded } from '../events/bounded.ts';
import { inWords } from '../events/in-words.ts';
import { whole } from '../events/whole.ts';
import { forgottenFactor, probeFactorNotice } from '../switched-load/input-notices.ts';
import type { MeasuredSignal } from '../types.ts';

/** A control unit resets somewhere below this. From memory, no source. */
const RESET_V = 7;
const SHORTEST_S = 1e-3;

export function supplyNotices(
  signal: MeasuredSignal,
  rest: number | null,
  level: number,
  highest: number,
): readonly Notice[] {
  const { axis } = signal;
  const notices: Notice[] = [];
  const twelveVolts = level > 6 && (rest ?? level) < 17;
  const dips = twelveVolts ? stretchesBelow(signal, RESET_V) : [];
  if (dips.length > 0) {
    notices.push({
      code: 'deep-dip',
      severity: 'bad',
      text:
        `The supply drops below ${RESET_V} V. Somewhere below that a control unit may reset (from memory, no source; the maker's figure decides), and then neither spark nor injection comes. ` +
        'Usually a weak battery, a bad cable or connection, or a starter that draws too much: measure the voltage drop of each cable while cranking. The trace shows the point where the probe was, not the control unit’s own pin.',
      evidence: bounded(dips),
    });
  }
  const factor = forgottenFactor(level);
  if (factor !== null) notices.push(probeFactorNotice(axis, level, highest, factor));
  if (factor === null && Math.abs(level) < 1) {
    notices.push({
      code: 'near-zero',
      severity: 'watch',
      text:
        `The supply reads ${inWords(level, 'V')}. A flat line near zero does not show where it comes from: no supply at this point (fuse, relay, wire), an input set to block direct voltage ` +
        '(AC coupling), or a probe that does not touch.',
      evidence: whole(axis),
    });
  }
  return notices;
}

/** The whole trace below zero: probe and ground were swapped, or the scale was turned over. */
export function upsideDownSupply(axis: TimeAxis): Notice {
  return {
    code: 'upside-down',
    severity: 'watch',
    text:
      'The supply stays below zero: the probe and its ground seem to be swapped, or the trace is turned over. Levels are left out. Set the factor to −1 if the ' +
      'leads were swapped, or record again.',
    evidence: whole(axis),
  };
}

/** Stretches of at least 1 ms below `level`. */
function stretchesBelow({ values, axis }: MeasuredSignal, level: number): Evidence[] {
  const found: Evidence[] = [];
  let from = -1;
  for (let i = 0; i <= values.length; i += 1) {
    const below = i < values.length && values[i]! < level;
    if (below && from < 0) from = i;
    if (!below && from >= 0) {
      const part = { from: timeAt(axis, from), to: timeAt(axis, i - 1) };
      if (part.to - part.from >= SHORTEST_S) found.push(part);
      from = -1;
    }
  }
  return found;
}
