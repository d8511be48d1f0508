import { type ActionError, isInputError } from 'astro:actions';

/** What came back from a refused form: which fields need attention, or a sentence; and the status for the page. */
export interface Refusal {
  readonly fields: Readonly<Record<string, readonly string[] | undefined>>;
  readonly message: string | null;
  readonly status: number | null;
}

export function refusalOf(result: { readonly error?: ActionError | undefined } | undefined): Refusal {
  const error = result?.error;
  if (error === undefined) return { fields: {}, message: null, status: null };
  return isInputError(error)
    ? { fields: error.fields, message: null, status: error.status }
    : { fields: {}, message: error.message, status: error.status };
}
