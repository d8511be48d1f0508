import { HeadBucketCommand } from '@aws-sdk/client-s3';
import { sql } from 'drizzle-orm';
import { db } from '../db/client.ts';
import { bucket, store } from '../storage/client.ts';

const PATIENCE_MS = 3_000;
/** The API's version, which the OpenAPI text carries too. */
export const API_VERSION = '1';

/** Whether the database and the store answer within three seconds. */
export async function checkHealth() {
  const [database, objects] = await Promise.all([
    answers(() => db().execute(sql`select 1`)),
    answers(() =>
      store().send(new HeadBucketCommand({ Bucket: bucket() }), {
        abortSignal: AbortSignal.timeout(PATIENCE_MS),
      }),
    ),
  ]);
  const status = database && objects ? ('ok' as const) : ('degraded' as const);
  return { status, database, store: objects, version: API_VERSION };
}

async function answers(call: () => Promise<unknown>): Promise<boolean> {
  const late = new Promise<boolean>((resolve) => setTimeout(() => resolve(false), PATIENCE_MS).unref());
  const answered = call().then(
    () => true,
    () => false,
  );
  return Promise.race([answered, late]);
}
