import type { z } from 'zod';
import {
  type AttemptJson,
  type attemptInput,
  type ExerciseContent,
  unitsLike,
} from '../../../contract/areas/teaching.ts';
import { CIRCUITS } from '../../../engine/circuit.ts';
import { ApiError } from '../../errors.ts';
import { markStretch } from './mark-stretch.ts';
import { markValue } from './mark-value.ts';
import { outcomeOf } from './outcome-of.ts';
import { readQuantity } from './read-quantity.ts';

type Input = z.output<typeof attemptInput>;
type Marked = Pick<AttemptJson, 'answers' | 'marks' | 'outcome'>;

const PARTS = ['stretch', 'circuit', 'cause', 'value', 'text'] as const;
const MISSING: Record<(typeof PARTS)[number], string> = {
  stretch: 'lay a stretch on the trace',
  circuit: 'name the circuit',
  cause: 'choose a cause',
  value: 'type the value',
  text: 'write your answer',
};

/**
 * Marks an answer against a version of its exercise. Nothing is guessed for what was left out.
 * @param traceS length of the trace as shown.
 * @throws ApiError invalid, naming each part that is missing, was not asked for, or cannot be read: nothing counts as tried.
 */
export function markAttempt(input: Input, content: ExerciseContent, traceS: number): Marked {
  const { asks } = content;
  const details = PARTS.flatMap((part) => {
    if (asks[part] !== null && input[part] === undefined) return [{ path: part, message: MISSING[part] }];
    if (asks[part] === null && input[part] !== undefined)
      return [{ path: part, message: 'was not asked for' }];
    return [];
  });
  const answers: Marked['answers'] = {};
  const marks: Marked['marks'] = {};
  if (asks.stretch !== null && input.stretch) {
    answers.stretch = input.stretch;
    marks.stretch = markStretch(input.stretch, content.answer.evidence, asks.stretch.atMostS, traceS);
  }
  if (asks.circuit !== null && input.circuit) {
    const choices = asks.circuit.choices.length > 0 ? asks.circuit.choices : CIRCUITS;
    if (!choices.includes(input.circuit))
      details.push({ path: 'circuit', message: 'is not among the choices' });
    answers.circuit = input.circuit;
    marks.circuit = rightOrNot(input.circuit === asks.circuit.answer);
  }
  if (asks.cause !== null && input.cause !== undefined) {
    if (!asks.cause.choices.some(({ key }) => key === input.cause))
      details.push({ path: 'cause', message: 'is not among the choices' });
    answers.cause = input.cause;
    marks.cause = rightOrNot(input.cause === asks.cause.answer);
  }
  if (asks.value !== null && input.value) {
    const read = readQuantity(input.value.text, input.value.unit, unitsLike(asks.value.unit));
    if ('reason' in read) details.push({ path: 'value', message: read.reason });
    else {
      answers.value = { text: input.value.text, ...read };
      marks.value = markValue(answers.value, asks.value);
    }
  }
  if (asks.text !== null && input.text !== undefined) {
    answers.text = input.text;
    marks.text = { mark: 'waiting', why: 'waits for an instructor' };
  }
  if (details.length > 0) throw new ApiError('invalid', { details });
  return { answers, marks, outcome: outcomeOf(marks) };
}

const rightOrNot = (right: boolean) =>
  right ? ({ mark: 'right', why: 'right' } as const) : ({ mark: 'wrong', why: 'not this' } as const);
