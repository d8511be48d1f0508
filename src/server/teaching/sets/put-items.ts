import { and, eq, inArray, isNull } from 'drizzle-orm';
import type { SetItemInput } from '../../../contract/areas/teaching.ts';
import type { SetRecord } from '../../access.ts';
import { db, type Executor } from '../../db/client.ts';
import { capture, exercise, teachingSetItem } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { newId } from '../../ids.ts';
import { changeSet } from './change-set.ts';

export const ITEMS_LIMIT = 200;

/** Writes the whole list anew: order, additions and removals in one transaction. Items named by id keep it. */
export const putItems = (row: SetRecord, items: readonly SetItemInput[]): Promise<SetRecord> =>
  db().transaction(async (tx) => {
    const changed = await changeSet(tx, row, {});
    const before = await tx
      .select({ id: teachingSetItem.id })
      .from(teachingSetItem)
      .where(eq(teachingSetItem.setId, row.id));
    const known = new Set(before.map(({ id }) => id));
    items.forEach(({ id }, at) => {
      if (id !== undefined && !known.delete(id))
        throw invalid(at, 'id', 'is not an item of this set, or is named twice');
    });
    await checkThings(tx, row.workshopId, items);
    await tx.delete(teachingSetItem).where(eq(teachingSetItem.setId, row.id));
    if (items.length > 0)
      await tx.insert(teachingSetItem).values(items.map((item, position) => rowOf(row.id, item, position)));
    return changed;
  });

/** Adds an item at the end. */
export const addItem = (row: SetRecord, item: SetItemInput): Promise<SetRecord> =>
  db().transaction(async (tx) => {
    const changed = await changeSet(tx, row, {});
    const before = await tx
      .select({ position: teachingSetItem.position })
      .from(teachingSetItem)
      .where(eq(teachingSetItem.setId, row.id));
    if (before.length >= ITEMS_LIMIT)
      throw new ApiError('conflict', { message: `A set takes ${ITEMS_LIMIT} items at most.` });
    await checkThings(tx, row.workshopId, [item]);
    const position = Math.max(-1, ...before.map((each) => each.position)) + 1;
    await tx.insert(teachingSetItem).values({ ...rowOf(row.id, item, position), id: newId() });
    return changed;
  });

const rowOf = (setId: string, item: SetItemInput, position: number) => ({
  id: item.id ?? newId(),
  setId,
  position,
  kind: item.kind,
  text: item.kind === 'exercise' ? '' : item.text,
  afterCommit: item.kind === 'text' && item.afterCommit,
  captureId: item.kind === 'capture' ? item.captureId : null,
  exerciseId: item.kind === 'exercise' ? item.exerciseId : null,
});

const invalid = (at: number, field: string, message: string) =>
  new ApiError('invalid', { details: [{ path: `items.${at}.${field}`, message }] });

/** What the items name must be there, in the set's own workshop; an exercise stands in a set once. */
async function checkThings(tx: Executor, workshopId: string, items: readonly SetItemInput[]): Promise<void> {
  const captureIds = items.flatMap((item) => (item.kind === 'capture' ? [item.captureId] : []));
  const exerciseIds = items.flatMap((item) => (item.kind === 'exercise' ? [item.exerciseId] : []));
  const captures =
    captureIds.length === 0
      ? []
      : await tx
          .select({ id: capture.id })
          .from(capture)
          .where(
            and(
              inArray(capture.id, captureIds),
              eq(capture.workshopId, workshopId),
              isNull(capture.deletedAt),
            ),
          );
  const exercises =
    exerciseIds.length === 0
      ? []
      : await tx
          .select({ id: exercise.id })
          .from(exercise)
          .where(
            and(
              inArray(exercise.id, exerciseIds),
              eq(exercise.workshopId, workshopId),
              isNull(exercise.deletedAt),
            ),
          );
  const seen = new Set<string>();
  items.forEach((item, at) => {
    if (item.kind === 'capture' && !captures.some(({ id }) => id === item.captureId))
      throw invalid(at, 'captureId', 'there is no such capture in this workshop');
    if (item.kind !== 'exercise') return;
    if (!exercises.some(({ id }) => id === item.exerciseId))
      throw invalid(at, 'exerciseId', 'there is no such exercise in this workshop');
    if (seen.has(item.exerciseId)) throw invalid(at, 'exerciseId', 'stands in this set twice');
    seen.add(item.exerciseId);
  });
}
