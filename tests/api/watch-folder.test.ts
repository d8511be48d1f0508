import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { appendFileSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, expect, it } from 'vitest';
import { sampleCsv } from './capture-kit.ts';
import { until } from './faults-kit.ts';
import { makeToken, makeWorkshop, origin, pool } from './security-kit.ts';

const folder = mkdtempSync(join(tmpdir(), 'gapmark-watch-'));
const running: { readonly end: () => Promise<void> }[] = [];
afterAll(async () => {
  for (const one of running) await one.end();
  rmSync(folder, { recursive: true, force: true });
  await pool.end();
});

function watch(token: string) {
  const script = resolve(import.meta.dirname, '../../samples/watch-folder.mjs');
  const child = spawn(process.execPath, [script, folder, origin], {
    env: { ...process.env, GAPMARK_TOKEN: token },
  });
  let said = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream.on('data', (data) => {
      said += String(data);
    });
  }
  const end = async () => {
    if (child.exitCode !== null || child.signalCode !== null) return;
    const gone = once(child, 'exit');
    child.kill('SIGTERM');
    await gone;
  };
  const one = { said: () => said, end };
  running.push(one);
  return one;
}

it('the watching example uploads what appears, once each, also after it was started again', async () => {
  const shop = await makeWorkshop();
  const token = await makeToken(shop.technician, shop.id, ['write']);
  const titles = async () => {
    const { rows } = await pool.query(
      'select file_name from capture where workshop_id = $1 order by file_name',
      [shop.id],
    );
    return rows.map((row: { file_name: string }) => row.file_name);
  };
  const first = watch(token);
  writeFileSync(join(folder, 'one.csv'), sampleCsv(300));
  writeFileSync(join(folder, 'notes.md'), 'not a capture');
  await until(async () => (await titles()).length === 1, 60, first.said);
  await until(() => first.said().includes(`${origin}/captures/`), 60, first.said);
  await first.end();
  const second = watch(token);
  writeFileSync(join(folder, 'two.csv'), sampleCsv(301));
  appendFileSync(join(folder, 'two.csv'), '');
  writeFileSync(join(folder, 'copy of one.csv'), readFileSync(join(folder, 'one.csv')));
  await until(async () => (await titles()).length === 2, 60, second.said);
  await until(() => second.said().includes('two.csv'), 60, second.said);
  expect(await titles()).toEqual(['one.csv', 'two.csv']);
  expect(readFileSync(join(folder, 'one.csv'), 'utf8')).toBe(sampleCsv(300));
});
