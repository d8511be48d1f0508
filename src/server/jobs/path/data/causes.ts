import type { Cause } from '../types.ts';
import { fuelAirCauses } from './causes/fuel-air.ts';
import { ignitionCauses } from './causes/ignition.ts';
import { startCauses } from './causes/start.ts';

/** Every cause the path knows. Weights and proofs: common practice, no source. */
const ALL = { ...startCauses, ...ignitionCauses, ...fuelAirCauses };
export type CauseId = keyof typeof ALL;
export const CAUSES: Readonly<Record<CauseId, Cause>> = ALL;
export const CAUSE_IDS = Object.keys(ALL) as CauseId[];
