import type { NextJson } from '../../contract/areas/path.ts';
import { Verdict, VerdictShape } from '../base/Verdict.tsx';
import { SHAPE } from './result-shape.ts';

/** The capture and signal of "title, signal: key"; the reading is named already. */
const titleOf = (from: string) => from.replace(/: [a-z_]+$/, '');

interface PathStepsProps {
  steps: NextJson['steps'];
  onOpen: (check: string) => void;
}

/** What was taken, in order: solid. What another finding would have led to: dashed. */
export function PathSteps({ steps, onOpen }: PathStepsProps) {
  if (steps.length === 0)
    return <p className="path-empty">Nothing is recorded yet. Begin with the first of the next checks.</p>;
  return (
    <ol className="path-steps">
      {steps.map((step) => (
        <li key={step.check} className="path-step">
          <span className={`path-node verdict-${SHAPE[step.result]}`}>
            <VerdictShape verdict={SHAPE[step.result]} />
          </span>
          <div className="path-card">
            <p className="path-card-head">
              <button type="button" className="path-title" onClick={() => onOpen(step.check)}>
                {step.title}
              </button>
              <Verdict verdict={SHAPE[step.result]} word={step.says === '' ? step.result : step.says} />
            </p>
            <dl className="path-readings">
              {step.record?.readings.map((reading) => (
                <div key={reading.what}>
                  <dt>{step.measured.find((one) => one.reading === reading.what)?.what ?? reading.what}</dt>
                  <dd>
                    <b>{reading.value}</b> {reading.unit === '1' ? '' : reading.unit}
                  </dd>
                </div>
              ))}
              {step.measured.map((one) => (
                <div key={`${one.captureId} ${one.reading} ${one.from}`}>
                  <dt>
                    {one.what}, <a href={`/captures/${one.captureId}`}>{titleOf(one.from)}</a>
                  </dt>
                  <dd>
                    <b>{Number(one.value.toPrecision(4))}</b> {one.unit === '1' ? '' : one.unit}
                  </dd>
                </div>
              ))}
            </dl>
            {step.record !== null && step.record.codes.length > 0 && (
              <p className="path-codes">{step.record.codes.join(', ')}</p>
            )}
            {step.record !== null && step.record.note !== '' && <p>{step.record.note}</p>}
            {step.ruledOut.length > 0 && <p className="path-out">Rules out: {step.ruledOut.join('; ')}</p>}
            {step.by === 'capture' && (
              <p className="path-by">Filled from a capture; nobody has confirmed it.</p>
            )}
          </div>
          <ul className="path-branches" aria-label="Not taken">
            {step.otherwise.slice(0, 3).map(({ says, pointsAt }) => (
              <li key={says}>
                {says}
                {pointsAt.length > 0 && <span>: {pointsAt.join('; ')}</span>}
              </li>
            ))}
          </ul>
        </li>
      ))}
    </ol>
  );
}
