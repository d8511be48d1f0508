import { setTimeout as sleep } from 'node:timers/promises';
import { type CaughtMail, mailsTo } from './caught-mail.ts';

/** The newest mail to an address with this subject. */
export async function mailAbout(address: string, subject: RegExp): Promise<CaughtMail> {
  for (let tries = 0; tries < 100; tries += 1, await sleep(100)) {
    const found = (await mailsTo(address)).find((mail) => subject.test(mail.subject));
    if (found !== undefined) return found;
  }
  throw new Error(`no mail about ${subject} to ${address} was caught`);
}

/** The secret of the link with this path in such a mail. */
export async function secretMailed(address: string, subject: RegExp, path: string): Promise<string> {
  const { text } = await mailAbout(address, subject);
  const link = new RegExp(`https?://\\S+${path}\\?key=(\\S+)`).exec(text)?.[1];
  if (link === undefined) throw new Error(`the mail holds no link to ${path}`);
  return link;
}
