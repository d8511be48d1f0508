import { type FormEvent, useState } from 'react';
import type { JobEntryJson } from '../../contract/areas/jobs.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { NumberBox, numberOf } from './NumberBox.tsx';
import { useDraft } from './use-draft.ts';

interface EntryDialogProps {
  jobId: string;
  personId: string;
  kind: 'note' | 'reading';
  onClose: () => void;
  onSaved: () => void;
}

const EMPTY = { text: '', what: '', value: '', meant: '', unit: '' };
const KINDS = [
  { value: 'note', text: 'Note' },
  { value: 'reading', text: 'Reading' },
] as const;

/** A note, or a number from a gauge or meter. What was typed stays in this browser until it has been kept. */
export function EntryDialog({ jobId, personId, kind: first, onClose, onSaved }: EntryDialogProps) {
  const draft = useDraft(`${personId} job ${jobId} entry`, EMPTY);
  const [kind, setKind] = useState(first);
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [wrong, setWrong] = useState<'text' | 'what' | 'value' | null>(null);
  const { text, what, value, meant, unit } = draft.fields;

  const save = async (event: FormEvent) => {
    event.preventDefault();
    if (kind === 'note' && text.trim() === '') return setWrong('text');
    if (kind === 'reading' && what.trim() === '') return setWrong('what');
    const read = numberOf(value, meant);
    if (kind === 'reading' && read === null) return setWrong('value');
    setWrong(null);
    setBusy(true);
    setTrouble(null);
    const body = kind === 'note' ? { kind, text } : { kind, what, value: read, unit, text };
    try {
      await api<JobEntryJson>(`/jobs/${jobId}/entries`, { method: 'POST', body });
      draft.clear();
      onSaved();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      setBusy(false);
    }
  };
  return (
    <Dialog open title={kind === 'note' ? 'Add a note' : 'Add a reading'} onClose={onClose}>
      <form className="mt-3 grid gap-4" onSubmit={save} noValidate>
        <Segmented label="Kind" options={KINDS} value={kind} onChange={setKind} />
        {kind === 'reading' && (
          <>
            <Field label="What was read" error={wrong === 'what' ? 'Say what was read' : null}>
              <input
                className="box"
                maxLength={200}
                placeholder="Rail pressure while cranking"
                value={what}
                onChange={(event) => draft.set({ what: event.target.value })}
              />
            </Field>
            <div className="grid grid-cols-[minmax(0,1fr)_7rem] gap-3">
              <NumberBox
                label="Value"
                value={value}
                meant={meant}
                onChange={(typed, chosen) => draft.set({ value: typed, meant: chosen })}
                wrong={wrong === 'value'}
              />
              <Field label="Unit">
                <input
                  className="box"
                  maxLength={20}
                  placeholder="bar"
                  autoCapitalize="off"
                  value={unit}
                  onChange={(event) => draft.set({ unit: event.target.value })}
                />
              </Field>
            </div>
          </>
        )}
        <Field
          label={kind === 'note' ? 'Note' : 'How it was read'}
          error={wrong === 'text' ? 'Nothing is written yet' : null}
        >
          <textarea
            className="box"
            maxLength={kind === 'note' ? 5000 : 2000}
            value={text}
            onChange={(event) => draft.set({ text: event.target.value })}
          />
        </Field>
        {trouble !== null && (
          <Message
            verdict="bad"
            live="alert"
            title="It was not kept on the server"
            happened={trouble}
            kept="What you typed, in this browser, also when you close this."
          />
        )}
        <div className="flex justify-end gap-2">
          <Button onClick={onClose}>Later</Button>
          <Button type="submit" kind="main" busy={busy}>
            Keep
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
