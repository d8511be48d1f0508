import { ApiFailure } from '../base/api.ts';

/** What the server says of each field, by its path. */
export const fieldErrors = (thrown: unknown): Readonly<Record<string, string>> =>
  thrown instanceof ApiFailure && thrown.status === 422
    ? Object.fromEntries(thrown.details.map(({ path, message }) => [path, message]))
    : {};
