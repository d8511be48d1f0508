import { asc, eq } from 'drizzle-orm';
import type { KnownGoodJson } from '../../contract/areas/library.ts';
import type { KnownGoodRecord } from '../access.ts';
import { db } from '../db/client.ts';
import { knownGoodReview, knownGoodSignal, person } from '../db/schema.ts';
import { mutable } from './mutable.ts';
import { versionsOf } from './versions-of.ts';

export const engineJson = (
  row: Pick<KnownGoodRecord, 'make' | 'model' | 'code' | 'year' | 'yearTo' | 'cylinders'>,
) => ({
  make: row.make,
  model: row.model,
  code: row.code,
  year: row.year,
  yearTo: row.yearTo,
  cylinders: row.cylinders,
});

/** A known-good as the API shows it: frozen values, wheel and the history of its reviews. */
export async function knownGoodJson(row: KnownGoodRecord): Promise<KnownGoodJson> {
  const [signals, reviews, [author], versions] = await Promise.all([
    db()
      .select()
      .from(knownGoodSignal)
      .where(eq(knownGoodSignal.knownGoodId, row.id))
      .orderBy(asc(knownGoodSignal.index)),
    db()
      .select({
        decision: knownGoodReview.decision,
        note: knownGoodReview.note,
        by: person.name,
        at: knownGoodReview.at,
      })
      .from(knownGoodReview)
      .innerJoin(person, eq(person.id, knownGoodReview.reviewerId))
      .where(eq(knownGoodReview.knownGoodId, row.id))
      .orderBy(asc(knownGoodReview.at)),
    db().select({ name: person.name }).from(person).where(eq(person.id, row.createdBy)),
    versionsOf(row),
  ]);
  const findings = new Map(row.findings.signals.map((finding) => [finding.index, finding]));
  return {
    id: row.id,
    state: row.state,
    engine: engineJson(row),
    condition: row.condition,
    note: row.note,
    provenance: row.provenance,
    instrument: row.instrument,
    probe: row.probe,
    confirmed: row.confirmed,
    wheelPattern: row.wheelPattern,
    version: row.version,
    supersedes: row.supersedes,
    supersededBy: row.supersededBy,
    captureId: row.captureId,
    fromS: row.fromS,
    toS: row.toS,
    engineVersion: row.engineVersion,
    samples: row.axis.count,
    axis: row.axis.kind === 'even' ? 'even' : row.axis.holds ? 'holds' : 'uneven',
    signals: signals.map(({ index, name, circuit, unit, factor, offset, portrait }) => ({
      index,
      name,
      circuit,
      unit,
      factor,
      offset,
      portrait: portrait && mutable(portrait),
      values: mutable(findings.get(index)?.values ?? []),
      notices: mutable(findings.get(index)?.notices ?? []),
    })),
    relations: mutable(row.findings.relations),
    wheel: row.findings.wheel === null ? null : mutable(row.findings.wheel),
    versions,
    reviews: reviews.map((review) => ({ ...review, at: review.at.toISOString() })),
    createdBy: { id: row.createdBy, name: author?.name ?? 'former member' },
    createdAt: row.createdAt.toISOString(),
    publishedAt: row.publishedAt?.toISOString() ?? null,
  };
}
