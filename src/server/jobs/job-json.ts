import { inArray } from 'drizzle-orm';
import type { JobJson } from '../../contract/areas/jobs.ts';
import { vinWarning } from '../../engine/vehicle/vin.ts';
import type { JobRecord } from '../access.ts';
import { db, type Executor } from '../db/client.ts';
import { person } from '../db/schema.ts';
import { etagOf } from '../http/etag.ts';

/** A job as the API gives it. */
export async function jobJson(row: JobRecord, executor: Executor = db()): Promise<JobJson> {
  const [json] = await jobsJson([row], executor);
  return json!;
}

/** Several jobs with one query for the people. */
export async function jobsJson(rows: readonly JobRecord[], executor: Executor = db()): Promise<JobJson[]> {
  const ids = [...new Set(rows.flatMap((row) => [row.createdBy, row.assigneeId, row.closedBy]))].filter(
    (id) => id !== null,
  );
  const people =
    ids.length === 0
      ? []
      : await executor
          .select({ id: person.id, name: person.name })
          .from(person)
          .where(inArray(person.id, ids));
  const names = new Map(people.map(({ id, name }) => [id, name]));
  const who = (id: string) => ({ id, name: names.get(id) ?? 'former member' });
  return rows.map((row) => ({
    id: row.id,
    workshopId: row.workshopId,
    number: row.number,
    vehicle: {
      make: row.make,
      model: row.model,
      year: row.year,
      engine: row.engine,
      vin: row.vin,
      plate: row.plate,
      cylinders: row.cylinders,
    },
    vinWarning: vinWarning(row.vin),
    complaint: row.complaint,
    codes: row.codes,
    state: row.state,
    assignee: row.assigneeId === null ? null : who(row.assigneeId),
    outcome: row.outcome,
    createdBy: who(row.createdBy),
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    closedAt: row.closedAt?.toISOString() ?? null,
    closedBy: row.closedBy === null ? null : who(row.closedBy),
    deletedAt: row.deletedAt?.toISOString() ?? null,
    etag: etagOf(row.edition),
  }));
}
