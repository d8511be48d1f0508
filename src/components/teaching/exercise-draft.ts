import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { ExerciseContent, ExerciseJson } from '../../contract/areas/teaching.ts';

export interface Choice {
  readonly key: string;
  readonly text: string;
  readonly hint: string;
}

/** An exercise while it is being built; numbers as typed. */
export interface ExerciseDraft {
  readonly title: string;
  readonly state: ExerciseJson['state'];
  readonly question: string;
  readonly complaint: string;
  readonly signals: readonly number[];
  readonly scales: boolean;
  readonly askStretch: boolean;
  readonly evidence: ExerciseContent['answer']['evidence'];
  readonly askCircuit: boolean;
  /** Place among the exercise's signals. */
  readonly circuitSignal: number;
  readonly askCause: boolean;
  readonly choices: readonly Choice[];
  readonly cause: string;
  readonly askValue: boolean;
  readonly valueLabel: string;
  readonly value: string;
  readonly valueUnit: string;
  readonly tolerance: string;
  readonly askText: boolean;
  readonly prompt: string;
  readonly sentence: string;
  readonly reasoning: readonly { readonly title: string; readonly text: string }[];
  readonly proof: string;
  readonly caution: string;
}

const COMPLAINT = 'Complaint';

export const newDraft = (capture: CaptureJson): ExerciseDraft => ({
  title: '',
  state: 'draft',
  question: '',
  complaint: '',
  signals: capture.signals.slice(0, 4).map(({ index }) => index),
  scales: false,
  askStretch: false,
  evidence: [],
  askCircuit: false,
  circuitSignal: 0,
  askCause: true,
  choices: [],
  cause: '',
  askValue: false,
  valueLabel: '',
  value: '',
  valueUnit: 'ms',
  tolerance: '',
  askText: false,
  prompt: '',
  sentence: '',
  reasoning: [],
  proof: '',
  caution: '',
});

/** An exercise that is there, to be changed. */
export function draftOf({ title, state, staff }: ExerciseJson, capture: CaptureJson): ExerciseDraft {
  const empty = newDraft(capture);
  if (staff === null) return empty;
  const { content } = staff;
  const { asks, answer } = content;
  return {
    ...empty,
    title,
    state,
    question: content.question,
    complaint: content.facts.find(({ label }) => label === COMPLAINT)?.value ?? '',
    signals: content.signals,
    scales: content.scales,
    askStretch: asks.stretch !== null,
    evidence: answer.evidence,
    askCircuit: asks.circuit !== null,
    circuitSignal: asks.circuit?.signal ?? 0,
    askCause: asks.cause !== null,
    choices: asks.cause?.choices ?? [],
    cause: asks.cause?.answer ?? '',
    askValue: asks.value !== null,
    valueLabel: asks.value?.label ?? '',
    value: asks.value === null ? '' : String(asks.value.answer),
    valueUnit: asks.value?.unit ?? 'ms',
    tolerance: asks.value === null ? '' : String(asks.value.tolerance),
    askText: asks.text !== null,
    prompt: asks.text?.prompt ?? '',
    sentence: answer.sentence,
    reasoning: answer.reasoning,
    proof: answer.proof,
    caution: answer.caution,
  };
}

/** A number as typed, decimal comma or point; null when it is none. */
const numberOf = (typed: string): number | null => {
  const text = typed.trim().replace(',', '.');
  const number = Number(text);
  return text === '' || !Number.isFinite(number) ? null : number;
};

/** A key for a cause in a person's own words. */
export const keyOf = (text: string): string =>
  text
    .toLowerCase()
    .normalize('NFKD')
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60) || 'cause';

/**
 * The content as the API takes it. What cannot be a number is sent as it is, so that the API's refusal names the field. What
 * the form does not show of an exercise that is there (other facts, the stretch shown) stays.
 */
export function contentOf(
  draft: ExerciseDraft,
  capture: CaptureJson,
  before: ExerciseContent | null,
): unknown {
  const facts = (before?.facts ?? []).filter(({ label }) => label !== COMPLAINT);
  const complaint = draft.complaint.trim();
  const signal = capture.signals.find(({ index }) => index === draft.signals[draft.circuitSignal]);
  return {
    question: draft.question,
    facts: complaint === '' ? facts : [{ label: COMPLAINT, value: complaint }, ...facts],
    captureId: capture.id,
    signals: draft.signals,
    from: before?.from ?? null,
    to: before?.to ?? null,
    scales: draft.scales || draft.askValue,
    asks: {
      stretch: draft.askStretch ? { atMostS: before?.asks.stretch?.atMostS ?? null } : null,
      circuit: draft.askCircuit
        ? {
            signal: draft.circuitSignal,
            answer: signal?.circuit ?? 'other',
            choices: before?.asks.circuit?.choices ?? [],
          }
        : null,
      cause: draft.askCause ? { choices: draft.choices, answer: draft.cause } : null,
      value: draft.askValue
        ? {
            label: draft.valueLabel,
            answer: numberOf(draft.value),
            unit: draft.valueUnit,
            tolerance: numberOf(draft.tolerance),
          }
        : null,
      text: draft.askText ? { prompt: draft.prompt } : null,
    },
    answer: {
      sentence: draft.sentence,
      evidence: draft.evidence.filter(({ signal: place }) => place === null || place < draft.signals.length),
      reasoning: draft.reasoning.filter(({ title, text }) => title.trim() !== '' || text.trim() !== ''),
      proof: draft.proof,
      caution: draft.caution,
    },
  };
}
