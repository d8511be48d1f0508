import { type FormEvent, useRef, useState } from 'react';
import type { JobJson } from '../../contract/areas/jobs.ts';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { fieldErrors } from './field-errors.ts';
import { useDraft } from './use-draft.ts';
import { EMPTY_VEHICLE, VehicleFields, vehicleOfText, vehicleProblems } from './VehicleFields.tsx';
import { codesOf } from './words.ts';

const EMPTY = { ...EMPTY_VEHICLE, complaint: '', codes: '' };

/** The form for a new job: the complaint first, the rest as far as it is known. */
export function NewJob({ personId }: { personId: string }) {
  const draft = useDraft(`${personId} new job`, EMPTY);
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [errors, setErrors] = useState<Readonly<Record<string, string>>>({});
  // The same key for the same try: when the answer was lost on the way, sending again opens no second job.
  const tried = useRef<{ body: string; key: string } | null>(null);
  const { complaint, codes, ...vehicle } = draft.fields;

  const save = async (event: FormEvent) => {
    event.preventDefault();
    if (complaint.trim() === '') return setErrors({ complaint: 'Say what the vehicle does or does not do' });
    const problems = vehicleProblems(vehicle);
    if (Object.keys(problems).length > 0) return setErrors(problems);
    const body = { complaint, codes: codesOf(codes), vehicle: vehicleOfText(vehicle) };
    const text = JSON.stringify(body);
    if (tried.current?.body !== text) tried.current = { body: text, key: newKey() };
    setBusy(true);
    setTrouble(null);
    setErrors({});
    try {
      const { data } = await api<JobJson>('/jobs', { method: 'POST', body, key: tried.current.key });
      draft.clear();
      location.assign(`/jobs/${data.id}`);
    } catch (thrown) {
      setErrors(fieldErrors(thrown));
      if (!(thrown instanceof ApiFailure && thrown.status === 422 && thrown.details.length > 0))
        setTrouble(sentenceOf(thrown));
      setBusy(false);
    }
  };
  return (
    <form className="contents" onSubmit={save} noValidate>
      <div className="grid max-w-180 gap-5 px-(--margin) py-5">
        {draft.found && (
          <Message
            verdict="info"
            title="Typed before, not sent yet"
            kept="What you had typed here in this browser."
            actions={
              <Button small onClick={draft.clear}>
                Start empty
              </Button>
            }
          />
        )}
        <Field
          label="Complaint"
          help="What it does or does not do, since when, what was done before. In the customer’s words."
          error={errors.complaint ?? null}
        >
          <textarea
            className="box"
            maxLength={2000}
            required
            value={complaint}
            onChange={(event) => draft.set({ complaint: event.target.value })}
          />
        </Field>
        <VehicleFields fields={vehicle} onChange={draft.set} errors={errors} />
        <Field label="Trouble codes" help="As the reader shows them, parted by spaces. Kept as typed.">
          <input
            className="box box-figures"
            autoCapitalize="characters"
            autoComplete="off"
            spellCheck={false}
            maxLength={500}
            value={codes}
            onChange={(event) => draft.set({ codes: event.target.value })}
          />
        </Field>
        {trouble !== null && (
          <Message
            verdict="bad"
            live="alert"
            title="The job was not opened"
            happened={trouble}
            kept="Everything you typed, in this browser, also when you close the page."
            todo="Send it again when the connection is back."
          />
        )}
        <div className="hidden gap-2 desk:flex">
          <Button type="submit" kind="main" busy={busy}>
            Open the job
          </Button>
        </div>
      </div>
      <div className="thumb-strip">
        <Button type="submit" kind="main" busy={busy} className="grow">
          Open the job
        </Button>
      </div>
    </form>
  );
}

const newKey = () =>
  Array.from(crypto.getRandomValues(new Uint8Array(12)), (byte) => byte.toString(36)).join('');
