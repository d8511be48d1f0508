import type { NextJson } from '../../contract/areas/path.ts';

type Result = NextJson['steps'][number]['result'];

/** What was typed for a check and is not on the server yet. */
export interface Draft {
  readonly result: Result | null;
  readonly finding: string | null;
  /** By the reading's key, as typed. */
  readonly readings: Readonly<Record<string, { readonly value: string; readonly unit: string }>>;
  readonly codes: string;
  readonly note: string;
  readonly stands: string;
  readonly captureIds: readonly string[];
  /** The edition it was begun on; "0": nothing was recorded then. */
  readonly etag: string;
  /** Saved by the person, and still to be sent; null: not saved yet. */
  readonly waitingSince: string | null;
}

const keyOf = (jobId: string, check: string) => `gapmark:check:${jobId}:${check}`;

/** Storage may be full, off or forbidden: then the draft lives with the page. */
export function keepDraft(jobId: string, check: string, draft: Draft): boolean {
  try {
    localStorage.setItem(keyOf(jobId, check), JSON.stringify(draft));
    return true;
  } catch {
    return false;
  }
}

export function dropDraft(jobId: string, check: string): void {
  try {
    localStorage.removeItem(keyOf(jobId, check));
  } catch {
    // Nothing was kept then.
  }
}

export function readDraft(jobId: string, check: string): Draft | null {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(keyOf(jobId, check)) ?? 'null');
    return isDraft(kept) ? kept : null;
  } catch {
    return null;
  }
}

/** Checks of a job whose drafts were saved and still wait for the line. */
export function waitingDrafts(jobId: string): { check: string; draft: Draft }[] {
  const prefix = keyOf(jobId, '');
  try {
    return Object.keys(localStorage)
      .filter((key) => key.startsWith(prefix))
      .flatMap((key) => {
        const check = key.slice(prefix.length);
        const draft = readDraft(jobId, check);
        return draft?.waitingSince ? [{ check, draft }] : [];
      });
  } catch {
    return [];
  }
}

function isDraft(kept: unknown): kept is Draft {
  if (typeof kept !== 'object' || kept === null) return false;
  const texts = ['codes', 'note', 'stands', 'etag'] as const;
  return (
    texts.every((key) => key in kept && typeof (kept as Record<string, unknown>)[key] === 'string') &&
    'readings' in kept &&
    typeof kept.readings === 'object' &&
    kept.readings !== null &&
    'captureIds' in kept &&
    Array.isArray(kept.captureIds)
  );
}
