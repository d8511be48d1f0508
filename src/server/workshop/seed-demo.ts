import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { eq } from 'drizzle-orm';
import { z } from 'zod';
import { config } from '../config.ts';
import { closeDatabase, db } from '../db/client.ts';
import { workshop } from '../db/schema.ts';
import { createToken } from '../session/create-token.ts';
import { DemoClient } from './demo-client.ts';
import { demoWork } from './demo-work.ts';
import { ensureDemoPeople } from './ensure-demo-people.ts';

/**
 * Fills the demo workshop once, through the running web and worker. Interrupted, it goes on from where it was: what is
 * there is recognised by its title. Prints `{"token":"…"}` as its last line when it has just finished. Run from the
 * project's root.
 */
const sampleIndex = z.array(
  z.object({ file: z.string(), title: z.string(), text: z.string(), cylinders: z.number().int() }),
);

async function seed(): Promise<string | null> {
  if (config().production)
    throw new Error('The demo workshop has known passwords and is refused in production.');
  const { people, workshopId, finished } = await ensureDemoPeople();
  if (finished) return null;
  const tokenOf = async (index: number, name: string) =>
    (await createToken(people[index]!, { name, scopes: ['read', 'write', 'manage'] }, 'start')).token;
  const owner = await tokenOf(0, 'Demo token');
  const folder = join(process.cwd(), 'public', 'samples');
  const samples = sampleIndex.parse(JSON.parse(await readFile(join(folder, 'index.json'), 'utf8')));
  const instructor = new DemoClient(config().origin, await tokenOf(1, 'Demo seeding'));
  const technician = new DemoClient(config().origin, await tokenOf(2, 'Demo seeding'));
  await demoWork({ technician, instructor, samples, folder });
  await db().update(workshop).set({ demo: true }).where(eq(workshop.id, workshopId));
  return owner;
}

try {
  const token = await seed();
  if (token !== null) process.stdout.write(`${JSON.stringify({ token })}\n`);
} finally {
  await closeDatabase();
}
