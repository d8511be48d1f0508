import { z } from 'zod';
import { CIRCUITS } from '../../engine/circuit.ts';
import type { Notice, Value } from '../../engine/value.ts';

export const circuit = z.enum(CIRCUITS);

export const evidence = z.object({ from: z.number(), to: z.number() });

const oneOrMany = z.union([z.number(), z.array(z.number())]);

export const irregularTooth = z.object({
  tooth: z.number().int(),
  height_ratio: z.number().nullable(),
  spacing_ratio: z.number().nullable(),
});

export const value = z.object({
  key: z.string(),
  value: z.union([
    z.number(),
    z.string(),
    z.boolean(),
    z.array(z.number().nullable()),
    z.array(irregularTooth),
    z.null(),
  ]),
  unit: z.string(),
  n: z.number().int().optional(),
  min: oneOrMany.optional(),
  max: oneOrMany.optional(),
  sd: oneOrMany.optional(),
  reason: z.string().optional(),
  evidence: z.array(evidence),
}) satisfies z.ZodType<Value>;

export const notice = z.object({
  code: z.string(),
  severity: z.enum(['info', 'watch', 'bad']),
  text: z.string(),
  evidence: z.array(evidence),
}) satisfies z.ZodType<Notice>;
