import type { AttemptJson, ExerciseContent } from '../../../contract/areas/teaching.ts';
import { unitRatio } from './read-quantity.ts';

type Ask = NonNullable<ExerciseContent['asks']['value']>;
type Given = NonNullable<AttemptJson['answers']['value']>;
type Mark = NonNullable<AttemptJson['marks']['value']>;

/** What a sum of binary fractions may be off by: 12.6 - 12.5 is a hair more than 0.1. */
const SLACK = 1e-9;

/** Right when it lies within the tolerance of the answer, ends included, in whatever unit it was typed. */
export function markValue(given: Given, ask: Ask): Mark {
  const ratio = unitRatio(given.unit, ask.unit);
  if (ratio === null) return { mark: 'wrong', why: `${given.unit} measures something else than ${ask.unit}` };
  const away = given.number * ratio - ask.answer;
  const slack = SLACK * Math.max(Math.abs(ask.answer), ask.tolerance, Number.MIN_VALUE);
  if (Math.abs(away) <= ask.tolerance + slack) return { mark: 'right', why: 'within the tolerance' };
  return { mark: 'wrong', why: away > 0 ? 'too high' : 'too low' };
}
