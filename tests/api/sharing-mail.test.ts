import { afterAll, expect, it } from 'vitest';
import { mailsTo } from '../kit/caught-mail.ts';
import { forgetRates, makeThings, makeWorkshop, origin, pool, send } from './security-kit.ts';

afterAll(() => pool.end());

it('an answer is told to who made the link, and what was typed makes no header and no markup', async () => {
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
  expect(mail?.html).toContain('Bent tooth &lt;b&gt;there&lt;/b&gt;.');
  expect(mail?.html).not.toContain('<b>');
  expect(mail?.text).toContain(body.text);
  expect(mail?.text).toContain(`${origin}/captures/${things.capture}`);
  expect(mail?.text).not.toContain(things.answerSecret);
});

it('an answer is not mailed to who has switched that off; it is kept all the same', async () => {
  await forgetRates();
  const shop = await makeWorkshop();
  const things = await makeThings(shop.id, shop.technician);
  await send('PATCH', '/api/v1/me', { headers: shop.technician.browser, body: { mutedMail: ['answers'] } });
  const path = `/api/v1/shared/${things.answerSecret}/answers`;
  const body = { name: 'Kit', text: 'Bent tooth there.' };
  expect((await send('POST', path, { headers: { origin }, body })).status).toBe(201);
  // Mails go in order: when this one is there, one about the answer would have been.
  await send('POST', '/api/v1/password-resets', {
    headers: { origin },
    body: { email: shop.technician.email },
  });
  const mails = await mailsTo(shop.technician.email);
  expect(mails.map((mail) => mail.subject)).toEqual(['Set a new password']);
  const answers = await send('GET', `/api/v1/captures/${things.capture}/answers`, {
    headers: shop.technician.browser,
  });
  expect(answers.json.items).toHaveLength(2);
});
