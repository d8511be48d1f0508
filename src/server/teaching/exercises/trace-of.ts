import { and, asc, eq, isNull } from 'drizzle-orm';
import type { ExerciseContent, ExerciseTrace } from '../../../contract/areas/teaching.ts';
import type { CaptureRecord } from '../../access.ts';
import { axisJson } from '../../captures/capture-json.ts';
import { db } from '../../db/client.ts';
import { capture, captureSignal } from '../../db/schema.ts';

type TraceSignal = ExerciseTrace['signals'][number];

/** The trace behind an exercise: its capture as it is now, and the stretch that is shown. */
export interface Trace {
  readonly capture: CaptureRecord;
  readonly fromS: number;
  readonly toS: number;
  /** Names, circuits and units as they are. */
  readonly open: readonly TraceSignal[];
}

/** Null when the capture was deleted or has no samples, or a signal is no longer there. */
export async function traceOf(content: ExerciseContent): Promise<Trace | null> {
  const [row] = await db()
    .select()
    .from(capture)
    .where(and(eq(capture.id, content.captureId), isNull(capture.deletedAt)));
  if (row === undefined || row.axis === null || row.samplesVersion === 0) return null;
  const signals = await db()
    .select()
    .from(captureSignal)
    .where(eq(captureSignal.captureId, row.id))
    .orderBy(asc(captureSignal.index));
  const open: TraceSignal[] = [];
  for (const [place, index] of content.signals.entries()) {
    const found = signals.find((signal) => signal.index === index);
    if (found === undefined) return null;
    const { name, circuit, unit, factor, offset } = found;
    open.push({ index: place, name, circuit, unit, factor, offset });
  }
  const { startS, durationS } = axisJson(row.axis);
  const fromS = Math.max(content.from ?? startS, startS);
  const toS = Math.min(content.to ?? startS + durationS, startS + durationS);
  return { capture: row, fromS, toS: Math.max(fromS, toS), open };
}

/**
 * Rises with the samples and with the exercise's version, so that a window that a browser keeps is never one of other
 * samples. Says nothing of the capture.
 */
export const traceVersion = (samplesVersion: number, version: number): number =>
  samplesVersion * 10_000 + version;

/** What a learner is given before committing: no names, no circuits; units and factors only where axes have numbers. */
export function neutralTrace(trace: Trace, content: ExerciseContent, version: number): ExerciseTrace {
  const { capture: row } = trace;
  const { axis, durationS } = axisJson(row.axis);
  const length = trace.toS - trace.fromS;
  return {
    samplesVersion: traceVersion(row.samplesVersion, version),
    startS: trace.fromS,
    durationS: length,
    samples: durationS > 0 ? Math.max(1, Math.round((row.samples * length) / durationS)) : row.samples,
    axis,
    signals: trace.open.map(({ index, unit, factor, offset }) => ({
      index,
      name: `Signal ${index + 1}`,
      circuit: 'other',
      ...(content.scales ? { unit, factor, offset } : { unit: '', factor: 1, offset: 0 }),
    })),
  };
}
