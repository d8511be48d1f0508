import { eq } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture } from '../../db/schema.ts';
import { deleteObjects } from '../../storage/delete-objects.ts';
import { capturePrefix, versionOfKey } from '../../storage/keys.ts';
import { listKeys } from '../../storage/list-keys.ts';

/** Removes samples older than those that the capture's row names; newer ones may belong to an attempt that runs. */
export async function dropSamples(captureId: string): Promise<void> {
  const [row] = await db()
    .select({ samplesVersion: capture.samplesVersion })
    .from(capture)
    .where(eq(capture.id, captureId));
  if (row === undefined) return;
  const keys = await listKeys(capturePrefix(captureId));
  await deleteObjects(
    keys.filter((key) => {
      const version = versionOfKey(key);
      return version !== null && version < row.samplesVersion;
    }),
  );
}
