import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';

export const importInput = z
  .object({
    /** The table of descriptions as text: its first line names the columns, one of them `file`. */
    csv: z.string().max(900_000, 'is larger than 900 000 characters; split it'),
    /** Names of the files chosen. */
    files: z.array(z.string().min(1).max(300)).max(5_000, 'at most 5 000 files at once'),
    newEngines: z.boolean().default(false),
  })
  .strict();

export const importLine = z.object({
  line: z.number().int(),
  file: z.string(),
  title: z.string().nullable(),
  note: z.string(),
  cylinders: z.number().int().nullable(),
  /** A line that is `bad` keeps all from being sent. */
  verdict: z.enum(['good', 'watch', 'bad']),
  text: z.string(),
});
export type ImportLineJson = z.infer<typeof importLine>;

export const importCheck = z.object({
  fits: z.boolean(),
  lines: z.array(importLine),
  without: z.array(z.string()),
});
export type ImportCheckJson = z.infer<typeof importCheck>;

export const importEndpoints = defineEndpoints({
  'captures.checkImport': {
    method: 'POST',
    path: '/captures/import-check',
    summary: 'Check a table of descriptions for many files, line by line. Keeps nothing.',
    access: 'teach',
    body: importInput,
    response: importCheck,
  },
});
