import type { ReactNode } from 'react';
import type { ExerciseJson } from '../../contract/areas/teaching.ts';
import { circuitWords } from '../base/circuits.ts';
import { Field } from '../base/Field.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { VerdictShape } from '../base/Verdict.tsx';
import type { Draft, Missing } from './draft.ts';

interface AnswerPartsProps {
  exercise: ExerciseJson;
  draft: Draft;
  missing: Missing;
  /** Number of the first step here; the stretch on the trace comes before. */
  first: number;
  onChange: (change: Partial<Draft>) => void;
}

/** The parts of an answer that are chosen or typed, each a numbered step. */
export function AnswerParts({ exercise, draft, missing, first, onChange }: AnswerPartsProps) {
  const { circuit, cause, value, text } = exercise.asks;
  const kinds = [circuit && 'circuit', cause && 'cause', value && 'value', text && 'text'].filter(Boolean);
  const numberOf = (kind: string) => first + kinds.indexOf(kind);
  return (
    <>
      {circuit !== null && (
        <Step
          number={numberOf('circuit')}
          title={`Which circuit is signal ${circuit.signal + 1}?`}
          error={missing.circuit}
        >
          <Choices
            name="circuit"
            label="Circuit"
            chosen={draft.circuit}
            choices={circuit.choices.map((each) => ({ key: each, text: circuitWords(each).full, hint: '' }))}
            onChoose={(key) => onChange({ circuit: key })}
          />
        </Step>
      )}
      {cause !== null && (
        <Step number={numberOf('cause')} title="Choose a cause" error={missing.cause}>
          <Choices
            name="cause"
            label="Cause"
            chosen={draft.cause}
            choices={cause.choices}
            onChoose={(key) => onChange({ cause: key })}
          />
        </Step>
      )}
      {value !== null && (
        <Step number={numberOf('value')} title={value.label}>
          <div className="exercise-value">
            <Field label="Value" help="12,6 and 12.6 are the same" error={missing.value ?? null}>
              <input
                className="box box-figures"
                inputMode="decimal"
                autoComplete="off"
                maxLength={40}
                value={draft.valueText}
                onChange={(event) => onChange({ valueText: event.target.value })}
              />
            </Field>
            <Field label="Unit">
              <select
                className="choice"
                value={draft.valueUnit}
                onChange={(event) => onChange({ valueUnit: event.target.value })}
              >
                {value.units.map((unit) => (
                  <option key={unit} value={unit}>
                    {unit === '1' ? 'none' : unit}
                  </option>
                ))}
              </select>
            </Field>
          </div>
        </Step>
      )}
      {text !== null && (
        <Step number={numberOf('text')} title="In your own words">
          <Field label={text.prompt} help="An instructor reads and judges it." error={missing.text ?? null}>
            <textarea
              className="box"
              maxLength={4000}
              value={draft.text}
              onChange={(event) => onChange({ text: event.target.value })}
            />
          </Field>
        </Step>
      )}
      <Step number={first + kinds.length} title="How sure are you?">
        <Segmented
          label="How sure"
          value={draft.sure ?? 'unsaid'}
          options={[
            { value: 'guess', text: 'Guess' },
            { value: 'rather', text: 'Rather sure' },
            { value: 'sure', text: 'Sure' },
          ]}
          onChange={(sure) => sure !== 'unsaid' && onChange({ sure })}
        />
        <Field label="Why, in a sentence (may stay empty)">
          <textarea
            className="box exercise-why"
            maxLength={1000}
            value={draft.why}
            onChange={(event) => onChange({ why: event.target.value })}
          />
        </Field>
      </Step>
    </>
  );
}

export function Step({
  number,
  title,
  error,
  children,
}: {
  number: number;
  title: string;
  error?: string | undefined;
  children: ReactNode;
}) {
  return (
    <section className="exercise-step" aria-label={title}>
      <h2>
        <span className="balloon" aria-hidden="true">
          {number}
        </span>
        {title}
      </h2>
      {error !== undefined && (
        <p className="field-error" role="alert">
          <VerdictShape verdict="bad" />
          <span>{error}</span>
        </p>
      )}
      {children}
    </section>
  );
}

interface ChoicesProps {
  name: string;
  label: string;
  chosen: string;
  choices: readonly { readonly key: string; readonly text: string; readonly hint: string }[];
  onChoose: (key: string) => void;
}

/** Radio rows as wide as the panel, to be hit with a thumb. */
function Choices({ name, label, chosen, choices, onChoose }: ChoicesProps) {
  return (
    <fieldset className="exercise-choices">
      <legend className="sr-only">{label}</legend>
      {choices.map(({ key, text, hint }) => (
        <label key={key} className="exercise-choice" data-chosen={key === chosen ? '' : undefined}>
          <input
            type="radio"
            name={name}
            value={key}
            checked={key === chosen}
            onChange={() => onChoose(key)}
          />
          <span>
            {text}
            {hint !== '' && <small>{hint}</small>}
          </span>
        </label>
      ))}
    </fieldset>
  );
}
