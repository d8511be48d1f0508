import { lookup } from 'node:dns/promises';
import { isIP } from 'node:net';
import { and, count, eq, isNull } from 'drizzle-orm';
import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { webhook, workshop } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { newId, newSecret } from '../../ids.ts';
import { seal } from '../../seal.ts';
import { auditedBy, recordAudit } from '../audit.ts';
import { checkAddress, isExcepted } from './check-address.ts';
import { AddressRefused } from './checked-lookup.ts';
import { isPublicAddress } from './public-address.ts';

const LIMIT = 10;

const refused = (message: string) =>
  new ApiError('invalid', { message, details: [{ path: 'url', message }] });

/** Reads the address and looks its name up once, to tell at once what would never be delivered. */
async function checkNow(address: string): Promise<URL> {
  try {
    const url = checkAddress(address);
    const host = url.hostname.replace(/^\[|\]$/g, '');
    if (isExcepted(url) || isIP(host) !== 0) return url;
    const found = await lookup(host, { all: true }).catch(() => []);
    if (found.length === 0) throw new AddressRefused('Its name is not known. Check it for a slip.');
    if (!found.every((one) => isPublicAddress(one.address)))
      throw new AddressRefused('Its name points inward, to this machine or its network. That is refused.');
    return url;
  } catch (error) {
    if (error instanceof AddressRefused) throw refused(error.message);
    throw error;
  }
}

/** Tells an address from now on when a capture is measured. The key that signs is in this answer and nowhere else. */
export async function createWebhook(
  caller: PersonCaller,
  address: string,
  from: string,
): Promise<{ id: string; key: string }> {
  const url = await checkNow(address);
  const id = newId();
  const key = newSecret();
  await db().transaction(async (tx) => {
    const mine = eq(webhook.workshopId, caller.workshopId);
    await tx
      .select({ id: workshop.id })
      .from(workshop)
      .where(eq(workshop.id, caller.workshopId))
      .for('update');
    const [there] = await tx
      .select({ total: count() })
      .from(webhook)
      .where(and(mine, isNull(webhook.deletedAt)));
    if ((there?.total ?? 0) >= LIMIT)
      throw new ApiError('conflict', { message: `A workshop tells ${LIMIT} addresses at most.` });
    await tx.insert(webhook).values({
      id,
      workshopId: caller.workshopId,
      createdBy: caller.personId,
      url: url.href,
      sealedKey: seal('webhook key', key),
    });
    const entry = { ...auditedBy(caller, caller.workshopId, from), subject: url.origin };
    await recordAudit({ ...entry, action: 'webhook made' }, tx);
  });
  return { id, key };
}
