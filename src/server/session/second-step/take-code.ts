import { and, eq, isNotNull, lt } from 'drizzle-orm';
import type { Executor } from '../../db/client.ts';
import { secondStep } from '../../db/schema.ts';
import { unseal } from '../../seal.ts';
import { spendRecoveryCode } from './recovery-codes.ts';
import { stepOfCode } from './totp.ts';

/**
 * Takes a code of the authenticator or a recovery code; gives which it was, or null. A code works once: its time step is
 * raised in the row, and only upwards, so of two that come at once one is refused.
 */
export async function takeCode(
  tx: Executor,
  personId: string,
  typed: string,
): Promise<'authenticator' | 'recovery code' | null> {
  const inUse = and(eq(secondStep.personId, personId), isNotNull(secondStep.confirmedAt));
  const [row] = await tx.select().from(secondStep).where(inUse);
  if (row === undefined) return null;
  const step = stepOfCode(unseal('second step', row.sealed), typed.replace(/\s/g, ''), Date.now());
  if (step === null) return (await spendRecoveryCode(tx, personId, typed)) ? 'recovery code' : null;
  const taken = await tx
    .update(secondStep)
    .set({ lastStep: step })
    .where(and(inUse, lt(secondStep.lastStep, step)))
    .returning({ personId: secondStep.personId });
  return taken.length > 0 ? 'authenticator' : null;
}
