import { z } from 'zod';

export const MANIFEST_ENTRY = 'manifest.json';
export const rowsEntry = (table: string): string => `rows/${table}.json`;
export const objectEntry = (at: number): string => `objects/${String(at).padStart(8, '0')}`;

const sum = z.string().regex(/^[0-9a-f]{64}$/);
const id = z.string().regex(/^[a-z0-9]{16,40}$/);

/** One object of the store: whose it is, and the rest of its key after that thing's own prefix. */
const storedObject = z.object({
  entry: z.string().regex(/^objects\/\d{8}$/),
  owner: id,
  kind: z.enum(['original', 'known-good']),
  name: z.string().regex(/^[\w.-]{1,80}$/),
  sha256: sum,
  bytes: z.number().int().nonnegative(),
});

/** The last entry: what the archive holds and the sum of each part. */
export const archiveManifest = z.object({
  format: z.literal('gapmark workshop 1'),
  madeAt: z.string(),
  workshop: z.object({ id, name: z.string().min(1).max(80), timeZone: z.string().max(64) }),
  /** Names that stand beside what was made; no addresses. */
  people: z.array(z.object({ id, name: z.string().max(200) })).max(100_000),
  tables: z.array(z.object({ table: z.string().max(60), sha256: sum })).max(100),
  objects: z.array(storedObject).max(500_000),
});
export type ArchiveManifest = z.infer<typeof archiveManifest>;

export const row = z.record(z.unknown());
export type Row = z.infer<typeof row>;
