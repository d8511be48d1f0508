import type { Circuit } from '../../../engine/circuit.ts';
import type { Value } from '../../../engine/value.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import type { MeasuredReading } from './facts.ts';
import { judgeReading } from './judge-reading.ts';
import { convert } from './units.ts';

/** What was measured of one linked capture. */
export interface MeasuredCapture {
  readonly captureId: string;
  readonly title: string;
  readonly signals: readonly {
    readonly name: string;
    readonly circuit: Circuit;
    readonly values: readonly Value[];
  }[];
  /** Rows of its comparisons with a known-good or band, newest comparison first. */
  readonly comparisons: readonly {
    readonly rows: readonly {
      readonly key: string;
      readonly verdict: string;
      readonly here: unknown;
      readonly reference: unknown;
      readonly unit: string;
    }[];
  }[];
}

/** Which measured key fills which reading. `findings` decides where the reading's own bands do not. */
interface Filling {
  readonly circuits: readonly Circuit[];
  readonly key: string;
  readonly check: CheckId;
  readonly reading: string;
  readonly of?: (value: Value) => number | null;
  readonly finding?: (value: number) => string | null;
  readonly remark?: string;
}

/** Above this the engine runs: it is no cranking speed (chosen for this program). */
const CRANKING_AT_MOST_RPM = 450;
const scalar = (value: Value) => (typeof value.value === 'number' ? value.value : null);
const whileCranking = (value: Value) => {
  const rpm = scalar(value);
  return rpm !== null && rpm <= CRANKING_AT_MOST_RPM ? rpm : null;
};
const worst = (value: Value) => {
  const list = Array.isArray(value.value)
    ? value.value.filter((one): one is number => typeof one === 'number')
    : [];
  return list.length === 0 ? null : Math.min(...list);
};
const some = (finding: string) => (count: number) => (count > 0 ? finding : null);
const FLAT = 'A flat line does not show where it comes from: judge it yourself.';

const FILLINGS: readonly Filling[] = [
  {
    circuits: ['crank-vr', 'crank-hall', 'starter-current'],
    key: 'rpm_mean',
    check: 'cranking',
    reading: 'speed',
    of: whileCranking,
  },
  {
    circuits: ['crank-vr', 'crank-hall', 'starter-current'],
    key: 'compression_balance',
    check: 'rhythm',
    reading: 'worst',
    of: worst,
  },
  { circuits: ['supply-voltage'], key: 'rest_level', check: 'battery-rest', reading: 'rest' },
  { circuits: ['supply-voltage'], key: 'cranking_mean', check: 'supply-cranking', reading: 'mean' },
  { circuits: ['supply-voltage'], key: 'lowest', check: 'supply-cranking', reading: 'lowest' },
  {
    circuits: ['coil-command'],
    key: 'pulse_count',
    check: 'coil-command',
    reading: 'pulses',
    finding: some('pulses'),
    remark: FLAT,
  },
  { circuits: ['coil-command'], key: 'dwell', check: 'coil-command', reading: 'dwell' },
  { circuits: ['coil-primary-voltage'], key: 'kick_peak', check: 'coil-primary', reading: 'kick' },
  {
    circuits: ['coil-primary-voltage'],
    key: 'burn_time',
    check: 'coil-primary',
    reading: 'burn',
    finding: (ms) => (ms >= 0.8 && ms <= 2 ? 'good' : null),
  },
  { circuits: ['coil-primary-voltage'], key: 'dwell', check: 'coil-primary', reading: 'dwell' },
  { circuits: ['coil-primary-current'], key: 'peak_current', check: 'coil-current', reading: 'peak' },
  { circuits: ['coil-primary-current'], key: 'dwell', check: 'coil-current', reading: 'dwell' },
  {
    circuits: ['injector-voltage', 'injector-current'],
    key: 'pulse_width',
    check: 'injector-pulse',
    reading: 'width',
    finding: some('pulses'),
  },
  { circuits: ['starter-current'], key: 'cranking_mean', check: 'starter-current', reading: 'mean' },
  { circuits: ['fuel-pump-current'], key: 'mean', check: 'pump-current', reading: 'mean' },
  { circuits: ['fuel-pump-current'], key: 'pump_speed', check: 'pump-current', reading: 'speed' },
  { circuits: ['crank-vr'], key: 'peak_to_peak', check: 'crank-trace', reading: 'swing' },
  { circuits: ['crank-vr', 'crank-hall'], key: 'rpm_mean', check: 'crank-trace', reading: 'speed' },
];

/** Readings that linked captures fill by themselves, each with the capture it comes from. What has no value stays empty. */
export function measuredReadings(captures: readonly MeasuredCapture[]): MeasuredReading[] {
  return captures.flatMap((capture) => [...fromSignals(capture), ...fromComparisons(capture)]);
}

function fromSignals({ captureId, title, signals }: MeasuredCapture): MeasuredReading[] {
  return signals.flatMap(({ name, circuit, values }) => {
    const found = new Map(values.map((value) => [value.key, value]));
    return FILLINGS.filter((one) => one.circuits.includes(circuit)).flatMap((filling) => {
      const value = found.get(filling.key);
      const number = value === undefined ? null : (filling.of ?? scalar)(value);
      const spec = CHECKS[filling.check].readings[filling.reading];
      if (value === undefined || number === null || spec === undefined) return [];
      const converted = value.unit === spec.unit ? number : convert(number, value.unit, spec.unit);
      if (converted === null) return [];
      const finding =
        filling.check === 'crank-trace'
          ? wheelFinding(found, filling.reading)
          : (filling.finding?.(converted) ?? judgeReading(spec, converted));
      return [
        {
          check: filling.check,
          reading: filling.reading,
          value: converted,
          unit: spec.unit,
          captureId,
          from: `${title}, ${name}: ${filling.key}`,
          finding,
          remark: finding === null ? (filling.remark ?? null) : null,
        },
      ];
    });
  });
}

/** A wheel that was found and has no irregular tooth is regular; one with such a tooth is irregular. Said once, with the speed. */
function wheelFinding(found: ReadonlyMap<string, Value>, reading: string): string | null {
  const pattern = found.get('wheel_pattern')?.value;
  const irregular = found.get('irregular_teeth')?.value;
  if (reading !== 'speed' || typeof pattern !== 'string' || !Array.isArray(irregular)) return null;
  return irregular.length > 0 ? 'irregular' : 'regular';
}

/** Cam against crank from the newest comparison that has it: the largest shift of an edge. */
function fromComparisons({ captureId, title, comparisons }: MeasuredCapture): MeasuredReading[] {
  for (const { rows } of comparisons) {
    const edges = rows.filter(({ key }) => key === 'cam_rising_angles' || key === 'cam_falling_angles');
    const shifts = edges.flatMap(({ here, reference }) =>
      typeof here === 'number' && typeof reference === 'number' ? [around(here - reference)] : [],
    );
    if (shifts.length === 0) continue;
    const shift = shifts.reduce((most, one) => (Math.abs(one) > Math.abs(most) ? one : most));
    const verdicts = edges.map(({ verdict }) => verdict);
    const finding = verdicts.includes('outside')
      ? 'outside'
      : verdicts.every((one) => one === 'inside')
        ? 'inside'
        : null;
    return [
      {
        check: 'cam-phase',
        reading: 'shift',
        value: shift,
        unit: 'deg',
        captureId,
        from: `${title}, compared with a known-good`,
        finding,
        remark: null,
      },
    ];
  }
  return [];
}

/** A difference of angles in a cycle of 720 degrees, between -360 and 360. */
const around = (deg: number) => ((((deg + 360) % 720) + 720) % 720) - 360;
