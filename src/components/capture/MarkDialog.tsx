import { type FormEvent, useState } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { MarkJson } from '../../contract/areas/marks.ts';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { type MarkFields, mergeMark } from './merge-mark.ts';

/** A mark that is being made (`id` null) or changed. */
export type MarkDraft = Pick<MarkJson, 'kind' | 'signal' | 'from' | 'to' | 'value' | 'text'> & {
  readonly id: string | null;
  readonly etag: string | null;
};

interface MarkDialogProps {
  capture: CaptureJson;
  draft: MarkDraft;
  onClose: () => void;
  onSaved: () => void;
  /** The mark as it is now on the server, after somebody else changed it; null: it is gone. */
  reload: (id: string) => Promise<MarkJson | null>;
}

const number = (text: string) => (text.trim() === '' ? Number.NaN : Number(text.replace(',', '.')));

/** Text, kind and place of a mark: everything that dragging sets can be typed too. */
export function MarkDialog({ capture, draft, onClose, onSaved, reload }: MarkDialogProps) {
  const [text, setText] = useState(draft.text);
  const [kind, setKind] = useState(draft.kind);
  const [signal, setSignal] = useState(draft.signal);
  const [from, setFrom] = useState(String(rounded(draft.from)));
  const [to, setTo] = useState(draft.to === null ? '' : String(rounded(draft.to)));
  const [value, setValue] = useState(draft.value === null ? '' : String(rounded(draft.value)));
  const [etag, setEtag] = useState(draft.etag);
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [theirs, setTheirs] = useState<MarkJson | null>(null);
  const [joined, setJoined] = useState(false);
  /** What both people began with: the mark as it was opened, then as it was last seen on the server. */
  const [began, setBegan] = useState<MarkFields>(draft);
  const unit = capture.signals.find((each) => each.index === signal)?.unit ?? '';

  const save = async (event?: FormEvent) => {
    event?.preventDefault();
    const body = {
      kind,
      signal,
      from: number(from),
      to: kind === 'range' ? number(to) : null,
      value: value === '' ? null : number(value),
      text,
    };
    if (!Number.isFinite(body.from) || (body.to !== null && !Number.isFinite(body.to)))
      return setTrouble('Times are numbers in seconds of the capture’s own axis.');
    if (kind === 'level' && (body.value === null || signal === null))
      return setTrouble('A level needs a signal and a value in its unit.');
    setBusy(true);
    setTrouble(null);
    try {
      if (draft.id === null) await api(`/captures/${capture.id}/marks`, { method: 'POST', body });
      else await api(`/marks/${draft.id}`, { method: 'PATCH', body, etag });
      onSaved();
    } catch (thrown) {
      if (thrown instanceof ApiFailure && thrown.status === 412 && draft.id !== null) {
        const now = await reload(draft.id).catch(() => null);
        if (now === null)
          setTrouble('Somebody deleted this mark since you opened it. Your text is still in the box.');
        else {
          const { merged, clashes } = mergeMark(
            began,
            {
              ...body,
              from: same(body.from, began.from),
              to: body.to === null || began.to === null ? body.to : same(body.to, began.to),
              value: body.value === null || began.value === null ? body.value : same(body.value, began.value),
            },
            now,
          );
          fill(merged);
          setBegan(now);
          setTheirs(clashes.length > 0 ? now : null);
          setJoined(clashes.length === 0);
          setEtag(now.etag);
        }
      } else setTrouble(sentenceOf(thrown));
    } finally {
      setBusy(false);
    }
  };
  const fill = (fields: MarkFields) => {
    setText(fields.text);
    setKind(fields.kind);
    setSignal(fields.signal);
    setFrom(String(rounded(fields.from)));
    setTo(fields.to === null ? '' : String(rounded(fields.to)));
    setValue(fields.value === null ? '' : String(rounded(fields.value)));
  };
  const takeTheirs = () => {
    if (theirs === null) return;
    fill(theirs);
    setTheirs(null);
  };

  return (
    <Dialog open title={draft.id === null ? 'New mark' : 'Change mark'} onClose={onClose}>
      <form className="dialog-form" onSubmit={save}>
        {theirs !== null && (
          <Message
            verdict="watch"
            live="alert"
            title={`${theirs.author === '' ? 'Somebody' : theirs.author}’s mark was changed while you had it open`}
            happened={`It now reads: “${theirs.text}”.`}
            kept="Nothing was overwritten, and your text is still in the box."
            todo="Take the newer one, or save yours over it."
            actions={
              <>
                <Button small onClick={takeTheirs}>
                  Take the newer one
                </Button>
                <Button small onClick={() => setTheirs(null)}>
                  Keep mine
                </Button>
              </>
            }
          />
        )}
        {joined && (
          <Message
            verdict="info"
            live="alert"
            title="Somebody changed this mark while you had it open"
            happened="They changed something else than you: both changes are in the boxes now."
            kept="Nothing was overwritten."
            todo="Look it over and save again."
          />
        )}
        {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
        <Field label="What is seen here" help="Name a colleague with @ and they get a mail.">
          <textarea
            className="box"
            rows={3}
            maxLength={2000}
            value={text}
            onChange={(event) => setText(event.target.value)}
            autoFocus
          />
        </Field>
        <div className="dialog-row">
          <Field label="Kind">
            <select className="choice" value={kind} onChange={(event) => setKind(kindOf(event.target.value))}>
              <option value="point">Point</option>
              <option value="range">Range</option>
              <option value="level">Level</option>
            </select>
          </Field>
          <Field label="Signal">
            <select
              className="choice"
              value={signal ?? ''}
              onChange={(event) => setSignal(event.target.value === '' ? null : Number(event.target.value))}
            >
              <option value="">All, on the time axis</option>
              {capture.signals.map((each) => (
                <option key={each.index} value={each.index}>
                  {each.name}
                </option>
              ))}
            </select>
          </Field>
        </div>
        <div className="dialog-row">
          <Field label={kind === 'range' ? 'From, seconds' : 'At, seconds'}>
            <input
              className="box box-figures"
              inputMode="decimal"
              value={from}
              onChange={(e) => setFrom(e.target.value)}
            />
          </Field>
          {kind === 'range' && (
            <Field label="To, seconds">
              <input
                className="box box-figures"
                inputMode="decimal"
                value={to}
                onChange={(e) => setTo(e.target.value)}
              />
            </Field>
          )}
          {kind !== 'range' && signal !== null && (
            <Field label={unit === '' || unit === '1' ? 'Value' : `Value, ${unit}`}>
              <input
                className="box box-figures"
                inputMode="decimal"
                value={value}
                onChange={(e) => setValue(e.target.value)}
              />
            </Field>
          )}
        </div>
        <div className="dialog-actions">
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="main" type="submit" busy={busy}>
            {draft.id === null ? 'Pin mark' : 'Save mark'}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}

/** A time that was only rounded for the box is not a change. */
const same = (typed: number, before: number) => (typed === rounded(before) ? before : typed);

const kindOf = (text: string): MarkDraft['kind'] => (text === 'range' || text === 'level' ? text : 'point');

/** Nine significant digits are finer than any sample step and still readable. */
const rounded = (value: number) => Number(value.toPrecision(9));
