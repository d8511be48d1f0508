import { circuitWords, ROLE_DASHES, type SignalRole } from '../base/circuits.ts';

/**
 * Dash of each signal in CSS pixels when all are shown together; [] is a solid line. Supply and other are always dashed;
 * a second signal of one role differs by dash as well as by name.
 */
export function dashes(circuits: readonly string[]): (readonly number[])[] {
  const seen = new Map<SignalRole, number>();
  return circuits.map((circuit) => {
    const { role } = circuitWords(circuit);
    const earlier = seen.get(role) ?? 0;
    seen.set(role, earlier + 1);
    const own = ROLE_DASHES[role];
    return own.length > 0 || earlier === 0 ? own : [8, 2 + 2 * earlier];
  });
}
