import { eq } from 'drizzle-orm';
import { closeDatabase, db } from '../db/client.ts';
import { person } from '../db/schema.ts';
import { newSecret } from '../ids.ts';
import { recordAudit } from '../workshop/audit.ts';
import { hashPassword } from './password.ts';
import { forgetSecondStep } from './second-step/end-second-step.ts';
import { setPassword } from './set-password.ts';

/**
 * `node dist/tools/reset-password.js EMAIL [--without-code]`: for whoever runs the server, when no mail arrives. Sets a random
 * password and prints it as JSON; with `--without-code` the second sign-in step is switched off too. Every session ends.
 */
const [email = '', option] = process.argv.slice(2);
try {
  const [found] = await db().select().from(person).where(eq(person.email, email.trim().toLowerCase()));
  if (found === undefined)
    process.stdout.write(`${JSON.stringify({ refused: 'There is no account with this address.' })}\n`);
  else {
    const password = newSecret().slice(0, 16);
    const passwordHash = await hashPassword(password);
    await db().transaction(async (tx) => {
      await setPassword(tx, found.id, passwordHash);
      if (option === '--without-code') await forgetSecondStep(tx, found.id);
      await recordAudit(
        {
          workshopId: found.currentWorkshopId,
          personId: found.id,
          who: 'whoever runs the server',
          action: 'password set by hand',
          subject: found.name,
          address: '',
        },
        tx,
      );
    });
    process.stdout.write(`${JSON.stringify({ password })}\n`);
  }
} finally {
  await closeDatabase();
}
