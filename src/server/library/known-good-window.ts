import { asc, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { windowQuery } from '../../contract/areas/captures.ts';
import type { KnownGoodRecord } from '../access.ts';
import { type BuiltWindow, buildWindow } from '../captures/window/build-window.ts';
import { keyedSource } from '../captures/window/store-source.ts';
import { db } from '../db/client.ts';
import { knownGoodSignal } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import {
  knownGoodPyramidKey,
  knownGoodSamplesKey,
  knownGoodTimesKey,
  knownGoodTimesPyramidKey,
} from '../storage/keys.ts';
import { ensurePyramids } from './write-frozen.ts';

/** What is frozen has one version for good. */
export const FROZEN_VERSION = 1;

/** A window of a known-good's own copy. One that was frozen before pyramids were kept gets them now. */
export async function knownGoodWindow(
  row: KnownGoodRecord,
  query: z.output<typeof windowQuery>,
): Promise<BuiltWindow> {
  if (query.v !== undefined && query.v !== FROZEN_VERSION) throw new ApiError('samples_changed');
  const { id, axis } = row;
  const rows = await db()
    .select({ index: knownGoodSignal.index })
    .from(knownGoodSignal)
    .where(eq(knownGoodSignal.knownGoodId, id))
    .orderBy(asc(knownGoodSignal.index));
  const all = rows.map(({ index }) => index);
  const signals = query.signals ?? all.slice(0, 64);
  const unknown = signals.find((signal) => !all.includes(signal));
  if (unknown !== undefined)
    throw new ApiError('invalid', {
      details: [{ path: 'signals', message: `there is no signal ${unknown}` }],
    });
  await ensurePyramids(row, all);
  const source = keyedSource(axis, {
    samples: (signal) => knownGoodSamplesKey(id, signal),
    pyramid: (signal) => knownGoodPyramidKey(id, signal),
    times: knownGoodTimesKey(id),
    timesPyramid: knownGoodTimesPyramidKey(id),
  });
  const { from, to, columns } = query;
  const { headers, body } = await buildWindow(source, { from, to, columns, signals });
  return { headers: { ...headers, 'Gapmark-Samples-Version': String(FROZEN_VERSION) }, body };
}
