import type { ExerciseJson } from '../../contract/areas/teaching.ts';
import { Icon } from '../base/Icon.tsx';
import { Verdict } from '../base/Verdict.tsx';
import { OUTCOME_VERDICT, outcomeWords } from './outcome-words.ts';

/** Title, where in its set it stands, what is known; after committing the outcome and the way on. */
export function ExerciseHead({ exercise, open }: { exercise: ExerciseJson; open: boolean }) {
  const set = exercise.sets[0];
  const { attempt } = exercise;
  return (
    <header>
      <div className="title-row exercise-title">
        <a
          className="exercise-back"
          href={set === undefined ? '/teaching' : `/teaching/sets/${set.id}`}
          aria-label={set === undefined ? 'To Teaching' : `To the set ${set.title}`}
        >
          <Icon name="left" small />
        </a>
        <h1>{exercise.title}</h1>
        {attempt !== null && open && (
          <Verdict verdict={OUTCOME_VERDICT[attempt.outcome]} word={outcomeWords(attempt)} />
        )}
        <div className="title-actions">
          {set !== undefined && set.of > 1 && (
            <p className="exercise-place">
              <span>
                Exercise {set.place} of {set.of}
              </span>
              <span className="exercise-steps" aria-hidden="true">
                {set.done.map((done, at) => (
                  <i
                    // biome-ignore lint/suspicious/noArrayIndexKey: places in an order
                    key={at}
                    data-done={done ? '' : undefined}
                    data-here={at + 1 === set.place ? '' : undefined}
                  />
                ))}
              </span>
            </p>
          )}
          {open && set?.next != null && (
            <a className="button button-main" href={`/teaching/exercises/${set.next}`}>
              Next exercise
              <Icon name="right" small />
            </a>
          )}
        </div>
      </div>
      <dl className="cells exercise-cells">
        {set !== undefined && <Cell label="Set" value={set.title} />}
        <Cell label="Set by" value={exercise.setBy} />
        {exercise.facts.map(({ label, value }) => (
          <Cell key={label} label={label} value={value} />
        ))}
        <Cell label="Tries" value={attempt === null ? 'one, then the answer opens' : 'answered'} />
        {exercise.version > 1 && <Cell label="Version" value={String(exercise.version)} />}
      </dl>
    </header>
  );
}

function Cell({ label, value }: { label: string; value: string }) {
  return (
    <div className="cell">
      <dt>{label}</dt>
      <dd>{value}</dd>
    </div>
  );
}
