import { z } from 'zod';

export const DATABASE_ENTRY = 'database.dump';
export const MANIFEST_ENTRY = 'manifest.json';
export const objectEntry = (at: number): string => `objects/${String(at).padStart(8, '0')}`;

const sum = z.string().regex(/^[0-9a-f]{64}$/);

/** The last entry of the file: what it holds and the sum of each part. */
export const manifest = z.object({
  format: z.literal('gapmark backup 1'),
  madeAt: z.string(),
  database: z.object({ sha256: sum, bytes: z.number() }),
  objects: z.array(
    z.object({ key: z.string().min(1).max(1024), entry: z.string(), sha256: sum, bytes: z.number() }),
  ),
  /** Seals what is sealed in the database. */
  secret: z.string(),
});
export type Manifest = z.infer<typeof manifest>;
