import { setTimeout as sleep } from 'node:timers/promises';
import { z } from 'zod';

const caught = z.array(
  z.object({ to: z.array(z.string()), subject: z.string(), text: z.string(), html: z.string().nullable() }),
);
export type CaughtMail = z.infer<typeof caught>[number];

/** The mails that the catcher has for an address, once there is one. @throws when none came within ten seconds. */
export async function mailsTo(address: string): Promise<CaughtMail[]> {
  const page = process.env.GAPMARK_TEST_MAIL ?? '';
  for (let tries = 0; tries < 100; tries += 1, await sleep(100)) {
    const all = caught.parse(await (await fetch(new URL('messages.json', page))).json());
    const found = all.filter(({ to }) => to.includes(address));
    if (found.length > 0) return found;
  }
  throw new Error(`no mail to ${address} was caught`);
}

/** The link that confirms a sign-up, from the mail. */
export async function confirmationLink(address: string): Promise<URL> {
  const [mail] = await mailsTo(address);
  const link = /https?:\S+\/sign-up\/confirm\?key=\S+/.exec(mail?.text ?? '')?.[0];
  if (link === undefined) throw new Error(`the mail to ${address} holds no confirmation link`);
  return new URL(link);
}
