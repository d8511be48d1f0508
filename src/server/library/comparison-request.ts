import { z } from 'zod';
import { comparisonInput } from '../../contract/areas/library.ts';

/**
 * What is kept of a request: what was asked, and the references that it meant at that moment, so that the worker needs no
 * caller and the answer stays what it was.
 */
export const storedRequest = z.object({
  signal: z.number().int(),
  asked: comparisonInput,
  knownGoodIds: z.array(z.string()),
  otherCaptureId: z.string().nullable(),
  otherSignal: z.number().int().nullable(),
});
export type StoredRequest = z.infer<typeof storedRequest>;
