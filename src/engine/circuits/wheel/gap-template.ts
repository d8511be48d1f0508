import type { Feature } from './laid.ts';
import type { PatternGap } from './pattern.ts';

/**
 * True when gaps stand nearly, but not quite, a fixed number of places apart: one wheel with one gap, of
 * which a tooth or a gap was missed, looks so. Nothing is said then.
 */
export function nearlyShorter(template: readonly PatternGap[], turn: number): boolean {
  // Two gaps of different size may well stand nearly opposite (36-2-1).
  if (template.length < 2) return false;
  if (template.length === 2 && template[0]!.size !== template[1]!.size) return false;
  const starts = template.map((gap) => gap.after);
  const steps = starts.map(
    (start, i) => (start - starts[(i + starts.length - 1) % starts.length]! + turn) % turn || turn,
  );
  const least = Math.min(...steps);
  return least >= 6 && steps.every((step) => Math.abs(step - least * Math.round(step / least)) <= 2);
}

/**
 * Sequences of gaps over one turn, starting anywhere, the commonest first; of equally common ones that with fewer gaps.
 * `after` counts from the first tooth after its first gap.
 */
export function commonTemplates(features: readonly Feature[], turn: number, end: number): PatternGap[][] {
  const counts = new Map<string, { count: number; gaps: PatternGap[] }>();
  for (let i = 0; i < features.length; i += 1) {
    const start = features[i]!.place;
    if (start + turn > end) break;
    const gaps: Array<{ size: number; step: number }> = [];
    let j = i;
    for (; j < features.length && features[j]!.place < start + turn; j += 1) {
      const next = features[j + 1]?.place ?? Infinity;
      gaps.push({ size: features[j]!.size, step: Math.min(next, start + turn) - features[j]!.place });
    }
    const turned = smallestRotation(gaps);
    const key = turned.map((gap) => `${gap.size}/${gap.step}`).join(' ');
    const entry = counts.get(key);
    if (entry) entry.count += 1;
    else counts.set(key, { count: 1, gaps: asPlaces(turned, turn) });
  }
  return Array.from(counts.values())
    .sort((a, b) => b.count - a.count || a.gaps.length - b.gaps.length)
    .map(({ gaps }) => gaps);
}

function smallestRotation<T extends { size: number; step: number }>(gaps: T[]): T[] {
  let best = gaps;
  const text = (list: T[]) => list.map((gap) => `${gap.size}/${gap.step}`).join(' ');
  for (let r = 1; r < gaps.length; r += 1) {
    const turned = [...gaps.slice(r), ...gaps.slice(0, r)];
    if (text(turned) < text(best)) best = turned;
  }
  return best;
}

/** Gaps in order after the tooth that follows the first of them; the first itself comes last. */
function asPlaces(gaps: Array<{ size: number; step: number }>, turn: number): PatternGap[] {
  const out: PatternGap[] = [];
  let place = gaps[0]!.step - gaps[0]!.size;
  for (const gap of gaps.slice(1)) {
    out.push({ size: gap.size, after: place });
    place += gap.step;
  }
  out.push({ size: gaps[0]!.size, after: turn - gaps[0]!.size });
  return out;
}
