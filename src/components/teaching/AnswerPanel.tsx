import type { ExerciseJson } from '../../contract/areas/teaching.ts';
import { circuitWords } from '../base/circuits.ts';
import { Icon } from '../base/Icon.tsx';
import { timeText } from '../base/numbers.ts';
import { Verdict } from '../base/Verdict.tsx';
import { bothAnswers } from './both-answers.ts';

/** What opens with committing: own answer beside the answer, the reasoning, the proof, the capture. */
export function AnswerPanel({ exercise }: { exercise: ExerciseJson }) {
  const { answer, attempt } = exercise;
  if (answer === null) return null;
  const rows = attempt === null ? [] : bothAnswers(exercise, attempt);
  return (
    <>
      {attempt !== null && rows.length > 0 && (
        <table className="exercise-both">
          <caption className="sr-only">Your answer beside the answer</caption>
          <thead>
            <tr>
              <td />
              <th scope="col">Your answer</th>
              <th scope="col">The answer</th>
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.label}>
                <th scope="row">{row.label}</th>
                <td>
                  {row.own}
                  {row.verdict !== null && (
                    <span className="block">
                      <Verdict verdict={row.verdict} word={row.why} />
                    </span>
                  )}
                </td>
                <td>{row.answer}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      {attempt !== null && attempt.judgedBy !== null && (
        <p className="exercise-judged text-soft">
          Judged by {attempt.judgedBy}
          {attempt.judgedAt !== null && `, ${timeText(attempt.judgedAt)}`}
        </p>
      )}
      {attempt === null && (
        <dl className="exercise-plain">
          {answer.circuit !== null && (
            <div>
              <dt>Circuit</dt>
              <dd>{circuitWords(answer.circuit.circuit).full}</dd>
            </div>
          )}
          {answer.cause !== null && (
            <div>
              <dt>Cause</dt>
              <dd>{answer.cause.text}</dd>
            </div>
          )}
          {answer.value !== null && (
            <div>
              <dt>Value</dt>
              <dd>
                {answer.value.answer} {answer.value.unit} ± {answer.value.tolerance}
              </dd>
            </div>
          )}
        </dl>
      )}
      {answer.reasoning.length > 0 && (
        <section className="exercise-reasoning">
          <h2>Reasoning</h2>
          <ol>
            {answer.reasoning.map(({ title, text }, at) => (
              <li key={title}>
                <span className="balloon" aria-hidden="true">
                  {at + 1}
                </span>
                <div>
                  <h3>{title}</h3>
                  <p>{text}</p>
                </div>
              </li>
            ))}
          </ol>
        </section>
      )}
      {answer.proof !== '' && <p className="exercise-proof text-soft">Proof: {answer.proof}</p>}
      {answer.caution !== '' && (
        <section className="exercise-caution">
          <h2>Do it in the workshop</h2>
          <p>
            <Icon name="caution" small />
            <span>{answer.caution}</span>
          </p>
        </section>
      )}
      <div className="exercise-onward">
        {exercise.sets[0]?.next != null && (
          <a
            className="button button-main exercise-next"
            href={`/teaching/exercises/${exercise.sets[0].next}`}
          >
            Next exercise
          </a>
        )}
        {answer.captureId !== null && (
          <a className="button" href={`/captures/${answer.captureId}`}>
            Open as a capture
          </a>
        )}
        {exercise.sets[0] !== undefined && (
          <a className="button" href={`/teaching/sets/${exercise.sets[0].id}`}>
            Back to the set
          </a>
        )}
      </div>
    </>
  );
}
