import type { Circuit } from '../../engine/circuit.ts';
import type { Value } from '../../engine/value.ts';

/** Values by key, as the list's query picks them. */
export type PickedValues = Readonly<Record<string, Omit<Value, 'evidence'>>>;

/** The keys that headlines are made of. */
export const HEADLINE_KEYS = [
  'wheel_pattern',
  'rpm_mean',
  'edges_per_cycle',
  'duty',
  'dwell',
  'firing_count',
  'peak_current',
  'pulse_width',
  'pulse_count',
  'cranking_mean',
  'inrush_peak',
  'rest_level',
  'lowest',
  'highest',
  'mean',
  'pump_speed',
  'frequency',
];

/** The few values that say what a signal holds, such as "60-2, 211.9 rpm" or "dwell 4.39 ms, n = 3"; empty when none. */
export function headline(circuit: Circuit, values: PickedValues): string {
  const parts = PARTS[circuit](values).filter((part) => part !== null);
  return parts.join(', ');
}

type Parts = (values: PickedValues) => (string | null)[];

const crank: Parts = (v) => [plain(v, 'wheel_pattern'), number(v, 'rpm_mean', 1)];
const cam: Parts = (v) => [
  counted(v, 'edges_per_cycle', 'edges a cycle'),
  labelled(v, 'frequency', 1, 'frequency'),
];
const levels: Parts = (v) => [labelled(v, 'lowest', 2, 'lowest'), labelled(v, 'highest', 2, 'highest')];

const PARTS: Record<Circuit, Parts> = {
  'crank-vr': crank,
  'crank-hall': crank,
  'cam-vr': cam,
  'cam-hall': cam,
  'coil-primary-voltage': (v) => [labelled(v, 'dwell', 2), counted(v, 'firing_count', null)],
  'coil-primary-current': (v) => [
    labelled(v, 'peak_current', 2, 'peak'),
    labelled(v, 'dwell', 2),
    counted(v, 'firing_count', null),
  ],
  'coil-command': (v) => [labelled(v, 'dwell', 2), counted(v, 'pulse_count', null)],
  'injector-voltage': (v) => [labelled(v, 'pulse_width', 2, 'pulse'), counted(v, 'pulse_count', null)],
  'injector-current': levels,
  'starter-current': (v) => [
    labelled(v, 'cranking_mean', 0, 'cranking'),
    labelled(v, 'inrush_peak', 0, 'inrush'),
  ],
  'supply-voltage': (v) => [labelled(v, 'rest_level', 1, 'rest'), labelled(v, 'lowest', 1, 'lowest')],
  'fuel-pump-current': (v) => [labelled(v, 'mean', 1, 'mean'), number(v, 'pump_speed', 0)],
  other: levels,
};

function plain(values: PickedValues, key: string): string | null {
  const value = values[key]?.value;
  return typeof value === 'string' ? value : null;
}

function number(values: PickedValues, key: string, digits: number): string | null {
  const found = values[key];
  if (typeof found?.value !== 'number') return null;
  return `${found.value.toFixed(digits)} ${found.unit}`.trim();
}

function labelled(values: PickedValues, key: string, digits: number, label = key): string | null {
  const text = number(values, key, digits);
  return text === null ? null : `${label} ${text}`;
}

function counted(values: PickedValues, key: string, label: string | null): string | null {
  const value = values[key]?.value;
  if (typeof value !== 'number') return null;
  return label === null ? `n = ${value}` : `${value} ${label}`;
}
