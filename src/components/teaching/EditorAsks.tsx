import { type ReactNode, useState } from 'react';
import type { CaptureJson, MeasurementsJson } from '../../contract/areas/captures.ts';
import { Button } from '../base/Button.tsx';
import { circuitWords } from '../base/circuits.ts';
import { Field } from '../base/Field.tsx';
import { Icon } from '../base/Icon.tsx';
import { duration, time } from '../plot/format.ts';
import type { View } from '../plot/types.ts';
import { COMMON_CAUSES } from './causes.ts';
import { type ExerciseDraft, keyOf } from './exercise-draft.ts';
import { measuredChoices } from './measured-choices.ts';

interface EditorAsksProps {
  draft: ExerciseDraft;
  capture: CaptureJson;
  measurements: MeasurementsJson | null;
  span: View | null;
  onChange: (over: Partial<ExerciseDraft>) => void;
}

const UNITS = [
  's',
  'ms',
  'µs',
  'V',
  'mV',
  'kV',
  'A',
  'mA',
  'rpm',
  'Hz',
  'kHz',
  '°',
  'Ω',
  'kΩ',
  'bar',
  'kPa',
  'MPa',
  '%',
  '1',
];

/** What is asked and what is right: a tick for each kind, with the few things that it needs. */
export function EditorAsks({ draft, capture, measurements, span, onChange }: EditorAsksProps) {
  return (
    <>
      <Ask
        title="Choose a stretch"
        on={draft.askStretch}
        onToggle={(askStretch) => onChange({ askStretch })}
        about="Right is a stretch that holds half of one of the places below and is not much longer."
      />
      <Evidence draft={draft} capture={capture} span={span} onChange={onChange} />
      <Ask
        title="Name the circuit"
        on={draft.askCircuit}
        onToggle={(askCircuit) => onChange({ askCircuit })}
        about="Right is the circuit that the capture says now."
      >
        <Field label="Of which signal">
          <select
            className="choice"
            value={draft.circuitSignal}
            onChange={(event) => onChange({ circuitSignal: Number(event.target.value) })}
          >
            {draft.signals.map((index, place) => {
              const signal = capture.signals.find((each) => each.index === index);
              return (
                <option key={index} value={place}>
                  Signal {place + 1}: {signal?.name}, {circuitWords(signal?.circuit ?? 'other').full}
                </option>
              );
            })}
          </select>
        </Field>
      </Ask>
      <Ask title="Choose a cause" on={draft.askCause} onToggle={(askCause) => onChange({ askCause })}>
        <Causes draft={draft} onChange={onChange} />
      </Ask>
      <Ask
        title="Type a value"
        on={draft.askValue}
        onToggle={(askValue) => onChange({ askValue, ...(askValue ? { scales: true } : {}) })}
        about="Axes get numbers, so that it can be read off. A comma and a point are the same; ms and s are converted."
      >
        <ValueFields draft={draft} capture={capture} measurements={measurements} onChange={onChange} />
      </Ask>
      <Ask
        title="Free text"
        on={draft.askText}
        onToggle={(askText) => onChange({ askText })}
        about="You judge it."
      >
        <Field label="What to write about">
          <input
            className="box"
            maxLength={300}
            value={draft.prompt}
            onChange={(event) => onChange({ prompt: event.target.value })}
          />
        </Field>
      </Ask>
    </>
  );
}

function Ask({
  title,
  about,
  on,
  onToggle,
  children,
}: {
  title: string;
  about?: string;
  on: boolean;
  onToggle: (on: boolean) => void;
  children?: ReactNode;
}) {
  return (
    <div className="grid gap-2">
      <label className="build-tick">
        <input
          type="checkbox"
          className="tick"
          checked={on}
          onChange={(event) => onToggle(event.target.checked)}
        />
        <b>{title}</b>
      </label>
      {on && about !== undefined && <p className="text-soft">{about}</p>}
      {on && children}
    </div>
  );
}

function Evidence({ draft, capture, span, onChange }: Omit<EditorAsksProps, 'measurements'>) {
  const add = (signal: number | null) =>
    span !== null &&
    onChange({ evidence: [...draft.evidence, { signal, from: span.from, to: span.to, label: '' }] });
  return (
    <div className="grid gap-2">
      <h3>Where it shows</h3>
      <p className="text-soft">
        Hatched on the trace when the answer opens. Lay the span on the trace above, then add it here.
      </p>
      <ul className="build-list">
        {draft.evidence.map((each, at) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: places have no name of their own, and rows are not moved
          <li key={at}>
            <span className="figures">
              {time(each.from, capture.durationS)} to {time(each.to, capture.durationS)} (
              {duration(each.to - each.from)})
            </span>
            <span className="grow">
              <input
                className="box"
                aria-label={`Label of place ${at + 1}`}
                placeholder="what it is, e.g. tooth 23"
                maxLength={120}
                value={each.label}
                onChange={(event) =>
                  onChange({
                    evidence: draft.evidence.map((other, place) =>
                      place === at ? { ...other, label: event.target.value } : other,
                    ),
                  })
                }
              />
            </span>
            <Button
              className="button-icon"
              aria-label={`Remove place ${at + 1}`}
              onClick={() => onChange({ evidence: draft.evidence.filter((_, place) => place !== at) })}
            >
              <Icon name="cross" small />
            </Button>
          </li>
        ))}
      </ul>
      <div className="flex flex-wrap gap-2">
        {draft.signals.map((index, place) => (
          <Button key={index} small icon="plus" disabled={span === null} onClick={() => add(place)}>
            Span on {capture.signals.find((each) => each.index === index)?.name ?? `signal ${place + 1}`}
          </Button>
        ))}
      </div>
      {span === null && <p className="text-soft">No span is laid yet: press Span above the trace.</p>}
    </div>
  );
}

function Causes({ draft, onChange }: Pick<EditorAsksProps, 'draft' | 'onChange'>) {
  const [own, setOwn] = useState('');
  const listed = [
    ...COMMON_CAUSES,
    ...draft.choices.filter(({ key }) => !COMMON_CAUSES.some((common) => common.key === key)),
  ];
  const addOwn = () => {
    const text = own.trim();
    if (text === '' || draft.choices.some(({ key }) => key === keyOf(text))) return;
    onChange({ choices: [...draft.choices, { key: keyOf(text), text, hint: '' }] });
    setOwn('');
  };
  return (
    <>
      <fieldset className="build-ticks">
        <legend className="text-soft">Tick two to twelve to choose from</legend>
        {listed.map((cause) => (
          <label key={cause.key} className="build-tick">
            <input
              type="checkbox"
              className="tick"
              checked={draft.choices.some(({ key }) => key === cause.key)}
              onChange={(event) =>
                onChange({
                  choices: event.target.checked
                    ? [...draft.choices, cause]
                    : draft.choices.filter(({ key }) => key !== cause.key),
                  ...(!event.target.checked && draft.cause === cause.key ? { cause: '' } : {}),
                })
              }
            />
            {cause.text}
          </label>
        ))}
      </fieldset>
      <div className="build-row">
        <Field label="Another in your words">
          <input
            className="box"
            maxLength={120}
            value={own}
            onChange={(event) => setOwn(event.target.value)}
          />
        </Field>
        <Button className="self-end" icon="plus" onClick={addOwn}>
          Add it
        </Button>
      </div>
      <Field label="Which is right">
        <select
          className="choice"
          value={draft.cause}
          onChange={(event) => onChange({ cause: event.target.value })}
        >
          <option value="">choose</option>
          {draft.choices.map(({ key, text }) => (
            <option key={key} value={key}>
              {text}
            </option>
          ))}
        </select>
      </Field>
    </>
  );
}

function ValueFields({ draft, capture, measurements, onChange }: Omit<EditorAsksProps, 'span'>) {
  const measured = measuredChoices(measurements, capture, draft.signals);
  return (
    <>
      {measured.length > 0 && (
        <Field
          label="Take a measured value"
          help="Fills in the fields below; the tolerance is five per cent of it."
        >
          <select
            className="choice"
            value=""
            onChange={(event) => {
              const found = measured[Number(event.target.value)];
              if (event.target.value === '' || found === undefined) return;
              onChange({
                valueLabel: found.label,
                value: String(found.value),
                valueUnit: found.unit,
                tolerance: String(Number(Math.abs(found.value * 0.05).toPrecision(2))),
                ...(draft.evidence.length === 0 ? { evidence: found.evidence } : {}),
              });
            }}
          >
            <option value="">choose</option>
            {measured.map(({ label, value, unit }, at) => (
              <option key={label} value={at}>
                {label}: {value} {unit}
              </option>
            ))}
          </select>
        </Field>
      )}
      <Field label="What to measure">
        <input
          className="box"
          maxLength={120}
          placeholder="e.g. Dwell of the second firing"
          value={draft.valueLabel}
          onChange={(event) => onChange({ valueLabel: event.target.value })}
        />
      </Field>
      <div className="build-row">
        <Field label="Value">
          <input
            className="box box-figures"
            inputMode="decimal"
            value={draft.value}
            onChange={(event) => onChange({ value: event.target.value })}
          />
        </Field>
        <Field label="Unit">
          <select
            className="choice"
            value={draft.valueUnit}
            onChange={(event) => onChange({ valueUnit: event.target.value })}
          >
            {UNITS.map((unit) => (
              <option key={unit} value={unit}>
                {unit === '1' ? 'none' : unit}
              </option>
            ))}
          </select>
        </Field>
        <Field label="Tolerance, more or less">
          <input
            className="box box-figures"
            inputMode="decimal"
            value={draft.tolerance}
            onChange={(event) => onChange({ tolerance: event.target.value })}
          />
        </Field>
      </div>
    </>
  );
}
