import { atHighRail } from '../../signal/rail.ts';
import type { Notice } from '../../value.ts';
import { bounded } from '../events/bounded.ts';
import { inWords } from '../events/in-words.ts';
import { stretch, whole } from '../events/whole.ts';
import { acCoupledNotice, forgottenFactor, probeFactorNotice } from '../switched-load/input-notices.ts';
import type { LoadStates } from '../switched-load/states.ts';
import type { MeasuredSignal } from '../types.ts';
import type { InjectorPulse } from './pulse.ts';

/** What a reader should know beside the numbers of an injector's voltage. */
export function injectorNotices(
  signal: MeasuredSignal,
  states: LoadStates & { readonly on: number },
  pulses: readonly InjectorPulse[],
): readonly Notice[] {
  const { axis } = signal;
  const notices: Notice[] = states.acCoupled ? [acCoupledNotice(axis)] : [];
  const add = (
    code: string,
    severity: Notice['severity'],
    text: string,
    wanted: (pulse: InjectorPulse) => boolean,
  ) => {
    const evidence = bounded(pulses.filter(wanted).map(({ on, over }) => stretch(axis, on.start ?? 0, over)));
    if (evidence.length > 0) notices.push({ code, severity, text, evidence });
  };
  const highest = Math.max(states.rest, ...pulses.map((pulse) => pulse.clamp?.peak ?? states.rest));
  const factor = states.acCoupled ? null : forgottenFactor(states.rest);
  if (factor !== null) notices.push(probeFactorNotice(axis, states.rest, highest, factor));
  add(
    'kick-lower-bound',
    'watch',
    'The switch-off spike reaches the limit of the input, so its true height is unknown: the number is a lower bound. Use an attenuator or a wider range.',
    ({ clamp }) => clamp !== null && atHighRail(clamp.peak, signal.rail),
  );
  add(
    'no-kick',
    'watch',
    'The driver lets go and no spike follows. Usually no current flowed (open winding, no feed behind the measuring point), a diode or resistor across the injector takes the ' +
      'spike, or a test lamp hangs on the wire in place of the injector. Check feed and resistance, then the current with a clamp.',
    ({ on, clamp }) => on.end !== null && on.end < signal.values.length - 2 && clamp === null,
  );
  add(
    'chopped',
    'info',
    'The driver chops while it holds the injector (peak and hold); the pulse is measured from the first switch-on to the last release.',
    ({ on }) => on.chopped,
  );
  if (!states.acCoupled && factor === null && states.on > Math.max(1.5, 0.15 * states.rest)) {
    notices.push({
      code: 'high-on-level',
      severity: 'watch',
      text:
        `With the driver on the voltage stays at ${inWords(states.on, 'V')}. Usual is well under 1 V to about 1.5 V (common practice, no source): resistance in the driver's ` +
        "ground or the wrong reference for the probe's ground. Some drivers hold a current by staying half open; compare with the known-good.",
      evidence: whole(axis),
    });
  }
  return notices;
}
