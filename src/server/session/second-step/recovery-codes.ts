import { randomBytes } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import type { Executor } from '../../db/client.ts';
import { recoveryCode } from '../../db/schema.ts';
import { hashSecret } from '../../ids.ts';

const CODES = 10;
/** Without letters that look like digits. 20 of them from an alphabet of 32 are 100 random bits. */
const ALPHABET = 'abcdefghjkmnpqrstuvwxyz023456789';
const LENGTH = 20;

/** What was typed, without spaces, dashes and capitals. */
const normal = (typed: string) => typed.toLowerCase().replace(/[\s-]/g, '');

function newCode(): string {
  const letters = [...randomBytes(LENGTH)].map((byte) => ALPHABET[byte & 31]).join('');
  return letters.match(/.{5}/g)?.join('-') ?? letters;
}

/** Replaces a person's recovery codes; gives the new ones, which are nowhere else. */
export async function replaceRecoveryCodes(tx: Executor, personId: string): Promise<string[]> {
  const codes = Array.from({ length: CODES }, newCode);
  await tx.delete(recoveryCode).where(eq(recoveryCode.personId, personId));
  await tx.insert(recoveryCode).values(codes.map((one) => ({ personId, hash: hashSecret(normal(one)) })));
  return codes;
}

/** Uses up a recovery code; false when it is none, or was used. */
export async function spendRecoveryCode(tx: Executor, personId: string, typed: string): Promise<boolean> {
  const used = await tx
    .delete(recoveryCode)
    .where(and(eq(recoveryCode.personId, personId), eq(recoveryCode.hash, hashSecret(normal(typed)))))
    .returning({ hash: recoveryCode.hash });
  return used.length > 0;
}
