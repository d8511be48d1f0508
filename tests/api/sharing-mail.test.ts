import { afterAll, expect, it } from 'vitest';
import { mailsTo } from '../kit/caught-mail.ts';
import { forgetRates, makeThings, makeWorkshop, origin, pool, send, storeSamples } from './security-kit.ts';

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

it('a question goes to a colleague by mail, in text and HTML with a picture of the trace, and the link that its answer comes back by', async () => {
  await forgetRates();
  const shop = await makeWorkshop();
  const things = await makeThings(shop.id, shop.technician);
  await storeSamples(things.capture);
  const to = `${things.capture}@people.example`;
  const made = await send('POST', `/api/v1/captures/${things.capture}/share-links`, {
    headers: shop.technician.browser,
    body: { question: 'Tooth 23: chip & dirt?', email: to },
  });
  expect(made.status).toBe(201);
  const [mail, ...more] = await mailsTo(to);
  expect(more).toEqual([]);
  expect(mail?.subject).toBe('Test technician asks you about Crank and cam');
  expect(mail?.text).toContain('Tooth 23: chip & dirt?');
  expect(mail?.html).toContain('Tooth 23: chip &amp; dirt?');
  expect(mail?.text).toContain('[Picture: The trace "Crank and cam"]');
  const picture = /src="data:image\/png;base64,([^"]+)"/.exec(mail?.html ?? '')?.[1] ?? '';
  expect(Buffer.from(picture, 'base64').subarray(1, 4).toString('latin1')).toBe('PNG');
  expect(Buffer.from(picture, 'base64').length).toBeGreaterThan(5_000);
  const link = /http\S+\/s\/([\w-]{43})/.exec(mail?.text ?? '');
  expect(link?.[0]).toBe(made.json.url);
  const body = { name: 'Kit', text: 'A chip.' };
  const answered = await send('POST', `/api/v1/shared/${link?.[1]}/answers`, { headers: { origin }, body });
  expect(answered.status).toBe(201);
  const [back] = await mailsTo(shop.technician.email);
  expect(back?.text).toContain('A chip.');
});
