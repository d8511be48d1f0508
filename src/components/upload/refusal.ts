const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null;

const OWN_WORDS: Readonly<Record<number, { happened: string; todo: string }>> = {
  401: {
    happened: 'You are no longer signed in.',
    todo: 'Sign in in another tab, then press “Go on”: it goes on where it stopped.',
  },
  404: { happened: 'The server no longer has the part that was sent.', todo: 'Choose the file again.' },
  413: {
    happened: 'The file is larger than this server takes.',
    todo: 'Save a shorter stretch, or fewer columns.',
  },
  415: { happened: 'The server does not take this kind of file.', todo: 'Save the recording as CSV text.' },
};

/** What the server's refusal of an upload means: its own words where it gave some, else ours for the status. */
export function refusal(status: number, body: string): { happened: string; todo: string } {
  const own = OWN_WORDS[status];
  let parsed: unknown = null;
  try {
    parsed = JSON.parse(body);
  } catch {
    // Not JSON: a proxy's page, or nothing. Our words for the status serve.
  }
  const error = isRecord(parsed) && isRecord(parsed.error) ? parsed.error : {};
  return {
    happened:
      typeof error.message === 'string'
        ? error.message
        : (own?.happened ?? `The server refused it (${status}).`),
    todo: typeof error.hint === 'string' ? error.hint : (own?.todo ?? 'Choose the file again.'),
  };
}

/** Worth trying again without the person: no answer, away for a moment, too many at once, locked by our own last try. */
export const isPassing = (status: number): boolean =>
  status === 0 || status === 409 || status === 423 || status === 429 || status >= 500;
