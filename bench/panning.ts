import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { chromium, type Page } from 'playwright-core';
import type * as TestCopy from '../scripts/lib/test-copy.mjs';

/**
 * Frames while the trace is panned and zoomed on the built page, with the processor slowed four times in Chromium, against frames
 * of an empty page slowed as much in the same run: what the machine itself costs is in both. Four signals of 166,650 samples.
 * Prints the share of frames over 32 ms and 50 ms, and the longest.
 */
const ROUNDS = 5;
const MOVES = 60;
const SAMPLES = 166_650;

const copy = process.env.GAPMARK_TEST_ORIGIN === undefined ? await startCopy() : null;
const origin = process.env.GAPMARK_TEST_ORIGIN ?? copy?.env.GAPMARK_TEST_ORIGIN ?? '';
const token = process.env.GAPMARK_TEST_TOKEN ?? copy?.env.GAPMARK_TEST_TOKEN ?? '';
const browser = await chromium.launch({
  executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
  args: ['--no-sandbox', '--disable-quic', '--no-first-run', '--disable-background-networking'],
});
try {
  const id = await upload();
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
  await signIn(page);
  await page.goto(`${origin}/captures/${id}`);
  await page.locator('.plot-lane[data-layout="columns"]').first().waitFor();
  await page.waitForLoadState('networkidle');
  const session = await page.context().newCDPSession(page);
  await session.send('Emulation.setCPUThrottlingRate', { rate: 4 });
  const box = (await page.locator('.plot-stage').boundingBox())!;
  const middle = { x: box.x + box.width / 2, y: box.y + box.height / 2 };
  const pan: number[] = [];
  const zoom: number[] = [];
  const still: number[] = [];
  for (let round = 0; round < ROUNDS; round += 1) {
    await page.mouse.move(middle.x, middle.y);
    for (let i = 0; i < 8; i += 1) await page.mouse.wheel(0, -240);
    await page.waitForTimeout(400);
    pan.push(
      ...(await framesDuring(page, async () => {
        await page.mouse.down();
        for (let i = 1; i <= MOVES; i += 1) await page.mouse.move(middle.x + 300 * Math.sin(i / 8), middle.y);
        await page.mouse.up();
      })),
    );
    zoom.push(
      ...(await framesDuring(page, async () => {
        for (let i = 0; i < MOVES; i += 1) await page.mouse.wheel(0, i % 30 < 15 ? 60 : -60);
      })),
    );
    await page.keyboard.press('0');
  }
  await page.goto('about:blank');
  for (let round = 0; round < ROUNDS; round += 1)
    still.push(
      ...(await framesDuring(page, async () => {
        for (let i = 1; i <= MOVES; i += 1) await page.mouse.move(600 + 300 * Math.sin(i / 8), 400);
      })),
    );
  for (const [name, frames] of [
    ['panning', pan],
    ['zooming', zoom],
    ['an empty page', still],
  ] as const)
    process.stdout.write(`${name}: ${words(frames)}\n`);
} finally {
  await browser.close();
  await copy?.stop();
}

function words(frames: readonly number[]): string {
  const sorted = [...frames].sort((a, b) => a - b);
  const share = (limit: number) =>
    ((100 * sorted.filter((ms) => ms > limit).length) / sorted.length).toFixed(1);
  const at = (part: number) =>
    sorted[Math.min(Math.floor(part * sorted.length), sorted.length - 1)]!.toFixed(0);
  return `${frames.length} frames, median ${at(0.5)} ms, 95 % within ${at(0.95)} ms, ${share(32)} % over 32 ms, ${share(50)} % over 50 ms, longest ${at(1)} ms`;
}

/** Times between the frames that the page made while something happened. */
async function framesDuring(page: Page, work: () => Promise<void>): Promise<number[]> {
  await page.evaluate(() => {
    const frames: number[] = [];
    let last = performance.now();
    let on = true;
    const next = (now: number) => {
      frames.push(now - last);
      last = now;
      if (on) requestAnimationFrame(next);
    };
    requestAnimationFrame(next);
    Object.assign(globalThis, {
      endFrames: () => {
        on = false;
        return frames.slice(1);
      },
    });
  });
  await work();
  return page.evaluate(() => (globalThis as unknown as { endFrames: () => number[] }).endFrames());
}

async function signIn(page: Page): Promise<void> {
  await page.goto(`${origin}/sign-in`);
  await page.locator('input[name=email]').fill('technician@demo.example');
  await page.locator('input[name=password]').fill('crank-and-cam-demo');
  await page.keyboard.press('Enter');
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
}

async function startCopy() {
  const script = pathToFileURL(join(process.cwd(), 'scripts/lib/test-copy.mjs'));
  const { startTestCopy }: typeof TestCopy = await import(script.href);
  return startTestCopy((line: string) => process.stdout.write(`${line}\n`));
}

async function upload(): Promise<string> {
  const headers = { authorization: `Bearer ${token}` };
  const lines = ['Time (s),A (V),B (V),C (V),D (V)'];
  for (let i = 0; i < SAMPLES; i += 1) {
    const wave = [31.8, 15.9, 318, 7.95].map((period) => (5 * Math.sin(i / period)).toFixed(3));
    lines.push(`${(i / 50_000).toFixed(5)},${wave.join()}`);
  }
  const form = new FormData();
  form.append('file', new Blob([lines.join('\n')]), 'bench.csv');
  const made = await (
    await fetch(`${origin}/api/v1/captures`, { method: 'POST', headers, body: form })
  ).json();
  for (;;) {
    const capture = await (await fetch(`${origin}/api/v1/captures/${made.id}`, { headers })).json();
    if (capture.status === 'failed') throw new Error(capture.error.message);
    if (capture.status === 'ready') return made.id as string;
    await new Promise((done) => setTimeout(done, 200));
  }
}
