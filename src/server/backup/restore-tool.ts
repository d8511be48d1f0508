import { closeDatabase } from '../db/client.ts';
import { RestoreRefused, restore } from './restore.ts';

/** `node dist/tools/restore.js FILE`; prints how much there was, and the secret that belongs to it, as JSON. */
const [file] = process.argv.slice(2);
if (file === undefined) throw new Error('Which file?');
try {
  process.stdout.write(`${JSON.stringify(await restore(file))}\n`);
} catch (error) {
  if (!(error instanceof RestoreRefused)) throw error;
  process.stdout.write(`${JSON.stringify({ refused: error.message })}\n`);
  process.exitCode = 3;
} finally {
  await closeDatabase();
}
