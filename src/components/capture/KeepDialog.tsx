import { type FormEvent, useState } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { KnownGoodJson } from '../../contract/areas/library.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { ReplacesField } from './ReplacesField.tsx';
import { StretchFields, stretch } from './StretchFields.tsx';

/** The contract's conditions; only types may come from there. */
const CONDITIONS: readonly KnownGoodJson['condition'][] = [
  'cranking',
  'idle',
  'part load',
  'full load',
  'key on',
  'bench',
  'other',
];

/** Proposes signals of this capture as a known-good; somebody else reviews it. */
export function KeepDialog({ capture, onClose }: { capture: CaptureJson; onClose: () => void }) {
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [kept, setKept] = useState<string | null>(null);

  const save = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    const text = (name: string) => String(form.get(name) ?? '').trim();
    const whole = (name: string) => (text(name) === '' ? null : Number(text(name)));
    const signals = form.getAll('signals').map(Number);
    if (signals.length === 0) return setTrouble('Choose at least one signal to keep.');
    setBusy(true);
    setTrouble(null);
    try {
      const { data } = await api<KnownGoodJson>('/known-goods', {
        method: 'POST',
        body: {
          captureId: capture.id,
          signals,
          ...stretch(text('from'), text('to')),
          supersedes: text('supersedes') === '' ? null : text('supersedes'),
          instrument: text('instrument'),
          probe: text('probe'),
          confirmed: text('confirmed'),
          engine: {
            make: text('make'),
            model: text('model'),
            code: text('code'),
            year: whole('year'),
            yearTo: whole('yearTo'),
            cylinders: whole('cylinders'),
          },
          condition: text('condition'),
          note: text('note'),
          provenance: text('provenance'),
        },
      });
      setKept(data.id);
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    } finally {
      setBusy(false);
    }
  };

  if (kept !== null)
    return (
      <Dialog
        open
        title="Proposed as a known-good"
        onClose={onClose}
        actions={
          <>
            <Button onClick={onClose}>Close</Button>
            <a className="button button-main" href={`/library/${kept}`}>
              See the proposal
            </a>
          </>
        }
      >
        <p className="mt-3">
          An instructor or the owner, somebody other than you, reviews it before it can be compared against.
          The capture stays as it is.
        </p>
      </Dialog>
    );
  return (
    <Dialog open title="Keep as known-good" onClose={onClose}>
      <form className="dialog-form" onSubmit={save}>
        {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
        <fieldset className="dialog-ticks">
          <legend className="field-label">Signals</legend>
          {capture.signals.map((signal) => (
            <label key={signal.index}>
              <input className="tick" type="checkbox" name="signals" value={signal.index} defaultChecked />
              {signal.name}
            </label>
          ))}
        </fieldset>
        <StretchFields capture={capture} />
        <div className="dialog-row">
          <Field label="Make">
            <input className="box" name="make" required maxLength={80} autoComplete="off" />
          </Field>
          <Field label="Model">
            <input className="box" name="model" required maxLength={80} autoComplete="off" />
          </Field>
        </div>
        <div className="dialog-row">
          <Field label="Engine code">
            <input className="box" name="code" maxLength={40} autoComplete="off" />
          </Field>
          <Field label="First year">
            <input className="box box-figures" name="year" type="number" min={1900} max={2100} />
          </Field>
          <Field label="Last year">
            <input className="box box-figures" name="yearTo" type="number" min={1900} max={2100} />
          </Field>
          <Field label="Cylinders">
            <input
              className="box box-figures"
              name="cylinders"
              type="number"
              min={1}
              max={16}
              defaultValue={capture.cylinders ?? ''}
            />
          </Field>
        </div>
        <Field label="Condition">
          <select className="choice" name="condition" defaultValue="cranking">
            {CONDITIONS.map((condition) => (
              <option key={condition} value={condition}>
                {condition}
              </option>
            ))}
          </select>
        </Field>
        <div className="dialog-row">
          <Field label="Instrument">
            <input className="box" name="instrument" maxLength={200} autoComplete="off" />
          </Field>
          <Field label="Probe or clamp">
            <input className="box" name="probe" maxLength={200} autoComplete="off" />
          </Field>
        </div>
        <Field label="How it was confirmed">
          <input className="box" name="confirmed" maxLength={1000} autoComplete="off" />
        </Field>
        <ReplacesField captureId={capture.id} />
        <Field
          label="Where it comes from"
          help="Who recorded it, when and on which vehicle; no plate and no VIN."
        >
          <textarea className="box" name="provenance" required maxLength={2000} rows={3} />
        </Field>
        <Field label="Note">
          <textarea className="box" name="note" maxLength={2000} rows={2} />
        </Field>
        <div className="dialog-actions">
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="main" type="submit" busy={busy}>
            Propose
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
