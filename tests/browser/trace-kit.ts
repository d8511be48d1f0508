import { readFile } from 'node:fs/promises';
import type { Page } from 'playwright-core';
import { type Desk, makeDesk, settled, uploadCsv } from '../api/capture-kit.ts';
import { enterAs } from './browser-kit.ts';

/** What tests of the trace stand on: a workshop with a capture that was uploaded and measured by the product itself. */
export interface Bench {
  readonly desk: Desk;
  readonly id: string;
}

/** Uploads one of the product's own sample files and waits for its numbers. */
export async function measuredSample(file: string, title: string, desk?: Desk): Promise<Bench> {
  const text = await readFile(new URL(`../../public/samples/${file}`, import.meta.url), 'utf8');
  return measured(text, title, desk);
}

export async function measured(text: string, title: string, given?: Desk): Promise<Bench> {
  const desk = given ?? (await makeDesk());
  const id = await uploadCsv(desk, text, { title });
  const { status } = await settled(desk, id);
  if (status !== 'ready') throw new Error(`the capture became ${status}`);
  return { desk, id };
}

/** Opens the capture's page as its technician and waits until every lane was drawn. */
export async function openTrace(page: Page, { desk, id }: Bench, search = ''): Promise<void> {
  await enterAs(page, desk.workshop, 'technician');
  await page.goto(`/captures/${id}${search}`);
  await drawn(page);
}

/** Waits until the lanes were drawn with samples and nothing is on its way. */
export async function drawn(page: Page): Promise<void> {
  await page
    .locator('.plot-lane[data-layout="columns"], .plot-lane[data-layout="samples"]')
    .first()
    .waitFor();
  await page.waitForLoadState('networkidle');
}

export interface ShownView {
  readonly from: number;
  readonly to: number;
}

/** The view as the strip's grips say it. */
export async function shownView(page: Page): Promise<ShownView> {
  const at = async (name: string) =>
    Number(await page.getByRole('slider', { name }).getAttribute('aria-valuenow'));
  return { from: await at('Start of the view'), to: await at('End of the view') };
}

/** How often each lane's trace was drawn so far. */
export const draws = (page: Page): Promise<number[]> =>
  page
    .locator('.plot-lane')
    .evaluateAll((lanes) => lanes.map((lane) => Number((lane as HTMLElement).dataset.draws)));

/** Script bytes on the wire while `work` runs, as the browser received them. */
export async function scriptBytes(page: Page, work: () => Promise<void>): Promise<number> {
  const session = await page.context().newCDPSession(page);
  await session.send('Network.enable');
  await session.send('Network.setCacheDisabled', { cacheDisabled: true });
  const scripts = new Set<string>();
  let bytes = 0;
  session.on('Network.responseReceived', ({ requestId, response, type }) => {
    if (type === 'Script' || /javascript/.test(response.mimeType)) scripts.add(requestId);
  });
  session.on('Network.loadingFinished', ({ requestId, encodedDataLength }) => {
    if (scripts.has(requestId)) bytes += encodedDataLength;
  });
  await work();
  await session.detach();
  return bytes;
}
