import { useState } from 'react';
import type { JobJson } from '../../contract/areas/jobs.ts';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { timeText } from '../base/numbers.ts';
import { useDraft } from './use-draft.ts';

interface OutcomePanelProps {
  job: JobJson;
  personId: string;
  timeZone: string;
  onChanged: (job: JobJson) => void;
  /** Somebody else changed it meanwhile. */
  onStale: () => void;
}

const NOTHING = { cause: '', part: '', proof: '', note: '' };
const FIELDS = [
  { name: 'cause', label: 'Cause', help: 'What was wrong, in one sentence.', max: 500 },
  { name: 'part', label: 'Part or repair', help: 'What was replaced or mended.', max: 500 },
  { name: 'proof', label: 'Proof', help: 'The reading or trace before and after that shows it.', max: 2000 },
  { name: 'note', label: 'Note', help: 'Or why it ends without a cause.', max: 2000 },
] as const;

/** Cause, part and proof; with them the job is closed, and can be opened again. */
export function OutcomePanel({ job, personId, timeZone, onChanged, onStale }: OutcomePanelProps) {
  const draft = useDraft(`${personId} job ${job.id} outcome`, job.outcome ?? NOTHING);
  const [editing, setEditing] = useState(false);
  const [busy, setBusy] = useState<'keep' | 'close' | 'open' | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [missing, setMissing] = useState(false);
  const { fields } = draft;
  const closed = job.state === 'closed';

  const send = async (what: 'keep' | 'close' | 'open', body: Record<string, unknown>) => {
    setBusy(what);
    setTrouble(null);
    try {
      const { data } = await api<JobJson>(`/jobs/${job.id}`, { method: 'PATCH', body, etag: job.etag });
      if (what !== 'open') draft.clear();
      setEditing(false);
      onChanged(data);
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      if (thrown instanceof ApiFailure && (thrown.status === 412 || thrown.status === 409)) onStale();
    } finally {
      setBusy(null);
    }
  };
  const close = () => {
    if (fields.cause.trim() === '' && fields.note.trim() === '') return setMissing(true);
    setMissing(false);
    return send('close', { state: 'closed', outcome: fields });
  };
  return (
    <section aria-labelledby="outcome" className="border-b border-rule pb-4">
      <div className="panel-head">
        <h2 id="outcome">Outcome</h2>
        <span className="text-soft">
          {closed && job.closedAt !== null
            ? `closed ${timeText(job.closedAt, timeZone)} by ${job.closedBy?.name ?? 'former member'}`
            : 'open'}
        </span>
      </div>
      <div className="grid gap-3 px-(--margin)">
        {!editing && job.outcome !== null && (
          <dl className="grid gap-2">
            {FIELDS.filter(({ name }) => job.outcome?.[name]).map(({ name, label }) => (
              <div key={name}>
                <dt className="narrow text-caption text-soft">{label}</dt>
                <dd className="break-words whitespace-pre-line">{job.outcome?.[name]}</dd>
              </div>
            ))}
          </dl>
        )}
        {!editing && draft.found && (
          <p className="text-dense text-soft">Something you typed is not kept yet.</p>
        )}
        {editing &&
          FIELDS.map(({ name, label, help, max }) => (
            <Field
              key={name}
              label={label}
              help={help}
              error={
                name === 'cause' && missing ? 'Say what was found, or in the note why it ends without' : null
              }
            >
              <textarea
                className="box min-h-14"
                maxLength={max}
                value={fields[name]}
                onChange={(event) => draft.set({ [name]: event.target.value })}
              />
            </Field>
          ))}
        {trouble !== null && (
          <Message
            verdict="bad"
            live="alert"
            title="It was not kept"
            happened={trouble}
            kept="What you typed, in this browser. The job is shown as it is now."
          />
        )}
        <div className="flex flex-wrap gap-2">
          {!editing && (
            <Button onClick={() => setEditing(true)}>
              {job.outcome === null ? 'Write the outcome' : 'Change'}
            </Button>
          )}
          {!editing && closed && (
            <Button busy={busy === 'open'} onClick={() => send('open', { state: 'open' })}>
              Open again
            </Button>
          )}
          {editing && (
            <>
              {!closed && (
                <Button kind="main" busy={busy === 'close'} onClick={close}>
                  Close the job
                </Button>
              )}
              <Button busy={busy === 'keep'} onClick={() => send('keep', { outcome: fields })}>
                Keep
              </Button>
              <Button onClick={() => setEditing(false)}>Later</Button>
            </>
          )}
        </div>
      </div>
    </section>
  );
}
