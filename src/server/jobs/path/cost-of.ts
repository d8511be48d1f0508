import { CHECKS, type CheckId } from './data/checks.ts';

/** Chosen for this program: a step of risk counts as four minutes more. */
const MINUTES_A_RISK = 4;

export const costOf = (check: CheckId): number => CHECKS[check].minutes + MINUTES_A_RISK * CHECKS[check].risk;
