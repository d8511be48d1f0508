import type { Circuit } from '../../engine/circuit.ts';

/** What colours a trace and names a column of the index sheet: several circuits share a role. */
export const ROLES = [
  'crank',
  'cam',
  'coil-volts',
  'coil-amperes',
  'command',
  'injector',
  'starter',
  'supply',
  'other',
] as const;
export type SignalRole = (typeof ROLES)[number];

export const ROLE_NAMES: Record<SignalRole, string> = {
  crank: 'Crank',
  cam: 'Cam',
  'coil-volts': 'Coil volts',
  'coil-amperes': 'Coil amperes',
  command: 'Command',
  injector: 'Injector',
  starter: 'Starter',
  supply: 'Supply',
  other: 'Other',
};

/** Dash pattern in CSS pixels; [] is a solid line. The same in lines, swatches, cells and print. */
export const ROLE_DASHES: Record<SignalRole, readonly number[]> = {
  crank: [],
  cam: [],
  'coil-volts': [],
  'coil-amperes': [],
  command: [],
  injector: [],
  starter: [],
  supply: [6, 3],
  other: [2, 3],
};

export interface CircuitWords {
  readonly role: SignalRole;
  /** Short name, for chips and lanes. */
  readonly name: string;
  /** How it is wired or what it carries; shown in soft after the name. */
  readonly wiring: string | null;
  /** In a list to choose from. */
  readonly full: string;
}

const words = (role: SignalRole, name: string, wiring: string | null): CircuitWords => ({
  role,
  name,
  wiring,
  full: wiring === null ? name : `${name}, ${wiring}`,
});

export const CIRCUIT_WORDS: Record<Circuit, CircuitWords> = {
  'crank-vr': words('crank', 'Crank', 'two-wire'),
  'crank-hall': words('crank', 'Crank', 'three-wire'),
  'cam-vr': words('cam', 'Cam', 'two-wire'),
  'cam-hall': words('cam', 'Cam', 'three-wire'),
  'coil-primary-voltage': words('coil-volts', 'Coil primary', 'volts'),
  'coil-primary-current': words('coil-amperes', 'Coil primary', 'amperes'),
  'coil-command': words('command', 'Coil command', null),
  'injector-voltage': words('injector', 'Injector', 'volts'),
  'injector-current': words('injector', 'Injector', 'amperes'),
  'starter-current': words('starter', 'Starter', 'amperes'),
  'supply-voltage': words('supply', 'Supply', 'volts'),
  'fuel-pump-current': words('other', 'Fuel pump', 'amperes'),
  other: words('other', 'Other', null),
};

export const CIRCUIT_LIST = Object.keys(CIRCUIT_WORDS) as Circuit[];

const isCircuit = (text: string): text is Circuit => Object.hasOwn(CIRCUIT_WORDS, text);

/** Words for a circuit; one that this page does not know yet is shown as "Other". */
export const circuitWords = (circuit: string): CircuitWords =>
  CIRCUIT_WORDS[isCircuit(circuit) ? circuit : 'other'];
