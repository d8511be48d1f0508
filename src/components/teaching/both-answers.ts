import type { AttemptJson, ExerciseJson } from '../../contract/areas/teaching.ts';
import { circuitWords } from '../base/circuits.ts';
import type { VerdictName } from '../base/Verdict.tsx';
import { duration, time } from '../plot/format.ts';

export interface AnswerRow {
  readonly label: string;
  readonly own: string;
  readonly answer: string;
  readonly verdict: VerdictName | null;
  readonly why: string;
}

const VERDICT = { right: 'good', partly: 'watch', wrong: 'bad', waiting: 'undecided' } as const;
const SURE = { guess: 'a guess', rather: 'rather sure', sure: 'sure' } as const;
const withUnit = (number: number | string, unit: string) =>
  unit === '1' ? `${number}` : `${number} ${unit}`;

/** A learner's own answer beside the answer, part by part. */
export function bothAnswers(exercise: ExerciseJson, attempt: AttemptJson): AnswerRow[] {
  const { answer, asks, trace } = exercise;
  if (answer === null) return [];
  const { answers, marks } = attempt;
  const lengthS = trace?.durationS ?? 0;
  const rows: AnswerRow[] = [];
  const add = (label: string, own: string, right: string, part: keyof AttemptJson['marks']) => {
    const mark = marks[part];
    rows.push({
      label,
      own,
      answer: right,
      verdict: mark === undefined ? null : VERDICT[mark.mark],
      why: mark?.why ?? '',
    });
  };
  if (answers.stretch !== undefined)
    add(
      'Stretch',
      `${time(answers.stretch.from, lengthS)} to ${time(answers.stretch.to, lengthS)}`,
      evidenceWords(answer.evidence, lengthS),
      'stretch',
    );
  if (answers.circuit !== undefined)
    add(
      'Circuit',
      circuitWords(answers.circuit).full,
      circuitWords(answer.circuit?.circuit ?? 'other').full,
      'circuit',
    );
  if (answers.cause !== undefined)
    add(
      'Cause',
      asks.cause?.choices.find(({ key }) => key === answers.cause)?.text ?? answers.cause,
      answer.cause?.text ?? '',
      'cause',
    );
  if (answers.value !== undefined && answer.value !== null)
    add(
      'Value',
      withUnit(answers.value.number, answers.value.unit),
      `${withUnit(answer.value.answer, answer.value.unit)} ± ${answer.value.tolerance}`,
      'value',
    );
  if (answers.text !== undefined) add('Text', answers.text, attempt.comment, 'text');
  if (attempt.sure !== null)
    rows.push({ label: 'How sure', own: SURE[attempt.sure], answer: '', verdict: null, why: '' });
  if (attempt.why !== '')
    rows.push({ label: 'Your reason', own: attempt.why, answer: '', verdict: null, why: '' });
  return rows;
}

function evidenceWords(evidence: NonNullable<ExerciseJson['answer']>['evidence'], lengthS: number): string {
  const [first] = evidence;
  if (first === undefined) return '';
  const where = `${time(first.from, lengthS)} to ${time(first.to, lengthS)}`;
  const label = first.label === '' ? '' : `${first.label}: `;
  if (evidence.length === 1) return `${label}${where}`;
  return `${label}${evidence.length} places of ${duration(first.to - first.from)}, the first at ${where}`;
}
