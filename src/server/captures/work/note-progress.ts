import { and, eq } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture } from '../../db/schema.ts';
import { Superseded } from './superseded.ts';

/** Writes how far the present phase is, 0 to 1. Throws Superseded when the capture is no longer in that phase. */
export async function noteProgress(
  at: { readonly id: string; readonly revision: number },
  phase: 'reading' | 'measuring',
  part: number,
): Promise<void> {
  const [row] = await db()
    .update(capture)
    .set({ progress: Math.min(1, Math.max(0, part)) })
    .where(and(eq(capture.id, at.id), eq(capture.revision, at.revision), eq(capture.status, phase)))
    .returning({ id: capture.id });
  if (row === undefined)
    throw new Superseded(`Capture ${at.id} is no longer ${phase} at revision ${at.revision}`);
}
