import type { z } from 'zod';
import { ApiError } from '../server/errors.ts';
import { validate } from '../server/http/validate.ts';

/** A query by an endpoint's schema; the same name twice is a mistake rather than a choice. */
export function readQuery<T extends z.ZodTypeAny>(schema: T, search: URLSearchParams): z.output<T> {
  const query: Record<string, string> = {};
  for (const [name, value] of search) {
    if (Object.hasOwn(query, name)) {
      throw new ApiError('invalid', { details: [{ path: name, message: 'is given twice' }] });
    }
    query[name] = value;
  }
  return validate(schema, query);
}
