import type { Findings } from '../../capture.ts';
import { sortedRange } from '../../signal/range.ts';
import { quantileSorted } from '../../signal/statistics.ts';
import { absent } from '../../value.ts';
import { flatLine } from '../events/flat-line.ts';
import { inWords } from '../events/in-words.ts';
import { whole } from '../events/whole.ts';
import type { LoadStates } from '../switched-load/states.ts';
import { isSteady } from '../switched-load/steady.ts';
import type { MeasuredSignal } from '../types.ts';

/**
 * No switch-off: counts are 0 in a steady trace and unknown in one that moves without showing the driver on.
 *
 * @param calm the trace is known to be steady but for its hum.
 */
export function noEvent(
  signal: MeasuredSignal,
  states: LoadStates | null,
  reason: string,
  calm = false,
): Findings {
  const sorted = sortedRange(signal.values, 0, signal.values.length);
  const steady = calm || (states !== null && isSteady(signal.values, states));
  const level = sorted.length > 0 ? quantileSorted(sorted, 0.5) : null;
  const why = steady || !states ? reason : 'the trace moves, but shows no time with the driver on';
  return {
    values: [
      steady
        ? { key: 'firing_count', value: 0, unit: '1', evidence: whole(signal.axis) }
        : absent('firing_count', '1', why),
      absent('firing_interval', 'ms', why),
      absent('dwell', 'ms', why),
      steady && level !== null
        ? { key: 'supply_level', value: level, unit: 'V', evidence: whole(signal.axis) }
        : absent('supply_level', 'V', steady ? 'no samples' : why),
      absent('on_level', 'V', why),
      absent('on_level_slope', 'V/ms', why),
      absent('kick_peak', 'V', why),
      absent('burn_time', 'ms', why),
      absent('burn_level', 'V', why),
      absent('ring_count', '1', why),
      absent('missed_firings', '1', why),
    ],
    notices:
      steady && level !== null
        ? [
            flatLine(
              signal.axis,
              inWords(level, 'V'),
              'at feed voltage the driver never pulls the coil low (no crank signal, driver, command or immobiliser); near zero the ' +
                'coil has no feed, its winding is open, or the driver holds it down all the time',
            ),
          ]
        : [],
  };
}
