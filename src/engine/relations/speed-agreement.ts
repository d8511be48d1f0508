import type { Notice, Value } from '../value.ts';

/** Speeds further apart than this deserve a word. */
const APART = 0.08;

/** Cranking speed from the starter's humps against the crank signal's: a notice when they disagree. */
export function speedAgreement(crank: Value, starter: Value): Notice | null {
  if (typeof crank.value !== 'number' || typeof starter.value !== 'number') return null;
  if (Math.abs(starter.value / crank.value - 1) < APART) return null;
  return {
    code: 'speeds-disagree',
    severity: 'watch',
    text: `The crank signal gives ${crank.value.toFixed(0)} rpm, the starter current ${starter.value.toFixed(0)} rpm. Usual causes: a wrong cylinder count, or one cylinder without compression, so that its hump is missing. The crank signal counts teeth and is the surer of the two.`,
    evidence: [...crank.evidence.slice(0, 1), ...starter.evidence.slice(0, 1)],
  };
}
