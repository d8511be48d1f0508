import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { measurements } from '../../contract/areas/captures.ts';
import { ENGINE_VERSION } from '../../engine/version.ts';
import type { CaptureRecord } from '../access.ts';
import { db } from '../db/client.ts';
import { measurement } from '../db/schema.ts';

/**
 * The measured values. `stale`: the capture was changed since and is read or measured again; the old values stay until
 * then. Before the first measuring there are none, and that is what the answer says.
 */
export async function captureMeasurements(row: CaptureRecord): Promise<z.input<typeof measurements>> {
  const [found] = await db().select().from(measurement).where(eq(measurement.captureId, row.id));
  if (found === undefined) {
    return {
      capture: row.id,
      revision: row.revision,
      engine: ENGINE_VERSION,
      stale: true,
      signals: [],
      relations: [],
    };
  }
  const { revision, engine, signals, relations } = found;
  const stale = revision !== row.revision;
  return { capture: row.id, revision, engine, stale, ...mutable({ signals, relations }) };
}

/** The engine's shapes are read-only; the contract's are not. */
function mutable(findings: Pick<typeof measurement.$inferSelect, 'signals' | 'relations'>) {
  type Json = Pick<z.input<typeof measurements>, 'signals' | 'relations'>;
  return findings as unknown as Json;
}
