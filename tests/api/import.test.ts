import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeThings, makeWorkshop, pool, send, type Workshop } from './security-kit.ts';

/** POST /captures/import-check on the running product. */
let here: Workshop;
beforeAll(async () => {
  here = await makeWorkshop();
  await makeThings(here.id, here.technician);
});
afterAll(() => pool.end());

const check = (csv: string, files: string[], over = {}) =>
  send('POST', '/api/v1/captures/import-check', {
    headers: here.instructor.browser,
    body: { csv, files, ...over },
  });

it('knows the engines of the workshop’s library and no other’s, and names the nearest', async () => {
  const csv = 'file,make,model\na.csv,Corvane,Talin\nb.csv,Corvane,Talim\nc.csv,Brumal,Tarn\n';
  const { status, json } = await check(csv, ['a.csv', 'b.csv', 'c.csv']);
  expect(status).toBe(200);
  expect(json.fits).toBe(false);
  expect(json.lines.map((line: { verdict: string }) => line.verdict)).toEqual(['good', 'bad', 'bad']);
  expect(json.lines[1].text).toContain('Is “Corvane Talin” meant?');
  expect((await check(csv, ['a.csv', 'b.csv', 'c.csv'], { newEngines: true })).json.fits).toBe(true);
});

it('says that a capture of a file with this name is here already', async () => {
  const { json } = await check('file\nprivate-name.csv\n', ['private-name.csv']);
  expect(json.lines[0]).toMatchObject({ verdict: 'watch' });
  expect(json.fits).toBe(true);
});

it('takes 5 000 lines with double names and unknown engines, a sentence each', async () => {
  const files = Array.from({ length: 5_000 }, (_, at) => `trace-${at}.csv`);
  const rows = files.map((file, at) =>
    at % 10 === 9 ? `${files[at - 1]},Corvane,Talin` : `${file},Corvane,Tarn ${at}`,
  );
  const { status, json } = await check(`file,make,model\n${rows.join('\n')}\n`, files);
  expect(status).toBe(200);
  expect(json.lines).toHaveLength(5_000);
  expect(json.lines[9].text).toMatch(/stands in line 10 already/);
  expect(
    json.lines.every(
      ({ verdict, text }: { verdict: string; text: string }) => verdict === 'bad' && text !== '',
    ),
  ).toBe(true);
});

it('refuses a table that is none as a whole, in words', async () => {
  const { status, json } = await check('title,note\nx,y\n', ['a.csv']);
  expect(status).toBe(422);
  expect(json.error.details[0]).toMatchObject({ path: 'csv' });
  expect(json.error.details[0].message).toMatch(/one of them “file”/);
});
