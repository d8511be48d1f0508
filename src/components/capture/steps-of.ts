import type { MeasurementsJson } from '../../contract/areas/captures.ts';
import type { Value } from '../../engine/value.ts';
import { type Steps, turnsOf } from '../plot/steps.ts';
import type { PlotWheel, View } from '../plot/types.ts';

/** Round a firing stands more room than round a turn: what led to it and how it rings out. */
const EVENT_MARGIN = 0.25;

/**
 * What repeats in a capture, most telling first: turns of the wheel, firings of a coil, pulses of an injector or command. Each
 * is gone through one by one. Empty where nothing does.
 */
export function stepsOf(wheel: PlotWheel | null, measurements: MeasurementsJson | undefined): Steps[] {
  const turns = turnsOf(wheel);
  const found: Steps[] = turns === null ? [] : [turns];
  const signals = measurements?.signals ?? [];
  for (const [key, word] of [
    ['firing_count', 'Firing'],
    ['pulse_count', 'Pulse'],
  ] as const) {
    // Several coils side by side: the one with most events leads, the others are seen with it.
    const counted = signals
      .map(({ values }) => ({ values, count: values.find((value) => value.key === key) }))
      .filter(({ count }) => typeof count?.value === 'number' && count.value > 0 && count.evidence.length > 0)
      .sort((a, b) => Number(b.count?.value) - Number(a.count?.value))[0];
    if (counted?.count === undefined) continue;
    const stretches = inOrder(counted.count.evidence);
    found.push({
      word,
      stretches,
      margin: EVENT_MARGIN,
      originsS: originsOf(stretches, counted.values),
      total: Math.max(Number(counted.count.value), stretches.length),
    });
  }
  return found;
}

const inOrder = (evidence: Value['evidence']): View[] =>
  evidence.filter(({ from, to }) => to > from).sort((a, b) => a.from - b.from);

/** A coil's time is told from the moment its driver switches off, which is where its dwell ends. */
function originsOf(stretches: readonly View[], values: readonly Value[]): number[] | null {
  const ends = values.find((value) => value.key === 'dwell')?.evidence.map(({ to }) => to) ?? [];
  const origins = stretches.map((stretch) => ends.find((end) => end > stretch.from && end <= stretch.to));
  return origins.every((origin) => origin !== undefined) ? (origins as number[]) : null;
}
