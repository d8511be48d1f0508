import { newId } from '../../ids.ts';
import type { Row } from './format.ts';

/**
 * New ids for everything in an archive: the workshop, its people, and each row with an id. Ids are random and long, so a text that
 * equals one is that id wherever it stands, in columns and inside JSON alike.
 */
export function renamedIds(ids: Iterable<string>): {
  readonly idOf: (old: string) => string | undefined;
  readonly rename: (row: Row) => Row;
} {
  const renamed = new Map([...ids].map((old) => [old, newId()]));
  const value = (old: unknown): unknown => {
    if (typeof old === 'string') return renamed.get(old) ?? old;
    if (Array.isArray(old)) return old.map(value);
    if (old === null || typeof old !== 'object') return old;
    return Object.fromEntries(Object.entries(old).map(([key, item]) => [key, value(item)]));
  };
  return {
    idOf: (old) => renamed.get(old),
    rename: (row) => Object.fromEntries(Object.entries(row).map(([column, item]) => [column, value(item)])),
  };
}
