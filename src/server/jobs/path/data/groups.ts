import type { CauseId } from './causes.ts';

/** Causes that one check settles together. */
export const controlDead = [
  'control-fuse',
  'main-relay',
  'control-supply',
  'control-unit',
] as const satisfies CauseId[];
export const crankSignal = ['crank-sensor', 'crank-wiring', 'crank-gap'] as const satisfies CauseId[];
export const ignitionParts = ['secondary', 'coil', 'coil-feed', 'coil-driver'] as const satisfies CauseId[];
export const fuelSupply = [
  'tank-empty',
  'fuel-cutoff',
  'pump-relay',
  'pump-wiring',
  'fuel-pump',
  'fuel-filter',
  'regulator',
] as const satisfies CauseId[];
export const injection = [
  'injector-feed',
  'injectors-blocked',
  'throttle-sensor',
  'coolant-sensor',
  'airflow-sensor',
] as const satisfies CauseId[];
export const starting = [
  'battery-weak',
  'battery-cable',
  'starter',
  'starter-command',
  'engine-drag',
  'liquid-in-cylinder',
] as const satisfies CauseId[];
