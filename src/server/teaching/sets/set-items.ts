import { and, asc, eq, inArray, isNull } from 'drizzle-orm';
import type { SetItemJson } from '../../../contract/areas/teaching.ts';
import { captureVisible, exerciseVisible, type PersonCaller, type SetRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import {
  attempt,
  capture,
  captureSignal,
  exercise,
  exerciseVersion,
  teachingSetItem,
} from '../../db/schema.ts';

/**
 * The items of a set as this caller sees them. Kept back from learners: a capture with its caption while an open exercise
 * rests on it, text that is to follow an answer, and exercises that are not open.
 */
export async function setItems(row: SetRecord, caller: PersonCaller): Promise<SetItemJson[]> {
  const staff = row.heldRole === 'owner' || row.heldRole === 'instructor';
  const items = await db()
    .select()
    .from(teachingSetItem)
    .where(eq(teachingSetItem.setId, row.id))
    .orderBy(asc(teachingSetItem.position));
  const captureIds = items.flatMap((item) => item.captureId ?? []);
  const exerciseIds = items.flatMap((item) => item.exerciseId ?? []);
  const [captures, exercises] = await Promise.all([
    capturesOf(captureIds, row, caller),
    exercisesOf(exerciseIds, row, caller),
  ]);
  let answered = true;
  return items.flatMap((item): SetItemJson[] => {
    const plain = {
      id: item.id,
      kind: item.kind,
      afterCommit: item.afterCommit,
      capture: null,
      exercise: null,
    };
    if (item.kind === 'exercise') {
      const found = exercises.get(item.exerciseId ?? '');
      if (found === undefined) return [];
      if (found.state === 'open' && found.outcome === null) answered = false;
      return [{ ...plain, text: '', exercise: found, withheld: false }];
    }
    if (item.kind === 'capture') {
      const found = captures.get(item.captureId ?? '') ?? null;
      return [{ ...plain, text: found === null ? '' : item.text, capture: found, withheld: found === null }];
    }
    const withheld = !staff && item.afterCommit && !answered;
    return [{ ...plain, text: withheld ? '' : item.text, withheld }];
  });
}

async function capturesOf(ids: readonly string[], row: SetRecord, caller: PersonCaller) {
  if (ids.length === 0) return new Map<string, NonNullable<SetItemJson['capture']>>();
  const rows = await db()
    .select({ id: capture.id, title: capture.title })
    .from(capture)
    .where(
      and(
        inArray(capture.id, [...ids]),
        isNull(capture.deletedAt),
        captureVisible(caller.personId, row.heldRole),
      ),
    );
  const signals = await db()
    .select({ captureId: captureSignal.captureId, circuit: captureSignal.circuit })
    .from(captureSignal)
    .where(inArray(captureSignal.captureId, [...ids]))
    .orderBy(asc(captureSignal.index));
  return new Map(
    rows.map(({ id, title }) => [
      id,
      {
        id,
        title,
        circuits: signals.filter(({ captureId }) => captureId === id).map(({ circuit }) => circuit),
      },
    ]),
  );
}

async function exercisesOf(ids: readonly string[], row: SetRecord, caller: PersonCaller) {
  if (ids.length === 0) return new Map<string, NonNullable<SetItemJson['exercise']>>();
  const rows = await db()
    .select({
      id: exercise.id,
      title: exercise.title,
      state: exercise.state,
      outcome: attempt.outcome,
      content: exerciseVersion.content,
    })
    .from(exercise)
    .innerJoin(
      exerciseVersion,
      and(eq(exerciseVersion.exerciseId, exercise.id), eq(exerciseVersion.version, exercise.version)),
    )
    .leftJoin(attempt, and(eq(attempt.exerciseId, exercise.id), eq(attempt.personId, caller.personId)))
    .where(
      and(
        inArray(exercise.id, [...ids]),
        isNull(exercise.deletedAt),
        exerciseVisible(caller.personId, row.heldRole),
      ),
    );
  return new Map(
    rows.map(({ content, ...found }) => [
      found.id,
      { ...found, asks: Object.entries(content.asks).flatMap(([name, ask]) => (ask === null ? [] : [name])) },
    ]),
  );
}
