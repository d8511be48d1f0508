import { z } from 'zod';
import { measurements } from '../../contract/areas/captures.ts';
import type { DemoClient } from './demo-client.ts';
import { DEMO_SETS, type DemoExercise, type DemoSet } from './demo-exercises.ts';

const listed = z.object({ items: z.array(z.object({ id: z.string(), title: z.string() })) });
type Measured = z.infer<typeof measurements>;

/** As many places as are worth hatching. */
const MOST_EVIDENCE = 24;

/**
 * Sets and exercises of the demo workshop, made by its instructor from the samples; what is there by title is left alone.
 * @param captures ids by sample file.
 */
export async function demoTeaching(
  instructor: DemoClient,
  captures: ReadonlyMap<string, string>,
): Promise<void> {
  const there = async (path: string) =>
    new Map(
      listed
        .parse(await instructor.call('GET', `${path}?limit=100`))
        .items.map(({ id, title }) => [title, id]),
    );
  const [exercises, sets] = [await there('/exercises'), await there('/sets')];
  // Last first: the list has the newest on top.
  for (const set of [...DEMO_SETS].reverse()) {
    if (sets.has(set.title)) continue;
    const ids: string[] = [];
    for (const exercise of set.exercises) {
      const captureId = captures.get(exercise.file);
      if (captureId === undefined) continue;
      ids.push(exercises.get(exercise.title) ?? (await makeExercise(instructor, exercise, captureId)));
    }
    await makeSet(instructor, set, sets.get(building(set)), ids, captures.get(set.atTheEnd.file));
  }
}

const building = ({ title }: DemoSet) => `${title} (being built)`;

async function makeSet(
  instructor: DemoClient,
  set: DemoSet,
  unfinished: string | undefined,
  exerciseIds: readonly string[],
  atTheEnd: string | undefined,
): Promise<void> {
  // Under another title until it is whole, so that an interrupted seeding goes on from it.
  const id = unfinished ?? (await instructor.make('/sets', { title: building(set), intro: set.intro }));
  await instructor.call('PUT', `/sets/${id}/items`, {
    items: [
      ...exerciseIds.map((exerciseId) => ({ kind: 'exercise', exerciseId })),
      { kind: 'text', text: set.after, afterCommit: true },
      ...(atTheEnd === undefined
        ? []
        : [{ kind: 'capture', captureId: atTheEnd, text: set.atTheEnd.caption }]),
    ],
  });
  await instructor.call('PATCH', `/sets/${id}`, { title: set.title, state: 'open', audience: 'everyone' });
}

async function makeExercise(
  instructor: DemoClient,
  exercise: DemoExercise,
  captureId: string,
): Promise<string> {
  const found = measurements.parse(await instructor.call('GET', `/captures/${captureId}/measurements`));
  const { circuit, cause, value, text, evidence } = exercise;
  const answer = value === undefined ? null : measuredNumber(found, value.key);
  const choices = cause?.choices.map(([key, words, hint]) => ({ key, text: words, hint }));
  return instructor.make('/exercises', {
    title: exercise.title,
    state: 'open',
    content: {
      question: exercise.question,
      facts: exercise.complaint === undefined ? [] : [{ label: 'Complaint', value: exercise.complaint }],
      captureId,
      signals: found.signals.map(({ index }) => index),
      scales: value !== undefined,
      asks: {
        stretch: exercise.stretch ? { atMostS: null } : null,
        circuit: circuit === undefined ? null : { ...circuit, choices: [] },
        cause: cause === undefined ? null : { choices, answer: cause.answer[0] },
        value:
          value === undefined || answer === null
            ? null
            : {
                label: value.label,
                answer: Number(answer.toPrecision(4)),
                unit: value.unit,
                tolerance: Number((answer * value.share).toPrecision(2)),
              },
        text: text === undefined ? null : { prompt: text },
      },
      answer: {
        sentence: exercise.sentence,
        evidence: evidence === undefined ? [] : evidenceOf(found, evidence.key, evidence.label),
        reasoning: exercise.reasoning.map(([title, words]) => ({ title, text: words })),
        proof: 'Simulated by the sample program, which knows what it built in.',
        caution: exercise.caution ?? '',
      },
    },
  });
}

/** What the engine measured; an exercise cannot ask for what is not there. */
function measuredNumber({ signals }: Measured, key: string): number {
  for (const { values } of signals)
    for (const each of values) if (each.key === key && typeof each.value === 'number') return each.value;
  throw new Error(`The sample has no measured ${key}`);
}

/** The samples behind a measured value, as places to be hatched. */
function evidenceOf({ signals }: Measured, key: string, label: string) {
  return signals
    .flatMap(({ values }, signal) =>
      values
        .filter((each) => each.key === key)
        .flatMap((each) =>
          each.evidence
            .filter(({ from, to }) => to > from)
            .map(({ from, to }) => ({ signal, from, to, label })),
        ),
    )
    .slice(0, MOST_EVIDENCE);
}
