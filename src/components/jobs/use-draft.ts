import { useCallback, useEffect, useRef, useState } from 'react';

const PREFIX = 'gapmark draft ';

/** Reads a draft; one that cannot be read, or has not the fields asked for, is none. */
export function readDraft<T extends Readonly<Record<string, string>>>(
  storage: Pick<Storage, 'getItem'>,
  key: string,
  empty: T,
): T | null {
  try {
    const kept: unknown = JSON.parse(storage.getItem(PREFIX + key) ?? 'null');
    if (typeof kept !== 'object' || kept === null) return null;
    const entries = Object.entries(kept as Record<string, unknown>);
    const fields = entries.filter(([name, value]) => Object.hasOwn(empty, name) && typeof value === 'string');
    if (!fields.some(([name, value]) => value !== empty[name])) return null;
    return { ...empty, ...Object.fromEntries(fields) };
  } catch {
    return null;
  }
}

export interface Draft<T> {
  readonly fields: T;
  /** Whether the fields come from an earlier try in this browser. */
  readonly found: boolean;
  set: (change: Partial<T>) => void;
  /** After it was sent, or when it is thrown away. */
  clear: () => void;
}

/**
 * A form's fields, kept in this browser until they have been sent: nothing typed is lost when the network, the page or the phone
 * goes. `key` names the person and the form.
 */
export function useDraft<T extends Readonly<Record<string, string>>>(key: string, empty: T): Draft<T> {
  const [fields, setFields] = useState(empty);
  const [found, setFound] = useState(false);
  const start = useRef(empty);
  useEffect(() => {
    const kept = readDraft(localStorage, key, start.current);
    if (kept === null) return;
    setFields(kept);
    setFound(true);
  }, [key]);
  const set = useCallback(
    (change: Partial<T>) =>
      setFields((was) => {
        const next = { ...was, ...change };
        try {
          localStorage.setItem(PREFIX + key, JSON.stringify(next));
        } catch {
          // Storage is full or closed: the form still works, it only is not kept.
        }
        return next;
      }),
    [key],
  );
  const clear = useCallback(() => {
    try {
      localStorage.removeItem(PREFIX + key);
    } catch {
      // As above.
    }
    setFields(start.current);
    setFound(false);
  }, [key]);
  return { fields, found, set, clear };
}
