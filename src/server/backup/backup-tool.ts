import { closeDatabase } from '../db/client.ts';
import { backUp } from './back-up.ts';

/** `node dist/tools/backup.js FILE`; prints how much it holds as JSON. */
const [file] = process.argv.slice(2);
if (file === undefined) throw new Error('Which file?');
try {
  process.stdout.write(`${JSON.stringify(await backUp(file))}\n`);
} finally {
  await closeDatabase();
}
