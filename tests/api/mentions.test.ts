import { afterAll, expect, it } from 'vitest';
import { mailsTo } from '../kit/caught-mail.ts';
import { forgetRatesOf, makeThings, makeWorkshop, origin, pool, send } from './security-kit.ts';

const FROM = '127.0.0.5';
afterAll(() => pool.end());

it('a mark mails the colleagues whom it names, once, and nobody who may not see it or does not want it', async () => {
  await forgetRatesOf(FROM);
  const shop = await makeWorkshop();
  const things = await makeThings(shop.id, shop.technician);
  await pool.query('update person set name = $2 where id = $1', [shop.learner.id, 'Lena Practice']);
  await pool.query('update person set name = $2 where id = $1', [shop.owner.id, 'Otto Quiet']);
  await send('PATCH', '/api/v1/me', { headers: shop.owner.browser, body: { mutedMail: ['mentions'] } });
  const text = 'Chip here, @test instructor? Not for @Lena Practice, @Otto Quiet or @Test technician.';
  const mark = { kind: 'point', signal: 0, from: 0.1, to: null, value: null, text };
  const headers = shop.technician.browser;
  const made = await send('POST', `/api/v1/captures/${things.capture}/marks`, { headers, body: mark });
  expect(made.status).toBe(201);
  const [mail] = await mailsTo(shop.instructor.email);
  expect(mail?.subject).toBe('Test technician names you on Crank and cam');
  expect(mail?.text).toContain(`${origin}/captures/${things.capture}`);
  // Named before, so not told again; a mail that comes last shows that no other is on its way.
  const again = { text: `${text} Looked at it.` };
  expect((await send('PATCH', `/api/v1/marks/${made.json.id}`, { headers, body: again })).status).toBe(200);
  for (const person of [shop.instructor, shop.learner, shop.owner, shop.technician]) {
    await send('POST', '/api/v1/password-resets', {
      headers: { origin },
      from: FROM,
      body: { email: person.email },
    });
    const subjects = async () => (await mailsTo(person.email)).map(({ subject }) => subject).sort();
    await expect.poll(subjects, { timeout: 20_000 }).toContain('Set a new password');
    const expected =
      person === shop.instructor ? ['Set a new password', mail?.subject] : ['Set a new password'];
    expect(await subjects()).toEqual(expected);
  }
});

it('a job that is handed over is told to whom it goes, and to nobody who takes it themselves', async () => {
  const shop = await makeWorkshop();
  const headers = shop.technician.browser;
  const made = await send('POST', '/api/v1/jobs', { headers, body: { complaint: 'Cranks, does not start' } });
  expect(made.status, made.text).toBe(201);
  const path = `/api/v1/jobs/${made.json.id}`;
  const hand = (assigneeId: string) => send('PATCH', path, { headers, body: { assigneeId } });
  expect((await hand(shop.instructor.id)).status).toBe(200);
  const mails = await mailsTo(shop.instructor.email);
  expect(mails.map(({ subject }) => subject)).toEqual(['Test technician hands J-0001 to you']);
  expect(mails[0]?.text).toContain('Cranks, does not start');
  expect((await hand(shop.technician.id)).status).toBe(200);
  expect((await hand(shop.owner.id)).status).toBe(200);
  expect(await mailsTo(shop.owner.email)).toHaveLength(1);
  const caught = await fetch(new URL('messages.json', process.env.GAPMARK_TEST_MAIL));
  const all = (await caught.json()) as { to: string[] }[];
  expect(all.filter(({ to }) => to.includes(shop.technician.email))).toEqual([]);
});
