import { z } from 'zod';

export const id = z.string().regex(/^[a-z0-9]{16,40}$/);
/** An address as it is kept: lower case. */
export const email = z.string().trim().toLowerCase().max(254).email();

export const isoTime = z.string().datetime();

/** Seconds of the capture's own axis. */
export const finite = z.number().finite();

export const pageQuery = z.object({
  limit: z.coerce.number().int().min(1).max(100).default(25),
  cursor: z.string().max(200).optional(),
});

export const listOf = <T extends z.ZodTypeAny>(item: T) =>
  z.object({ items: z.array(item), nextCursor: z.string().nullable() });

export const errorBody = z.object({
  error: z.object({
    code: z.string(),
    message: z.string(),
    hint: z.string().optional(),
    details: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
  }),
});

const CONTROL = /\p{Cc}/u;

/** Line breaks and tabs are fine, other control characters never come from a keyboard. */
const hasControlCharacters = (value: string) => CONTROL.test(value.replace(/[\t\n\r]/g, ''));

/** Text a person typed: trimmed, of bounded length. */
export const text = (max: number) =>
  z
    .string()
    .max(max)
    .refine((value) => !hasControlCharacters(value), 'has control characters')
    .transform((value) => value.trim());
