import type { AttemptJson, ExerciseJson } from '../../contract/areas/teaching.ts';
import type { View } from '../plot/types.ts';

/** What a learner has chosen and typed so far. */
export interface Draft {
  readonly circuit: string;
  readonly cause: string;
  readonly valueText: string;
  readonly valueUnit: string;
  readonly text: string;
  readonly sure: AttemptJson['sure'];
  readonly why: string;
}

export const emptyDraft = (exercise: ExerciseJson): Draft => ({
  circuit: '',
  cause: '',
  valueText: '',
  valueUnit: exercise.asks.value?.units[0] ?? '',
  text: '',
  sure: null,
  why: '',
});

export type Missing = Readonly<Partial<Record<'stretch' | 'circuit' | 'cause' | 'value' | 'text', string>>>;

/** What is still to be answered, in words beside each part. */
export function missingOf({ asks }: ExerciseJson, draft: Draft, stretch: View | null): Missing {
  return {
    ...(asks.stretch && (stretch === null || stretch.to <= stretch.from)
      ? { stretch: 'Lay a stretch on the trace' }
      : {}),
    ...(asks.circuit !== null && draft.circuit === '' ? { circuit: 'Name the circuit' } : {}),
    ...(asks.cause !== null && draft.cause === '' ? { cause: 'Choose a cause' } : {}),
    ...(asks.value !== null && draft.valueText.trim() === '' ? { value: 'Type the value' } : {}),
    ...(asks.text !== null && draft.text.trim() === '' ? { text: 'Write your answer' } : {}),
  };
}

/** The request's body; only what is asked for. */
export function attemptBody({ asks, version }: ExerciseJson, draft: Draft, stretch: View | null) {
  return {
    version,
    ...(asks.stretch && stretch !== null ? { stretch: { from: stretch.from, to: stretch.to } } : {}),
    ...(asks.circuit === null ? {} : { circuit: draft.circuit }),
    ...(asks.cause === null ? {} : { cause: draft.cause }),
    ...(asks.value === null ? {} : { value: { text: draft.valueText, unit: draft.valueUnit } }),
    ...(asks.text === null ? {} : { text: draft.text }),
    sure: draft.sure,
    why: draft.why,
  };
}
