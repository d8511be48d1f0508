import type { Check } from '../../types.ts';

/**
 * A check that turns the engine with the starter (or lets it run): never before it is known that no high-voltage machine turns it,
 * never while a slipped belt, liquid in a cylinder or a fuel leak is suspected.
 */
export const cranking = <const C extends Omit<Check, 'cranks'>>(check: C) =>
  ({
    ...check,
    cranks: true,
    first: [['high-voltage:none'], ...(check.first ?? [])],
    notWhile: [...new Set(['belt', 'liquid', 'leak', ...(check.notWhile ?? [])])],
    cautions: [...new Set(['crank', 'short', ...check.cautions] as const)],
  }) satisfies Check;
