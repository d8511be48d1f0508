import { and, asc, desc, eq, inArray, isNull, or } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture, captureSignal, comparison, jobCheck, jobOverrule, measurement } from '../../db/schema.ts';
import { CAUSE_IDS } from './data/causes.ts';
import { isCheckId } from './data/checks.ts';
import type { CheckRecord, Facts } from './facts.ts';
import { type MeasuredCapture, measuredReadings } from './measured-readings.ts';

export type JobCheckRow = typeof jobCheck.$inferSelect;
interface JobOfPath {
  readonly id: string;
  readonly workshopId: string;
  readonly complaint: string;
  readonly codes: readonly string[];
}

/** Everything that the reasoning knows of a job: what was recorded, what its captures show, and who overruled what. */
export async function pathOfJob(job: JobOfPath): Promise<{ facts: Facts; rows: JobCheckRow[] }> {
  const [rows, overrules] = await Promise.all([
    db()
      .select()
      .from(jobCheck)
      .where(eq(jobCheck.jobId, job.id))
      .orderBy(asc(jobCheck.createdAt), asc(jobCheck.check)),
    db().select().from(jobOverrule).where(eq(jobOverrule.jobId, job.id)).orderBy(asc(jobOverrule.createdAt)),
  ]);
  const measured = measuredReadings(await capturesOf(job, rows));
  const records = rows.flatMap((row): CheckRecord[] =>
    isCheckId(row.check) ? [{ ...row, check: row.check }] : [],
  );
  const facts: Facts = {
    complaintText: job.complaint,
    records,
    codes: job.codes,
    measured,
    overrules: overrules.flatMap(({ cause, decision, why, author }) => {
      const known = CAUSE_IDS.find((one) => one === cause);
      return known === undefined ? [] : [{ cause: known, decision, why, by: author }];
    }),
  };
  return { facts, rows };
}

async function capturesOf(job: JobOfPath, rows: readonly JobCheckRow[]): Promise<MeasuredCapture[]> {
  const named = [...new Set(rows.flatMap((row) => row.captureIds))];
  const linked =
    named.length === 0
      ? eq(capture.jobId, job.id)
      : or(eq(capture.jobId, job.id), inArray(capture.id, named));
  const found = await db()
    .select({ id: capture.id, title: capture.title, signals: measurement.signals })
    .from(capture)
    .innerJoin(
      measurement,
      and(eq(measurement.captureId, capture.id), eq(measurement.revision, capture.revision)),
    )
    .where(
      and(
        eq(capture.workshopId, job.workshopId),
        isNull(capture.deletedAt),
        eq(capture.practice, false),
        linked,
      ),
    )
    .orderBy(asc(capture.createdAt), asc(capture.id));
  if (found.length === 0) return [];
  const ids = found.map(({ id }) => id);
  const [names, compared] = await Promise.all([
    db().select().from(captureSignal).where(inArray(captureSignal.captureId, ids)),
    db()
      .select({ captureId: comparison.captureId, result: comparison.result })
      .from(comparison)
      .where(and(inArray(comparison.captureId, ids), eq(comparison.workshopId, job.workshopId)))
      .orderBy(desc(comparison.createdAt)),
  ]);
  return found.map(({ id, title, signals }) => ({
    captureId: id,
    title,
    signals: signals.map(({ index, circuit, values }) => ({
      name: names.find((one) => one.captureId === id && one.index === index)?.name ?? `signal ${index + 1}`,
      circuit,
      values,
    })),
    comparisons: compared
      .filter((one) => one.captureId === id)
      .map(({ result }) => ({ rows: result?.rows ?? [] })),
  }));
}
