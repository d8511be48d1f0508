import { CHECK_IDS } from '../data/checks.ts';
import type { Choose } from './run-case.ts';

/** The yardstick: the same checks that may be taken, always in the trade's order, whatever was found. */
export const fixedOrder: Choose = ({ proposals }) =>
  proposals.map(({ check }) => check).toSorted((a, b) => CHECK_IDS.indexOf(a) - CHECK_IDS.indexOf(b))[0] ??
  null;
