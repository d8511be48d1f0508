import type { z } from 'zod';
import { ApiError } from '../errors.ts';

/** Checks what came in by an endpoint's schema; 422 names each field that needs attention. */
export function validate<T extends z.ZodTypeAny>(schema: T, input: unknown, at = ''): z.output<T> {
  const parsed = schema.safeParse(input);
  if (parsed.success) return parsed.data as z.output<T>;
  throw new ApiError('invalid', {
    details: parsed.error.issues.slice(0, 50).map((issue) => ({
      path: [at, ...issue.path].filter((part) => part !== '').join('.'),
      message: issue.message,
    })),
  });
}
