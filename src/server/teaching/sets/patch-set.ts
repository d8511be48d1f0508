import type { z } from 'zod';
import type { setPatch } from '../../../contract/areas/teaching.ts';
import type { SetRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { changeSet } from './change-set.ts';
import { writePeople } from './write-people.ts';

/** Changes a set and whom it is for, in one transaction. */
export const patchSet = (row: SetRecord, patch: z.output<typeof setPatch>): Promise<SetRecord> =>
  db().transaction(async (tx) => {
    const { title, intro, state, audience, people } = patch;
    const changed = await changeSet(tx, row, {
      ...(title === undefined ? {} : { title }),
      ...(intro === undefined ? {} : { intro }),
      ...(state === undefined ? {} : { state }),
      ...(audience === undefined ? {} : { audience }),
    });
    if (people !== undefined) await writePeople(tx, row.id, row.workshopId, people);
    return changed;
  });
