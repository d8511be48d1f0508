/** Where the resumable client keeps the addresses of unfinished uploads in this browser. */
const PREFIX = 'tus::';

export interface Unfinished {
  readonly storageKey: string;
  readonly fileName: string;
  readonly bytes: number | null;
  readonly startedAt: string;
}

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null;

/** Uploads that this browser began and did not end, newest first. Entries that cannot be read are passed over. */
export function unfinishedUploads(storage: Pick<Storage, 'length' | 'key' | 'getItem'>): Unfinished[] {
  const found: Unfinished[] = [];
  for (let index = 0; index < storage.length; index++) {
    const storageKey = storage.key(index);
    if (storageKey === null || !storageKey.startsWith(PREFIX)) continue;
    try {
      const entry: unknown = JSON.parse(storage.getItem(storageKey) ?? '');
      if (!isRecord(entry) || !isRecord(entry.metadata)) continue;
      const { filename } = entry.metadata;
      const { creationTime, size } = entry;
      if (typeof filename !== 'string' || typeof creationTime !== 'string') continue;
      const startedAt = new Date(creationTime).toISOString();
      found.push({
        storageKey,
        fileName: filename,
        bytes: typeof size === 'number' ? size : null,
        startedAt,
      });
    } catch {
      // Written by something else, or by an older version: not ours to tell of.
    }
  }
  return found.sort((a, b) => b.startedAt.localeCompare(a.startedAt));
}
