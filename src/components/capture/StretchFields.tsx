import { useState } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import { Field } from '../base/Field.tsx';
import { shownInAddress } from './address.ts';

const digits = (value: number) => String(Number(value.toPrecision(9)));

/** The part of a capture that is kept, in seconds of its own axis; nothing typed keeps all of it. */
export function StretchFields({ capture }: { capture: CaptureJson }) {
  const [from, setFrom] = useState('');
  const [to, setTo] = useState('');
  const take = () => {
    const { view } = shownInAddress(location.search, []);
    if (view === null) return;
    setFrom(digits(Math.max(view.from, capture.startS)));
    setTo(digits(Math.min(view.to, capture.startS + capture.durationS)));
  };
  return (
    <fieldset>
      <legend className="field-label">Stretch, seconds</legend>
      <div className="dialog-row">
        <Field label="From">
          <input
            className="box box-figures"
            name="from"
            type="number"
            step="any"
            placeholder={digits(capture.startS)}
            value={from}
            onChange={(event) => setFrom(event.target.value)}
          />
        </Field>
        <Field label="To">
          <input
            className="box box-figures"
            name="to"
            type="number"
            step="any"
            placeholder={digits(capture.startS + capture.durationS)}
            value={to}
            onChange={(event) => setTo(event.target.value)}
          />
        </Field>
        <button type="button" className="button self-end" onClick={take}>
          Take what is shown
        </button>
      </div>
    </fieldset>
  );
}

/** Only what was typed: an end left empty is the capture's own. */
export const stretch = (from: string, to: string): { from?: number; to?: number } => ({
  ...(from === '' ? {} : { from: Number(from) }),
  ...(to === '' ? {} : { to: Number(to) }),
});
