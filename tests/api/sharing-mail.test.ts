import { afterAll, expect, it } from 'vitest';
import { mailsTo } from '../kit/caught-mail.ts';
import { forgetRates, makeThings, makeWorkshop, origin, pool, send } from './security-kit.ts';

afterAll(() => pool.end());

it('an answer is told in plain text to who made the link, and what was typed makes no header of its own', async () => {
  await forgetRates();
  const shop = await makeWorkshop();
  const things = await makeThings(shop.id, shop.technician);
  const body = { name: 'Kit\r\nBcc: all@people.example', text: 'Bent tooth <b>there</b>.' };
  const path = `/api/v1/shared/${things.answerSecret}/answers`;
  expect((await send('POST', path, { headers: { origin }, body })).status).toBe(201);
  const [mail, ...more] = await mailsTo(shop.technician.email);
  expect(more).toEqual([]);
  expect(mail?.to).toEqual([shop.technician.email]);
  expect(mail?.subject).toBe('Kit Bcc: all@people.example answered about Crank and cam');
  expect(mail?.html).toBeNull();
  expect(mail?.text).toContain(body.text);
  expect(mail?.text).toContain(`${origin}/captures/${things.capture}`);
  expect(mail?.text).not.toContain(things.answerSecret);
});
