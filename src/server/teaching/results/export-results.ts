import type { ExerciseContent } from '../../../contract/areas/teaching.ts';
import type { SetRecord } from '../../access.ts';
import { textCell } from '../../captures/export/text-cell.ts';
import { answersOfSet, exercisesOfSet, learnersOfSet } from './answered.ts';

const HEAD = [
  'learner',
  'exercise number',
  'exercise',
  'version',
  'outcome',
  'stretch from (s)',
  'stretch to (s)',
  'stretch',
  'circuit chosen',
  'circuit',
  'cause chosen',
  'cause was',
  'cause',
  'value typed',
  'value unit',
  'value',
  'text',
  'text mark',
  'how sure',
  'why',
  'comment',
  'answered (UTC)',
];

const number = (value: number | undefined) => (value === undefined ? '' : String(value));
const wordsOf = ({ asks }: ExerciseContent, key: string | undefined) =>
  asks.cause?.choices.find((choice) => choice.key === key)?.text ?? '';

/** Results of a set as CSV: a row for every learner and exercise, "not tried" included. Text is guarded, numbers never. */
export async function exportResults(row: SetRecord): Promise<string> {
  const [exercises, answers, learners] = await Promise.all([
    exercisesOfSet(row.id),
    answersOfSet(row),
    learnersOfSet(row),
  ]);
  const people = new Map(learners.map(({ id, name }) => [id, name]));
  for (const { attempt, name } of answers) people.set(attempt.personId, name);
  const lines = [HEAD.map(textCell).join(',')];
  for (const [personId, name] of people)
    for (const [place, { id, title }] of exercises.entries()) {
      const found = answers.find(({ attempt }) => attempt.personId === personId && attempt.exerciseId === id);
      const first = [textCell(name), String(place + 1), textCell(title)];
      if (found === undefined) {
        lines.push([...first, '', 'not tried', ...HEAD.slice(5).map(() => '')].join(','));
        continue;
      }
      const { attempt, content } = found;
      const { answers: given, marks } = attempt;
      lines.push(
        [
          ...first,
          String(attempt.version),
          attempt.outcome,
          number(given.stretch?.from),
          number(given.stretch?.to),
          marks.stretch?.mark ?? '',
          given.circuit ?? '',
          marks.circuit?.mark ?? '',
          textCell(wordsOf(content, given.cause)),
          textCell(wordsOf(content, content.asks.cause?.answer)),
          marks.cause?.mark ?? '',
          number(given.value?.number),
          given.value?.unit ?? '',
          marks.value?.mark ?? '',
          textCell(given.text ?? ''),
          marks.text?.mark ?? '',
          attempt.sure ?? '',
          textCell(attempt.why),
          textCell(attempt.comment),
          attempt.createdAt.toISOString(),
        ].join(','),
      );
    }
  return `${lines.join('\r\n')}\r\n`;
}
