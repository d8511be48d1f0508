import { useState } from 'react';
import type { CaptureJson, DerivedJson } from '../../contract/areas/captures.ts';
import { Button } from '../base/Button.tsx';
import { Field } from '../base/Field.tsx';

type Kind = DerivedJson['kind'];

const KINDS: readonly (readonly [Kind, string])[] = [
  ['low-pass', 'Low-pass'],
  ['moving-mean', 'Moving mean'],
  ['difference', 'Difference of two'],
  ['derivative', 'Change a second'],
  ['integral', 'Area under it'],
  ['absolute', 'Without sign'],
  ['speed', 'Speed from teeth'],
];

const kindOf = (text: string): Kind => KINDS.find(([kind]) => kind === text)?.[0] ?? 'low-pass';
const positive = (text: string): number | null => {
  const value = Number(text.trim().replace(',', '.'));
  return text.trim() !== '' && Number.isFinite(value) && value > 0 ? value : null;
};

interface DerivedFormProps {
  capture: CaptureJson;
  /** The whole list as it shall be. */
  onSave: (derived: DerivedJson[]) => Promise<void>;
}

/** Makes a new signal from those that are there; the recorded ones stay as they are. */
export function DerivedForm({ capture, onSave }: DerivedFormProps) {
  const [kind, setKind] = useState<Kind>('low-pass');
  const first = capture.signals[0]?.column ?? 0;
  const [of, setOf] = useState(first);
  const [less, setLess] = useState(capture.signals[1]?.column ?? first);
  const [amount, setAmount] = useState('');
  const [busy, setBusy] = useState(false);
  const takes = kind === 'low-pass' || kind === 'moving-mean';
  const value = positive(amount);
  const column = Math.min(0, ...capture.derived.map((one) => one.column)) - 1;
  const request = (): DerivedJson | null => {
    if (kind === 'low-pass') return value === null ? null : { kind, column, of, cutoffHz: value };
    if (kind === 'moving-mean') return value === null ? null : { kind, column, of, lengthS: value / 1e3 };
    if (kind === 'difference') return of === less ? null : { kind, column, of, less };
    return { kind, column, of };
  };
  const wanted = request();
  const choice = (label: string, chosen: number, choose: (column: number) => void) => (
    <Field label={label}>
      <select className="choice" value={chosen} onChange={(event) => choose(Number(event.target.value))}>
        {capture.signals.map((signal) => (
          <option key={signal.column} value={signal.column}>
            {signal.name}
          </option>
        ))}
      </select>
    </Field>
  );
  return (
    <form
      className="derived-form"
      onSubmit={(event) => {
        event.preventDefault();
        if (wanted === null || busy) return;
        setBusy(true);
        void onSave([...capture.derived, wanted]).finally(() => setBusy(false));
      }}
    >
      <h3>Make a signal</h3>
      <div className="dialog-row">
        <Field label="What">
          <select className="choice" value={kind} onChange={(event) => setKind(kindOf(event.target.value))}>
            {KINDS.map(([value_, text]) => (
              <option key={value_} value={value_}>
                {text}
              </option>
            ))}
          </select>
        </Field>
        {choice(kind === 'difference' ? 'Take' : 'Of', of, setOf)}
      </div>
      <div className="dialog-row">
        {kind === 'difference' && choice('Less', less, setLess)}
        {takes && (
          <Field
            label={kind === 'low-pass' ? 'Up to, Hz' : 'Over, ms'}
            error={amount !== '' && value === null ? 'Needs a number above 0' : null}
          >
            <input
              className="box box-figures"
              inputMode="decimal"
              value={amount}
              onChange={(event) => setAmount(event.target.value)}
            />
          </Field>
        )}
        <Button type="submit" busy={busy} disabled={wanted === null}>
          Make it
        </Button>
      </div>
      <p className="field-help">
        The file is read again and the new signal is stored, measured and taken out like the others. Nothing
        recorded changes.
      </p>
    </form>
  );
}
