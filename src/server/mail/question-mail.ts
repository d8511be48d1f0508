import type { Mail } from './queue-mail.ts';

interface Question {
  readonly to: string;
  readonly from: string;
  readonly title: string;
  readonly question: string;
  readonly url: string;
  readonly mayAnswer: boolean;
  readonly expiresAt: Date;
  /** The trace as PNG. */
  readonly picture: Buffer | null;
}

/** Asks a colleague, who needs no account, to look at a trace. */
export const questionMail = ({
  to,
  from,
  title,
  question,
  url,
  mayAnswer,
  expiresAt,
  picture,
}: Question): Mail => ({
  kind: 'question',
  to,
  subject: `${from} asks you about ${title}`,
  notAfter: expiresAt,
  pictures: picture === null ? [] : [{ id: 'trace', png: picture }],
  parts: [
    `${from} shows you the trace "${title}"${question === '' ? '.' : ' and asks:'}`,
    ...(question === '' ? [] : [{ quote: question }]),
    ...(picture === null ? [] : [{ pictureId: 'trace', alternative: `The trace "${title}"` }]),
    { label: mayAnswer ? 'See the trace and answer' : 'See the trace', link: url },
    `It opens on a phone or desk without an account, until ${expiresAt.toISOString().slice(0, 10)}.`,
  ],
});
