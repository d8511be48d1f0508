import { asc, inArray } from 'drizzle-orm';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { CaptureRecord } from '../access.ts';
import { db, type Executor } from '../db/client.ts';
import { captureSignal, person, type StoredAxis } from '../db/schema.ts';

type SignalRow = typeof captureSignal.$inferSelect;

/** A capture as the API gives it. */
export async function captureJson(row: CaptureRecord, executor: Executor = db()): Promise<CaptureJson> {
  const [json] = await capturesJson([row], executor);
  return json!;
}

/** Several captures with two queries in all. */
export async function capturesJson(
  rows: readonly CaptureRecord[],
  executor: Executor = db(),
): Promise<CaptureJson[]> {
  if (rows.length === 0) return [];
  const ids = rows.map((row) => row.id);
  const makers = [...new Set(rows.map((row) => row.createdBy))];
  const [signals, people] = await Promise.all([
    executor
      .select()
      .from(captureSignal)
      .where(inArray(captureSignal.captureId, ids))
      .orderBy(asc(captureSignal.index)),
    executor.select({ id: person.id, name: person.name }).from(person).where(inArray(person.id, makers)),
  ]);
  const names = new Map(people.map(({ id, name }) => [id, name]));
  const signalsOf = groupByCapture(signals);
  return rows.map((row) =>
    toJson(row, signalsOf.get(row.id) ?? [], names.get(row.createdBy) ?? 'former member'),
  );
}

function groupByCapture(signals: readonly SignalRow[]): Map<string, SignalRow[]> {
  const groups = new Map<string, SignalRow[]>();
  for (const signal of signals) {
    const group = groups.get(signal.captureId);
    if (group === undefined) groups.set(signal.captureId, [signal]);
    else group.push(signal);
  }
  return groups;
}

function toJson(row: CaptureRecord, signals: readonly SignalRow[], makerName: string): CaptureJson {
  return {
    id: row.id,
    workshopId: row.workshopId,
    title: row.title,
    note: row.note,
    jobId: row.jobId,
    status: row.status,
    progress: row.progress,
    ...(row.error === null ? {} : { error: row.error }),
    revision: row.revision,
    samplesVersion: row.samplesVersion,
    samples: row.samples,
    ...axisJson(row.axis),
    sha256: row.sha256,
    bytes: row.bytes,
    fileName: row.fileName,
    cylinders: row.cylinders,
    createdAt: row.createdAt.toISOString(),
    createdBy: { id: row.createdBy, name: makerName },
    deletedAt: row.deletedAt?.toISOString() ?? null,
    derived: row.derived,
    signals: signals.map(({ captureId: _, rail: __, ...signal }) => signal),
    reading:
      row.reading === null
        ? null
        : { ...row.reading, rejectedRows: [...row.reading.rejectedRows], remarks: [...row.reading.remarks] },
  };
}

/** From the first sample to the last; one sample lasts no time. */
export function axisJson(
  axis: StoredAxis | null,
): Pick<CaptureJson, 'axis' | 'sampleRateHz' | 'startS' | 'durationS'> {
  if (axis === null) return { axis: null, sampleRateHz: null, startS: 0, durationS: 0 };
  if (axis.kind === 'even') {
    const durationS = Math.max(0, axis.count - 1) * axis.stepS;
    // 1 / 0.00002 may end in …999: twelve digits say what was meant.
    const sampleRateHz = Number((1 / axis.stepS).toPrecision(12));
    return { axis: 'even', sampleRateHz, startS: axis.startS, durationS };
  }
  return {
    axis: axis.holds ? 'holds' : 'uneven',
    sampleRateHz: null,
    startS: axis.startS,
    durationS: axis.endS - axis.startS,
  };
}
