import type { MarkJson } from '../../contract/areas/marks.ts';

export type MarkFields = Pick<MarkJson, 'kind' | 'signal' | 'from' | 'to' | 'value' | 'text'>;

const FIELDS = ['kind', 'signal', 'from', 'to', 'value', 'text'] as const;

export interface MergedMark {
  /** Theirs, with what only I changed over it; where both changed one field, mine. */
  readonly merged: MarkFields;
  /** Fields that both changed, to something else. */
  readonly clashes: readonly (typeof FIELDS)[number][];
}

/** Two people's changes to one mark, from what both began with. */
export function mergeMark(began: MarkFields, mine: MarkFields, theirs: MarkFields): MergedMark {
  const merged = { ...theirs };
  const clashes: (typeof FIELDS)[number][] = [];
  for (const field of FIELDS) {
    if (Object.is(mine[field], began[field]) || Object.is(mine[field], theirs[field])) continue;
    Object.assign(merged, { [field]: mine[field] });
    if (!Object.is(theirs[field], began[field])) clashes.push(field);
  }
  return { merged, clashes };
}
