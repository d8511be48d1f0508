import type { Circuit } from '../../engine/circuit.ts';

/** What a signal is coloured by, the same everywhere. */
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
export type Role = (typeof ROLES)[number];

const ROLE_OF: Record<Circuit, Role> = {
  'crank-vr': 'crank',
  'crank-hall': 'crank',
  'cam-vr': 'cam',
  'cam-hall': 'cam',
  'coil-primary-voltage': 'coil-volts',
  'coil-primary-current': 'coil-amperes',
  'coil-command': 'command',
  'injector-voltage': 'injector',
  'injector-current': 'injector',
  'starter-current': 'starter',
  'supply-voltage': 'supply',
  'fuel-pump-current': 'other',
  other: 'other',
};

export const roleOf = (circuit: Circuit): Role => ROLE_OF[circuit];

const WIRING: Record<Circuit, string> = {
  'crank-vr': 'crank, two-wire',
  'crank-hall': 'crank, three-wire',
  'cam-vr': 'cam, two-wire',
  'cam-hall': 'cam, three-wire',
  'coil-primary-voltage': 'coil primary volts',
  'coil-primary-current': 'coil primary amperes',
  'coil-command': 'coil command',
  'injector-voltage': 'injector volts',
  'injector-current': 'injector amperes',
  'starter-current': 'starter amperes',
  'supply-voltage': 'supply volts',
  'fuel-pump-current': 'fuel pump amperes',
  other: 'other',
};

/** The circuit in a few trade words, set in soft under the signal's name. */
export const circuitWords = (circuit: Circuit): string => WIRING[circuit];

/** Dash in CSS pixels: supply and other are always dashed; a second signal of one role differs by dash as well. */
export function dashOf(circuit: Circuit, earlierOfRole: number): readonly number[] | null {
  const role = roleOf(circuit);
  if (role === 'supply') return [6, 3];
  if (role === 'other') return [2, 3];
  return earlierOfRole === 0 ? null : [8, 2 + 2 * earlierOfRole];
}

/** Dash of each signal, in order, when all are shown together. */
export function dashes(circuits: readonly Circuit[]): (readonly number[] | null)[] {
  const seen = new Map<Role, number>();
  return circuits.map((circuit) => {
    const earlier = seen.get(roleOf(circuit)) ?? 0;
    seen.set(roleOf(circuit), earlier + 1);
    return dashOf(circuit, earlier);
  });
}
