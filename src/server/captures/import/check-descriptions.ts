import { and, eq, inArray, isNull, ne } from 'drizzle-orm';
import type { z } from 'zod';
import type { ImportCheckJson, importInput } from '../../../contract/areas/import.ts';
import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { capture, knownGood } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { checkLines } from './check-lines.ts';

/** More engines than this are not looked through for the nearest name. */
const MOST_ENGINES = 2_000;

/** Checks a table of descriptions against the files chosen and the workshop's library. Keeps nothing. */
export async function checkDescriptions(
  caller: PersonCaller,
  input: z.output<typeof importInput>,
): Promise<ImportCheckJson> {
  const [engines, present] = await Promise.all([
    db()
      .selectDistinct({ make: knownGood.make, model: knownGood.model })
      .from(knownGood)
      .where(and(eq(knownGood.workshopId, caller.workshopId), ne(knownGood.state, 'retired')))
      .limit(MOST_ENGINES),
    input.files.length === 0
      ? []
      : db()
          .selectDistinct({ name: capture.fileName })
          .from(capture)
          .where(
            and(
              eq(capture.workshopId, caller.workshopId),
              isNull(capture.deletedAt),
              inArray(capture.fileName, input.files),
            ),
          ),
  ]);
  const { fault, lines, without } = checkLines(input.csv, {
    files: input.files,
    engines: engines.map(({ make, model }) => `${make} ${model}`),
    present: new Set(present.map(({ name }) => name)),
    newEngines: input.newEngines,
  });
  if (fault !== null) throw new ApiError('invalid', { details: [{ path: 'csv', message: fault }] });
  return { fits: lines.every(({ verdict }) => verdict !== 'bad'), lines: [...lines], without: [...without] };
}
