import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, expect, it } from 'vitest';
import { forgetRates, makeThings, makeWorkshop, origin, pool, send } from './security-kit.ts';

afterAll(() => pool.end());

/** What the mail catcher holds, as text, once it mentions the address. */
async function mailTo(address: string): Promise<string> {
  const page = process.env.GAPMARK_TEST_MAIL ?? '';
  for (let tries = 0; tries < 100; tries += 1, await sleep(100)) {
    const text = await (await fetch(new URL('messages.json', page))).text();
    if (text.includes(address)) return text;
  }
  throw new Error(`no mail to ${address} was caught`);
}

it('an answer is told to who made the link, with a way back to the capture', async () => {
  await forgetRates();
  const shop = await makeWorkshop();
  const things = await makeThings(shop.id, shop.technician);
  const body = { name: 'Kit\r\nBcc: all@people.example', text: 'Bent tooth <b>there</b>.' };
  const refused = await send('POST', `/api/v1/shared/${things.answerSecret}/answers`, {
    headers: { origin },
    body,
  });
  const named = refused.status === 422 ? { ...body, name: 'Kit' } : body;
  const answer = await send('POST', `/api/v1/shared/${things.answerSecret}/answers`, {
    headers: { origin },
    body: named,
  });
  expect(answer.status).toBe(201);
  const mail = await mailTo(shop.technician.email);
  expect(mail).toContain(things.capture);
  expect(mail).not.toContain(things.answerSecret);
  expect(mail).not.toMatch(/"(to|bcc)":[^}]*all@people\.example/i);
});
