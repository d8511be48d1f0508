import type { Evidence, Notice } from '../../value.ts';
import { bounded } from '../events/bounded.ts';
import { counted } from '../events/in-words.ts';
import { stretch, whole } from '../events/whole.ts';
import { forgottenFactor, probeFactorNotice } from '../switched-load/input-notices.ts';
import type { MeasuredSignal } from '../types.ts';
import type { CoilTrace, Firing } from './firing.ts';

/** Below this a kick is low for a healthy primary (usual: some 100 to 400 V). Common practice, no source. */
const LOW_KICK_V = 90;

/** What a reader should know beside the numbers of this trace. */
export function coilNotices(
  signal: MeasuredSignal,
  trace: CoilTrace,
  firings: readonly Firing[],
  missed: number | null,
): readonly Notice[] {
  const { states } = trace;
  const kicks = firings.flatMap(({ kick }) => (kick ? [kick] : []));
  const highest = Math.max(Number.NEGATIVE_INFINITY, ...kicks.map((kick) => kick.peak));
  const factor = states.acCoupled || kicks.length === 0 ? null : forgottenFactor(states.rest);
  return [
    ...(factor === null ? [] : [probeFactorNotice(signal.axis, states.rest, highest, factor)]),
    ...kickNotices(trace, firings, factor === null && !states.acCoupled),
    ...burnNotices(trace, firings),
    ...(missed === null || missed === 0
      ? []
      : [
          {
            code: 'missed-firings',
            severity: 'bad' as const,
            text:
              `${counted(missed, 'firing')} seem to be missing: the time between some switch-offs is a multiple of the ordinary one. ` +
              'Usually the control unit lost the crank signal for a moment, or the command, feed or connector breaks. A coil shared by ' +
              'several cylinders with uneven firing looks the same; compare with the crank signal at that moment.',
            evidence: whole(signal.axis),
          },
        ]),
  ];
}

function kickNotices(trace: CoilTrace, firings: readonly Firing[], judgeHeight: boolean): Notice[] {
  const notices: Notice[] = [];
  const at = (wanted: (firing: Firing) => boolean): readonly Evidence[] =>
    bounded(
      firings
        .filter(wanted)
        .map(({ on, kick }) => stretch(trace.axis, on.end - 1, kick ? kick.to + 1 : on.end + 2)),
    );
  const add = (
    code: string,
    severity: Notice['severity'],
    text: string,
    wanted: (firing: Firing) => boolean,
  ) => {
    const evidence = at(wanted);
    if (evidence.length > 0) notices.push({ code, severity, text, evidence });
  };
  add(
    'kick-lower-bound',
    'watch',
    'The kick reaches the limit of the input, so its true height is unknown: the number is a lower bound. Use an attenuator or a wider range.',
    ({ kick }) => kick?.clipped === true,
  );
  add(
    'kick-undersampled',
    'watch',
    'Three samples or fewer catch the upper half of the kick, so its top may lie between them: the number is a lower bound. At least ' +
      `${rateThatWouldDo(trace)} would show it.`,
    ({ kick }) => kick !== null && !kick.clipped && kick.samples <= 3,
  );
  add(
    'kick-flat-top',
    'watch',
    "The kick's top is flat. Usually the driver's clamp (some 320 to 430 V in ignition drivers' data sheets) holds it because the gap did not break down: open " +
      'secondary, wide gap, lead or plug. The limit of the input looks the same, and then the number is a lower bound; compare it with the range that was set.',
    ({ kick, burn }) => kick?.flat === true && burn === null,
  );
  add(
    'kick-flat-top',
    'info',
    "The kick's top is flat although a burn line follows, so the gap did break down. The driver's clamp may hold the kick, or the input's limit cut it; " +
      'then the number is a lower bound.',
    ({ kick, burn }) => kick?.flat === true && burn !== null,
  );
  if (judgeHeight) {
    add(
      'low-kick',
      'watch',
      `The kick stays below ${LOW_KICK_V} V. Usual are some 100 to 400 V (common practice, no source). Shorted turns, a driver that opens slowly, a low feed, ` +
        'or a forgotten probe factor do that; so does an input that cannot follow. The trace alone does not tell which.',
      ({ kick }) => kick !== null && !kick.clipped && kick.samples > 3 && kick.peak < LOW_KICK_V,
    );
  }
  add(
    'no-kick',
    'bad',
    'The driver lets go and no kick follows: usually shorted turns, a load that is not a coil, a coil without current (feed, winding), or a driver that does ' +
      'not really open. Check the feed with the driver on, then the current with a clamp.',
    ({ kick }) => kick === null,
  );
  return notices;
}

function burnNotices(trace: CoilTrace, firings: readonly Firing[]): Notice[] {
  const without = firings.filter(({ kick, burn }) => kick !== null && burn === null);
  if (without.length === 0) return [];
  return [
    {
      code: 'no-burn-line',
      severity: 'bad',
      text:
        `${counted(without.length, 'kick')} of ${firings.length} ${without.length === 1 ? 'has' : 'have'} no burn line. Usually the spark did not ` +
        'jump: open secondary winding, lead, cap or plug, or a gap too wide for the coil. Never run a coil with its secondary open; check with a spark ' +
        'tester. The local extremes are then counted from the end of the kick.',
      evidence: bounded(without.map(({ on, over }) => stretch(trace.axis, on.end, over))),
    },
  ];
}

/** Ten samples on a kick some 20 µs wide at half its height (common practice, no source). */
function rateThatWouldDo(trace: CoilTrace): string {
  const { axis } = trace;
  const rateHz = axis.kind === 'even' ? 1 / axis.stepS : 0;
  return rateHz < 400_000 ? '500,000 samples a second' : '2 million samples a second';
}
