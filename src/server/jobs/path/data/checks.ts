import type { Check } from '../types.ts';
import { beforeChecks } from './checks/before.ts';
import { engineChecks } from './checks/engine.ts';
import { fuelChecks } from './checks/fuel.ts';
import { signalChecks } from './checks/signals.ts';
import { sparkChecks } from './checks/spark.ts';

/** Every check, in the order in which a technician would take them when nothing points anywhere. */
const ALL = { ...beforeChecks, ...sparkChecks, ...signalChecks, ...fuelChecks, ...engineChecks };
export type CheckId = keyof typeof ALL;
export const CHECKS: Readonly<Record<CheckId, Check>> = ALL;
export const CHECK_IDS = Object.keys(ALL) as CheckId[];
export const isCheckId = (id: string): id is CheckId => Object.hasOwn(ALL, id);
