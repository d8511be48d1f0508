import { mkdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { SAMPLES } from './captures.ts';

const folder = join(process.cwd(), 'public', 'samples');
await mkdir(folder, { recursive: true });
for (const sample of SAMPLES) await writeFile(join(folder, sample.file), sample.csv());
const index = SAMPLES.map(({ file, title, text, cylinders }) => ({ file, title, text, cylinders }));
await writeFile(join(folder, 'index.json'), `${JSON.stringify(index, null, 2)}\n`);
process.stdout.write(`${SAMPLES.length} samples in public/samples\n`);
