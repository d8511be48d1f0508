import type { Mail } from './queue-mail.ts';

interface Question {
  readonly to: string;
  readonly from: string;
  readonly title: string;
  readonly question: string;
  readonly url: string;
  readonly mayAnswer: boolean;
  readonly expiresAt: Date;
}

/** Asks a colleague, who needs no account, to look at a trace. */
export const questionMail = ({ to, from, title, question, url, mayAnswer, expiresAt }: Question): Mail => ({
  kind: 'question',
  to,
  subject: `${from} asks you about ${title}`,
  notAfter: expiresAt,
  parts: [
    `${from} shows you the trace "${title}"${question === '' ? '.' : ' and asks:'}`,
    ...(question === '' ? [] : [{ quote: question }]),
    { label: mayAnswer ? 'See the trace and answer' : 'See the trace', link: url },
    `It opens on a phone or desk without an account, until ${expiresAt.toISOString().slice(0, 10)}.`,
  ],
});
