import './build.css';
import { useState } from 'react';
import type { SetItemInput, SetItemJson, SetJson } from '../../contract/areas/teaching.ts';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { UndoBar } from '../base/UndoBar.tsx';
import { type Draft, type Named, SetEditorItem } from './SetEditorItem.tsx';

interface SetEditorProps {
  /** Null: a new one. */
  set: SetJson | null;
  learners: readonly { readonly id: string; readonly name: string }[];
  exercises: readonly Named[];
  captures: readonly Named[];
}

const draftOf = (item: SetItemJson): Draft => ({
  key: item.id,
  id: item.id,
  kind: item.kind,
  text: item.text,
  afterCommit: item.afterCommit,
  thing: item.exercise ?? item.capture,
});

function inputOf({ id, kind, text, afterCommit, thing }: Draft): SetItemInput | null {
  const own = id === undefined ? {} : { id };
  if (kind === 'text') return text.trim() === '' ? null : { ...own, kind, text, afterCommit };
  if (thing === null) return null;
  return kind === 'capture'
    ? { ...own, kind, captureId: thing.id, text }
    : { ...own, kind, exerciseId: thing.id };
}

/** Builds a set: title, whom it is for, and the items in order. Everything is saved together. */
export function SetEditor({ set, learners, exercises, captures }: SetEditorProps) {
  const [title, setTitle] = useState(set?.title ?? '');
  const [intro, setIntro] = useState(set?.intro ?? '');
  const [state, setState] = useState<SetJson['state']>(set?.state ?? 'draft');
  const [audience, setAudience] = useState<SetJson['audience']>(set?.audience ?? 'everyone');
  const [people, setPeople] = useState<readonly string[]>(set?.people.map(({ id }) => id) ?? []);
  const [items, setItems] = useState<readonly Draft[]>(set?.items.map(draftOf) ?? []);
  const [etag, setEtag] = useState<string | null>(set?.etag ?? null);
  const [id, setId] = useState<string | null>(set?.id ?? null);
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<{ text: string; stale: boolean } | null>(null);
  const [titleMissing, setTitleMissing] = useState(false);
  const [saved, setSaved] = useState(false);
  const [asking, setAsking] = useState(false);
  const [removed, setRemoved] = useState<{ item: Draft; at: number } | null>(null);

  const change = (next: readonly Draft[]) => {
    setItems(next);
    setSaved(false);
  };
  const add = (item: Omit<Draft, 'key'>) => change([...items, { ...item, key: crypto.randomUUID() }]);
  const move = (at: number, by: -1 | 1) => {
    const next = [...items];
    const [item] = next.splice(at, 1);
    if (item !== undefined) next.splice(at + by, 0, item);
    change(next);
  };
  const save = async () => {
    setTitleMissing(title.trim() === '');
    setTrouble(null);
    if (title.trim() === '') return;
    setBusy(true);
    try {
      const body = { title, intro, state, audience, people: audience === 'named' ? people : [] };
      const head =
        id === null
          ? await api<SetJson>('/sets', { method: 'POST', body })
          : await api<SetJson>(`/sets/${id}`, { method: 'PATCH', body, etag });
      // Kept at once: should the items fail, the next save changes this set and makes no second one.
      setId(head.data.id);
      setEtag(head.etag);
      const wanted = items.flatMap((item) => inputOf(item) ?? []);
      const all = await api<SetJson>(`/sets/${head.data.id}/items`, {
        method: 'PUT',
        body: { items: wanted },
        etag: head.etag,
      });
      setEtag(all.etag);
      setItems(all.data.items.map(draftOf));
      setSaved(true);
      if (id === null) history.replaceState(null, '', `/teaching/sets/${head.data.id}/edit`);
    } catch (thrown) {
      setTrouble({ text: sentenceOf(thrown), stale: thrown instanceof ApiFailure && thrown.status === 412 });
    } finally {
      setBusy(false);
    }
  };
  const remove = async () => {
    setAsking(false);
    setBusy(true);
    try {
      await api(`/sets/${id}`, { method: 'DELETE', etag });
      location.assign(`/teaching?gone=${id}`);
    } catch (thrown) {
      setTrouble({ text: sentenceOf(thrown), stale: false });
      setBusy(false);
    }
  };

  return (
    <div className="build">
      <section className="build-part" aria-labelledby="set-head">
        <h2 id="set-head">The set</h2>
        <Field label="Title" error={titleMissing ? 'Give the set a title' : null}>
          <input
            className="box"
            maxLength={120}
            value={title}
            onChange={(event) => setTitle(event.target.value)}
          />
        </Field>
        <Field label="What it is about" help="Stands above the items.">
          <textarea
            className="box"
            maxLength={2000}
            value={intro}
            onChange={(event) => setIntro(event.target.value)}
          />
        </Field>
      </section>
      <section className="build-part" aria-labelledby="set-items">
        <h2 id="set-items">In this set</h2>
        <ol className="build-list">
          {items.map((item, at) => (
            <SetEditorItem
              key={item.key}
              item={item}
              number={at + 1}
              first={at === 0}
              last={at === items.length - 1}
              onChange={(over) =>
                change(items.map((each, place) => (place === at ? { ...each, ...over } : each)))
              }
              onMove={(by) => move(at, by)}
              onRemove={() => {
                change(items.filter((_, place) => place !== at));
                setRemoved({ item, at });
              }}
            />
          ))}
          {items.length === 0 && (
            <li className="text-soft">Nothing yet: add a text, a capture or an exercise.</li>
          )}
        </ol>
        <div className="build-row">
          <Button
            icon="plus"
            onClick={() => add({ kind: 'text', text: '', afterCommit: false, thing: null })}
          >
            Text
          </Button>
          <Add
            label="Add an exercise"
            things={exercises.filter(({ id: each }) => !items.some(({ thing }) => thing?.id === each))}
            onAdd={(thing) => add({ kind: 'exercise', text: '', afterCommit: false, thing })}
          />
          <Add
            label="Add a capture"
            things={captures}
            onAdd={(thing) => add({ kind: 'capture', text: '', afterCommit: false, thing })}
          />
        </div>
      </section>
      <section className="build-part" aria-labelledby="set-for">
        <h2 id="set-for">Whom it is for</h2>
        <div className="flex flex-wrap gap-3">
          <Segmented
            label="State"
            value={state}
            options={[
              { value: 'draft', text: 'Draft' },
              { value: 'open', text: 'Open' },
            ]}
            onChange={setState}
          />
          <Segmented
            label="For whom"
            value={audience}
            options={[
              { value: 'nobody', text: 'Nobody' },
              { value: 'everyone', text: 'Every learner' },
              { value: 'named', text: 'Named' },
            ]}
            onChange={setAudience}
          />
        </div>
        {audience === 'named' && (
          <fieldset className="build-ticks">
            <legend className="sr-only">Learners</legend>
            {learners.map((learner) => (
              <label key={learner.id} className="build-tick">
                <input
                  type="checkbox"
                  className="tick"
                  checked={people.includes(learner.id)}
                  onChange={(event) =>
                    setPeople(
                      event.target.checked
                        ? [...people, learner.id]
                        : people.filter((each) => each !== learner.id),
                    )
                  }
                />
                {learner.name}
              </label>
            ))}
            {learners.length === 0 && <p className="text-soft">There is no learner in this workshop yet.</p>}
          </fieldset>
        )}
        <p className="text-soft">
          {state === 'draft'
            ? 'A draft is seen by instructors and owners only.'
            : 'Open: those it is for see it from the moment you save.'}
        </p>
      </section>
      {trouble !== null && (
        <Message
          verdict="bad"
          live="alert"
          title="The set was not saved whole"
          happened={trouble.text}
          kept="What you typed here, as long as the page stays open."
          actions={
            trouble.stale ? <Button onClick={() => location.reload()}>Load it anew</Button> : undefined
          }
        />
      )}
      <div className="build-save">
        <Button kind="main" busy={busy} onClick={save}>
          Save
        </Button>
        {id !== null && (
          <a className="button" href={`/teaching/sets/${id}`}>
            See it
          </a>
        )}
        {id !== null && (
          <Button icon="bin" onClick={() => setAsking(true)}>
            Delete
          </Button>
        )}
        <p role="status" className="text-soft">
          {saved ? 'Saved.' : ''}
        </p>
      </div>
      <Dialog
        open={asking}
        title="Delete this set?"
        onClose={() => setAsking(false)}
        actions={
          <>
            <Button onClick={() => setAsking(false)}>Keep it</Button>
            <Button kind="bad" onClick={remove}>
              Delete the set
            </Button>
          </>
        }
      >
        <p>
          Learners no longer see “{title}”. Its exercises and what was answered stay, and it can be brought
          back for 30 days.
        </p>
      </Dialog>
      {removed !== null && (
        <UndoBar
          text="Item removed"
          onUndo={() => {
            change([...items.slice(0, removed.at), removed.item, ...items.slice(removed.at)]);
            setRemoved(null);
          }}
          onGone={() => setRemoved(null)}
        />
      )}
    </div>
  );
}

function Add({
  label,
  things,
  onAdd,
}: {
  label: string;
  things: readonly Named[];
  onAdd: (thing: Named) => void;
}) {
  return (
    <select
      className="choice"
      aria-label={label}
      value=""
      onChange={(event) => {
        const thing = things.find(({ id }) => id === event.target.value);
        if (thing !== undefined) onAdd(thing);
      }}
    >
      <option value="">{label}</option>
      {things.map(({ id, title }) => (
        <option key={id} value={id}>
          {title}
        </option>
      ))}
    </select>
  );
}
