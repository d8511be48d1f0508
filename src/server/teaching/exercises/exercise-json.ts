import { and, count, eq, gt, isNull, sql } from 'drizzle-orm';
import { type ExerciseContent, type ExerciseJson, unitsLike } from '../../../contract/areas/teaching.ts';
import { CIRCUITS } from '../../../engine/circuit.ts';
import { captureVisible, type ExerciseRecord, type PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { attempt, capture, person, shareLink } from '../../db/schema.ts';
import { ownAttempt } from '../attempts/own-attempt.ts';
import { setsOfExercise } from './sets-of-exercise.ts';
import { neutralTrace, type Trace, traceOf } from './trace-of.ts';
import { versionOf } from './version.ts';

/**
 * An exercise as this caller may see it. What would give the answer away is not in it until they have committed: not the
 * names, not the numbers, not the capture. Instructors and owners get the answer always.
 */
export async function exerciseJson(row: ExerciseRecord, caller: PersonCaller): Promise<ExerciseJson> {
  const staff = row.heldRole === 'owner' || row.heldRole === 'instructor';
  const own = await ownAttempt(row.id, caller.personId);
  const shown = await versionOf(row.id, own?.version ?? row.version);
  const { content } = shown;
  const trace = await traceOf(content);
  const open = staff || own !== null;
  const [[author], sets, answer, staffPart] = await Promise.all([
    db().select({ name: person.name }).from(person).where(eq(person.id, row.createdBy)),
    setsOfExercise(row, caller),
    open ? answerOf(row, content, trace, caller) : null,
    staff ? staffOf(row, trace, shown.samplesVersion) : null,
  ]);
  return {
    id: row.id,
    title: row.title,
    state: row.state,
    version: shown.version,
    setBy: author?.name ?? 'former member',
    question: content.question,
    facts: content.facts,
    scales: content.scales,
    asks: asksOf(content),
    trace: trace === null ? null : neutralTrace(trace, content, shown.version),
    attempt: own,
    answer,
    sets,
    staff: staffPart,
  };
}

/** What is asked, without what is right. */
function asksOf({ asks }: ExerciseContent): ExerciseJson['asks'] {
  const { stretch, circuit, cause, value, text } = asks;
  return {
    stretch: stretch !== null,
    circuit: circuit && {
      signal: circuit.signal,
      choices: circuit.choices.length > 0 ? circuit.choices : [...CIRCUITS],
    },
    cause: cause && { choices: cause.choices },
    value: value && { label: value.label, units: unitsLike(value.unit) },
    text,
  };
}

async function answerOf(
  row: ExerciseRecord,
  content: ExerciseContent,
  trace: Trace | null,
  caller: PersonCaller,
): Promise<NonNullable<ExerciseJson['answer']>> {
  const { circuit, cause, value } = content.asks;
  const [visible] = await db()
    .select({ id: capture.id })
    .from(capture)
    .where(
      and(
        eq(capture.id, content.captureId),
        isNull(capture.deletedAt),
        captureVisible(caller.personId, row.heldRole),
      ),
    );
  const chosen = cause?.choices.find(({ key }) => key === cause.answer);
  return {
    ...content.answer,
    circuit: circuit && { signal: circuit.signal, circuit: circuit.answer },
    cause: chosen === undefined ? null : { key: chosen.key, text: chosen.text },
    value: value && { answer: value.answer, unit: value.unit, tolerance: value.tolerance },
    signals: trace === null ? [] : [...trace.open],
    captureId: visible?.id ?? null,
  };
}

async function staffOf(
  row: ExerciseRecord,
  trace: Trace | null,
  samplesVersion: number,
): Promise<NonNullable<ExerciseJson['staff']>> {
  const [[attempts], [links], current] = await Promise.all([
    db().select({ n: count() }).from(attempt).where(eq(attempt.exerciseId, row.id)),
    db()
      .select({ n: count() })
      .from(shareLink)
      .where(
        and(
          eq(shareLink.captureId, row.captureId ?? ''),
          isNull(shareLink.withdrawnAt),
          gt(shareLink.expiresAt, sql`now()`),
        ),
      ),
    versionOf(row.id, row.version),
  ]);
  return {
    content: current.content,
    attempts: attempts?.n ?? 0,
    captureTitle: trace?.capture.title ?? null,
    captureChanged: trace !== null && trace.capture.samplesVersion !== samplesVersion,
    openLinks: links?.n ?? 0,
  };
}
