import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { join, makePerson } from '../api/security-kit.ts';
import {
  DESK,
  enterAs,
  expectAccessible,
  expectNoSidewaysScroll,
  launch,
  open,
  origin,
  PHONE,
} from './browser-kit.ts';
import { type Bench, drawn, measuredSample } from './trace-kit.ts';

let browser: Browser;
let bench: Bench;
let exerciseAddress = '';
let setAddress = '';

beforeAll(async () => {
  browser = await launch();
  bench = await measuredSample('crank-60-2-weak-tooth.csv', 'One short tooth');
});
afterAll(() => browser.close());

/** A learner of their own, so that every device has something to answer. */
async function enterAsNewLearner(page: Page): Promise<void> {
  const person = await makePerson('Wren Tallis');
  await join(person, bench.desk.workshop.id, 'learner');
  await page.context().addCookies([{ name: 'gapmark', value: person.sessionSecret, url: origin }]);
}

describe('teaching', () => {
  it('an instructor builds an exercise from a capture and sets it for every learner', async () => {
    const { page, complaints, close } = await open(browser, DESK);
    await enterAs(page, bench.desk.workshop, 'instructor');
    await page.goto('/teaching');
    await page.getByText('No sets yet').waitFor();
    await expectAccessible(page);
    await page.getByRole('link', { name: 'New exercise' }).click();
    await page.getByRole('link', { name: 'One short tooth' }).click();
    await drawn(page);
    await page.getByRole('button', { name: 'Span', exact: true }).click();
    await page.getByRole('button', { name: /^Span on/ }).click();
    await page.getByLabel('Label of place 1').fill('the short tooth');
    await page.getByLabel('Title').fill('What is wrong, and where?');
    await page.getByLabel('What to do').fill('Lay a stretch on the trouble, then choose its cause.');
    await page.getByRole('checkbox', { name: 'Choose a stretch' }).check();
    for (const cause of ['Bent or chipped tooth', 'Wide air gap at the sensor', 'Nothing wrong here'])
      await page.getByRole('checkbox', { name: cause }).check();
    await page.getByLabel('The answer in one sentence').fill('One tooth is short, every turn.');
    await page.getByLabel('Step 1 of the reasoning').fill('One or all?');
    await page.getByLabel('What step 1 shows').fill('Only one is short: a wide gap lowers all.');
    await page.getByRole('button', { name: 'Open', exact: true }).click();
    await page.getByRole('button', { name: 'Save' }).click();
    // What is missing is named, and what was typed stays.
    await page.getByText('Which cause is right: is not among the choices').waitFor();
    await expectAccessible(page);
    await page.getByLabel('Which is right').selectOption({ label: 'Bent or chipped tooth' });
    await page.getByRole('button', { name: 'Save' }).click();
    await page.waitForURL(/\/teaching\/exercises\/[a-z0-9]{16,40}$/);
    exerciseAddress = new URL(page.url()).pathname;
    await page.getByRole('button', { name: 'Show the answer' }).click();
    await page.getByText('One tooth is short, every turn.').waitFor();

    await page.goto('/teaching/sets/new');
    await page.getByLabel('Title').fill('First steps');
    await page.getByRole('button', { name: 'Text', exact: true }).click();
    await page.getByLabel('Text of item 1').fill('Look at the gap first.');
    await page.getByLabel('Add an exercise').selectOption({ label: 'What is wrong, and where?' });
    await page.getByRole('button', { name: 'Move item 2 up' }).click();
    await page.getByRole('button', { name: 'Move item 1 down' }).click();
    await page.getByRole('button', { name: 'Open', exact: true }).click();
    await expectAccessible(page);
    await page.getByRole('button', { name: 'Save' }).click();
    await page.getByText('Saved.').waitFor();
    await page.getByRole('link', { name: 'See it' }).click();
    await page.getByText('Look at the gap first.').waitFor();
    setAddress = new URL(page.url()).pathname;
    await expectAccessible(page);
    expect(complaints).toEqual([]);
    await close();
  });

  it.each([
    ['phone', PHONE],
    ['desk', DESK],
  ] as const)(
    'a learner on a %s answers once, and then names, evidence and reasoning open',
    async (name, device) => {
      const { page, complaints, close } = await open(browser, device);
      await enterAsNewLearner(page);
      await page.goto('/teaching');
      await page.getByRole('link', { name: /First steps/ }).click();
      await page.waitForURL(`**${setAddress}`);
      await expectNoSidewaysScroll(page);
      await expectAccessible(page);
      await page.getByRole('link', { name: 'Begin' }).click();
      await page.waitForURL(`**${exerciseAddress}`);
      await drawn(page);
      await page.getByText('Signal 1').first().waitFor();
      expect(await page.content()).not.toContain('One short tooth');
      await expectNoSidewaysScroll(page);
      await expectAccessible(page);
      await page.getByRole('button', { name: 'Commit my answer' }).click();
      await page.getByText('Lay a stretch on the trace').first().waitFor();
      await page.getByRole('button', { name: 'Stretch', exact: true }).click();
      await page.getByRole('slider', { name: 'Start of the span' }).waitFor();
      await page.getByText('Wide air gap at the sensor').click();
      await page.getByRole('button', { name: 'Rather sure' }).click();
      await page.emulateMedia({ colorScheme: 'dark' });
      await expectAccessible(page);
      await page.getByRole('button', { name: 'Commit my answer' }).click();
      // The editor's span and the learner's both begin as the middle third of the whole.
      await page.getByText('stretch right, cause not').waitFor();
      await page.getByText('One tooth is short, every turn.').waitFor();
      await page.getByText('Only one is short: a wide gap lowers all.').waitFor();
      await page.locator('.plot-evidence').first().waitFor({ state: 'attached' });
      await expectNoSidewaysScroll(page);
      await expectAccessible(page);
      await page.reload();
      await page.getByText('stretch right, cause not').waitFor();
      expect(await page.getByRole('button', { name: 'Commit my answer' }).count()).toBe(0);
      await page.getByRole('link', { name: 'Open as a capture' }).click();
      await page.getByRole('heading', { name: 'One short tooth' }).waitFor();
      expect(complaints, name).toEqual([]);
      await close();
    },
  );

  it.each([
    ['phone', PHONE],
    ['desk', DESK],
  ] as const)('an instructor on a %s sees who took what for what', async (_, device) => {
    const { page, complaints, close } = await open(browser, device);
    await enterAs(page, bench.desk.workshop, 'instructor');
    await page.goto('/teaching');
    const table = page.getByRole('region', { name: 'What is taken for what' });
    expect(await table.getByRole('row').nth(1).innerText()).toMatch(/Bent or chipped tooth[\s\S]*2/);
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    await page.emulateMedia({ colorScheme: 'dark' });
    await expectAccessible(page);
    await page.getByRole('link', { name: 'partly right' }).first().click();
    await page.getByText('“Wide air gap at the sensor”').first().waitFor();
    await expectAccessible(page);
    expect(complaints).toEqual([]);
    await close();
  });

  it('many files are checked against their table before anything is sent, then sent line by line', async () => {
    const { page, complaints, close } = await open(browser, PHONE);
    await enterAs(page, bench.desk.workshop, 'instructor');
    await page.goto('/teaching/import');
    const trace = (name: string) => ({
      name,
      mimeType: 'text/csv',
      buffer: Buffer.from('Time,A\n0,0\n0.001,1\n0.002,0\n'),
    });
    const table = (text: string) => ({ name: 'table.csv', mimeType: 'text/csv', buffer: Buffer.from(text) });
    await page.getByLabel('Captures', { exact: true }).setInputFiles([trace('a.csv'), trace('b.csv')]);
    await page
      .getByLabel('Table of descriptions')
      .setInputFiles(table('file,title\na.csv,First\na.csv,Second\nc.csv,Third\n'));
    await page.getByRole('button', { name: 'Check the table' }).click();
    await page.getByText('2 of 3 lines need attention').waitFor();
    await page.getByText('“a.csv” stands in line 2 already.').waitFor();
    expect(await page.getByRole('button', { name: /^Send/ }).count()).toBe(0);
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    await page
      .getByLabel('Table of descriptions')
      .setInputFiles(table('file;title;note\nb.csv;Second file;Seen on a bench\na.csv;First file;\n'));
    await page.getByRole('button', { name: 'Check the table' }).click();
    await page.getByRole('button', { name: 'Send 2' }).click();
    await page.getByText('2 of 2 arrived').waitFor();
    await page.getByRole('link', { name: 'arrived' }).first().click();
    await page.waitForURL('**/captures/*');
    const note = await page.request.get(`/api/v1${new URL(page.url()).pathname}`);
    expect(await note.json()).toMatchObject({ title: 'Second file', note: 'Seen on a bench' });
    expect(complaints).toEqual([]);
    await close();
  });
});
