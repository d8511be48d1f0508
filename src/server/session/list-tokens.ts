import { and, desc, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { token as tokenShape } from '../../contract/areas/workshop.ts';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { token } from '../db/schema.ts';

/** The person's own tokens for the current workshop, newest first, ended ones too, without secrets. */
export async function listTokens(caller: PersonCaller): Promise<z.input<typeof tokenShape>[]> {
  const rows = await db()
    .select()
    .from(token)
    .where(and(eq(token.personId, caller.personId), eq(token.workshopId, caller.workshopId)))
    .orderBy(desc(token.createdAt))
    .limit(200);
  return rows.map((row) => ({
    id: row.id,
    name: row.name,
    scopes: row.scopes,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
  }));
}
