import type { Circuit } from '../circuit.ts';
import { PLAY_DEG } from './cam-shift.ts';
import type { Alignment, CamShift, Row, Says } from './types.ts';
import { nameOf } from './words.ts';

/**
 * What the table says to somebody who has to act on it. "Usually" and "Next" are common practice, no source: they name what is
 * looked at first, never a part as the cause.
 */
export function saysOf(
  circuit: Circuit,
  alignment: Alignment,
  rows: readonly Row[],
  shift: CamShift | null,
): Says {
  const outside = rows.filter((row) => row.verdict === 'outside');
  const inside = rows.filter((row) => row.verdict === 'inside');
  const names = [...new Set(outside.map(nameOf))];
  const few = names.slice(0, 5).join(', ') + (names.length > 5 ? ` and ${names.length - 5} more` : '');
  const measured =
    outside.length === 0
      ? `Nothing lies outside; ${inside.length} of ${rows.length} values agree.`
      : `Outside: ${few}. ${inside.length} of ${rows.length} values agree.`;
  const [usually, next] = adviceOf(circuit, new Set(outside.map((row) => row.key)), shift);
  return { measured, usually, next, cannotTell: cannotTell(circuit, alignment, rows) };
}

const LOOK_ELSEWHERE = [
  'A signal that agrees with its reference is seldom what keeps the engine from starting.',
  'Go on with the next check of the job.',
] as const;

function adviceOf(
  circuit: Circuit,
  outside: ReadonlySet<string>,
  shift: CamShift | null,
): readonly [usually: string, next: string] {
  if (shift !== null && Math.abs(shift.deg) >= PLAY_DEG)
    return [
      'All edges moved alike: the belt or chain sits off, or the cam wheel or its adjuster turned. With a cam adjuster, compare only captures of one condition.',
      'Do not crank further: belt slip is suspected. Covers off, engine to its mark, look at the timing marks as the maker describes.',
    ];
  if (outside.size === 0) return LOOK_ELSEWHERE;
  if (outside.has('wheel_pattern') || outside.has('teeth_present') || outside.has('edges_per_cycle'))
    return [
      'Another wheel than in the reference, or teeth or edges that are lost.',
      'Make sure that the reference is of this engine; then look at wheel, sensor seat and wiring.',
    ];
  if (outside.has('irregular_teeth'))
    return [
      'Something at one place of the wheel: a chipped or bent tooth, or dirt or iron dust beside it.',
      'Look at the wheel at that tooth before changing the sensor.',
    ];
  if (outside.has('polarity'))
    return [
      'The sensor’s wires or only the probe leads are the other way round.',
      'Check the lead order against the reference, then the wiring diagram.',
    ];
  switch (circuit) {
    case 'crank-vr':
    case 'cam-vr':
      return [
        'A lower swing: a wider air gap, dust on the sensor, a low speed or a loaded circuit.',
        'Check seat and air gap, then resistance and wiring of the sensor with the connector off.',
      ];
    case 'crank-hall':
    case 'cam-hall':
      return [
        'Levels that do not reach: supply, ground or pull-up of the sensor.',
        'Measure supply and ground at the sensor’s connector under load. Never an ohmmeter on this sensor.',
      ];
    case 'coil-primary-voltage':
      return [
        outside.has('burn_time')
          ? 'No or another burn line: plug, gap, lead or compression, or an open secondary.'
          : 'Another kick or level: plug gap, secondary resistance, the driver or its supply.',
        'Check plug, lead and coil with a spark tester of an adjustable gap. Secondary and primary carry dangerous voltages: keep clear while cranking.',
      ];
    case 'coil-primary-current':
      return [
        'A step at the start: shorted turns. A low, early flat: high resistance. A slow rise: low supply.',
        'Measure supply and ground at the coil under load, then its resistance as the maker states.',
      ];
    case 'injector-voltage':
    case 'injector-current':
      return [
        'Another spike or no hump: coil resistance, driver, or a needle that does not move.',
        'Compare with the other injectors of this engine, then look at supply and resistance.',
      ];
    case 'starter-current':
      return [
        'Uneven or missing humps: one weak cylinder, or no compression in any.',
        'Prove it with a compression gauge, ignition and injection disabled, throttle open.',
      ];
    case 'supply-voltage':
      return [
        'A deeper dip or lower rest level: battery, cables, connections or a starter that draws much.',
        'Load-test the battery and measure the drop over cables and grounds while cranking.',
      ];
    default:
      return [
        'The signal differs from its reference.',
        'Make sure that both were recorded in one condition, then follow the wiring.',
      ];
  }
}

function cannotTell(circuit: Circuit, alignment: Alignment, rows: readonly Row[]): string {
  const undecided = rows.filter((row) => row.verdict === 'undecided').length;
  const parts = circuit.startsWith('cam-')
    ? 'Which of belt, chain, cam wheel or adjuster it is, or whether valves have touched.'
    : 'Which of the part, its wiring or what it looks at is at fault.';
  const open =
    undecided > 0
      ? ` ${undecided} ${undecided === 1 ? 'value' : 'values'} cannot be decided from this reference.`
      : '';
  const laid =
    alignment.by === 'none'
      ? ' The two could not be laid on each other, so their shapes were not compared.'
      : alignment.confidence < 0.6
        ? ' The alignment is uncertain.'
        : '';
  return `${parts}${open}${laid} The maker’s service information decides.`;
}
