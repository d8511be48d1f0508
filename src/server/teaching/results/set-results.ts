import type { ResultsJson } from '../../../contract/areas/teaching.ts';
import type { SetRecord } from '../../access.ts';
import { answersOfSet, exercisesOfSet, learnersOfSet } from './answered.ts';
import { confusion } from './confusion.ts';

/** Answers by learner and exercise, and which cause was taken for which. */
export async function setResults(row: SetRecord): Promise<ResultsJson> {
  const [exercises, answers, learners] = await Promise.all([
    exercisesOfSet(row.id),
    answersOfSet(row),
    learnersOfSet(row),
  ]);
  const people = new Map(learners.map(({ id, name }) => [id, { id, name, attempts: [] as Attempts }]));
  for (const { attempt, name } of answers) {
    const own = people.get(attempt.personId) ?? { id: attempt.personId, name, attempts: [] };
    own.attempts.push({ exerciseId: attempt.exerciseId, attemptId: attempt.id, outcome: attempt.outcome });
    people.set(own.id, own);
  }
  return {
    exercises: exercises.map(({ id, title }) => {
      const own = answers.filter(({ attempt }) => attempt.exerciseId === id);
      const having = (outcome: string) => own.filter(({ attempt }) => attempt.outcome === outcome).length;
      return { id, title, right: having('right'), tried: own.length, waiting: having('waiting') };
    }),
    people: [...people.values()].sort((a, b) => a.name.localeCompare(b.name)),
    confusion: confusion(
      answers.flatMap(({ attempt, content }) => {
        const ask = content.asks.cause;
        const chosen = attempt.answers.cause;
        if (ask === null || chosen === undefined) return [];
        return [{ was: ask.answer, chosen, words: new Map(ask.choices.map(({ key, text }) => [key, text])) }];
      }),
    ),
  };
}

type Attempts = ResultsJson['people'][number]['attempts'];
