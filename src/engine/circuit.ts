/** The circuits that the engine knows, in the order of the product's roles. */
export const CIRCUITS = [
  'crank-vr',
  'crank-hall',
  'cam-vr',
  'cam-hall',
  'coil-primary-voltage',
  'coil-primary-current',
  'coil-command',
  'injector-voltage',
  'injector-current',
  'starter-current',
  'supply-voltage',
  'fuel-pump-current',
  'other',
] as const;

export type Circuit = (typeof CIRCUITS)[number];
