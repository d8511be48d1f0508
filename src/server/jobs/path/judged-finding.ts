import { CHECKS, type CheckId } from './data/checks.ts';
import type { TypedReading } from './facts.ts';
import { judgeReading } from './judge-reading.ts';
import { convert } from './units.ts';

/**
 * What typed numbers show together. One bad reading is enough; good only when every reading that has bands was typed and judged
 * good, since the one that is missing may be the bad one. Null: the person judges.
 */
export function judgedFinding(check: CheckId, readings: readonly TypedReading[]): string | null {
  const { readings: specs, findings } = CHECKS[check];
  const judged: (string | null)[] = [];
  for (const [id, spec] of Object.entries(specs)) {
    if (spec.bands === undefined) continue;
    const typed = readings.find(({ what }) => what === id);
    const value = typed === undefined ? null : convert(typed.value, typed.unit, spec.unit);
    judged.push(value === null ? null : judgeReading(spec, value));
  }
  const bad = judged.find((one) => one !== null && findings[one]?.result === 'bad');
  if (bad !== undefined && bad !== null) return bad;
  return judged.length > 0 && judged.every((one) => one !== null && one === judged[0])
    ? (judged[0] ?? null)
    : null;
}
