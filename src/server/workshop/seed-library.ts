import { config } from '../config.ts';
import { closeDatabase } from '../db/client.ts';
import { createToken } from '../session/create-token.ts';
import { deleteToken } from '../session/delete-token.ts';
import { DemoClient } from './demo-client.ts';
import { ensureDemoPeople } from './ensure-demo-people.ts';
import { missingStarters, starterWork } from './starter-work.ts';

/**
 * Fills the demo workshop's library after the start, in the background, through the running web and worker like anybody's
 * work. Broken off, the next start goes on from where it was: what is there is recognised by its title. Run from the project's root.
 */
const LONGEST_MS = 2 * 3_600_000;

async function seed(): Promise<number> {
  if (config().production) return 0;
  const { people, finished, workshopId } = await ensureDemoPeople();
  const [, instructor, technician] = people;
  if (!finished || !instructor || !technician) return 0;
  const missing = await missingStarters(workshopId);
  if (missing.goods.length + missing.practice.length === 0) return 0;
  // Killed in the middle, its tokens end soon by themselves.
  const expiresAt = new Date(Date.now() + LONGEST_MS).toISOString();
  const tokens = await Promise.all(
    [instructor, technician].map(async (person) => ({
      person,
      ...(await createToken(
        person,
        { name: 'Starting library', scopes: ['read', 'write'], expiresAt },
        'start',
      )),
    })),
  );
  try {
    const [reviews, records] = tokens.map(({ token }) => new DemoClient(config().origin, token));
    return await starterWork(missing, { instructor: reviews!, technician: records! });
  } finally {
    for (const { person, id } of tokens) await deleteToken(person, id, 'start');
  }
}

try {
  const made = await seed();
  if (made > 0) process.stdout.write(`${made} recordings of the starting library made\n`);
} finally {
  await closeDatabase();
}
