import { afterAll, expect, it } from 'vitest';
import { confirmationLink } from '../kit/caught-mail.ts';
import { forgetRates, makeThings, makeWorkshop, newId, origin, pool, send } from './security-kit.ts';

afterAll(() => pool.end());

/** Every row of every table, as text. */
async function dump(): Promise<string> {
  const tables = await pool.query(
    `select format('%I.%I', schemaname, tablename) as name from pg_tables
     where schemaname not in ('pg_catalog', 'information_schema')`,
  );
  let text = '';
  for (const { name } of tables.rows as { name: string }[]) {
    const { rows } = await pool.query(`select t::text as row from ${name} t`).catch(() => ({ rows: [] }));
    text += rows.map((each: { row: string }) => each.row).join('\n');
  }
  return text;
}

it('a dump of the database holds no session, token, link secret or password that was in use', async () => {
  await forgetRates();
  const password = `correct horse ${newId()}`;
  const account = { name: 'Dump', email: `${newId()}@people.example`, password, workshop: 'Dump' };
  await send('POST', '/api/v1/sign-up', { headers: { origin }, body: account });
  const secret = (await confirmationLink(account.email)).searchParams.get('key') ?? '';
  const pending = await dump();
  expect(pending).toContain(account.email);
  expect(pending.includes(secret)).toBe(false);
  const signedUp = await send('POST', '/api/v1/sign-up/confirm', { headers: { origin }, body: { secret } });
  const session = /gapmark=([^;]+)/.exec(signedUp.headers['set-cookie']?.[0] ?? '')?.[1] ?? '';
  const headers = { cookie: `gapmark=${session}`, origin, 'idempotency-key': newId() };
  const token = await send('POST', '/api/v1/tokens', {
    headers,
    body: { name: 't', scopes: ['read', 'write'] },
  });
  // Signing in with a token beside it must not keep the new cookie with the Idempotency-Key either.
  const withToken = { authorization: `Bearer ${token.json.token}`, 'idempotency-key': newId() };
  const body = { email: account.email, password };
  const signedIn = await send('POST', '/api/v1/sign-in', { headers: withToken, body });
  const second = /gapmark=([^;]+)/.exec(signedIn.headers['set-cookie']?.[0] ?? '')?.[1] ?? '';
  const shop = await makeWorkshop();
  const things = await makeThings(shop.id, shop.owner);
  const link = await send('POST', `/api/v1/captures/${things.capture}/share-links`, {
    headers: { ...shop.owner.browser, 'idempotency-key': newId() },
    body: { question: 'q' },
  });
  const secrets = [password, session, second, token.json.token, link.json.url.split('/s/')[1]];
  for (const secret of secrets) expect(secret.length).toBeGreaterThan(20);
  const text = await dump();
  expect(text).toContain(account.email);
  for (const secret of secrets) expect(text.includes(secret)).toBe(false);
});
