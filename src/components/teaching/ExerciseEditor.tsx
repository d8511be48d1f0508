import './build.css';
import { useMemo, useState } from 'react';
import useSWR from 'swr';
import type { CaptureJson, MeasurementsJson } from '../../contract/areas/captures.ts';
import type { ExerciseJson } from '../../contract/areas/teaching.ts';
import { ApiFailure, api, fetcher, fetcherWithEtag, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { Skeleton } from '../base/Skeleton.tsx';
import { SpanButton } from '../capture/TraceTools.tsx';
import { usePlotModel } from '../capture/usePlotModel.ts';
import { Plot } from '../plot/Plot.tsx';
import { createStore } from '../plot/store.ts';
import type { View } from '../plot/types.ts';
import { useStore } from '../plot/useStore.ts';
import { EditorAsks } from './EditorAsks.tsx';
import { contentOf, draftOf, type ExerciseDraft, newDraft } from './exercise-draft.ts';

const NO_SPAN = createStore<View | null>(null);
const once = { revalidateOnFocus: false, shouldRetryOnError: false };

interface ExerciseEditorProps {
  /** Null: a new one. */
  id: string | null;
  /** What a new one rests on. */
  captureId: string | null;
}

/** Builds an exercise from a capture, or changes one. */
export function ExerciseEditor({ id, captureId }: ExerciseEditorProps) {
  const exercise = useSWR(id === null ? null : `/exercises/${id}`, fetcherWithEtag<ExerciseJson>, once);
  const restsOn = captureId ?? exercise.data?.data.staff?.content.captureId ?? null;
  const capture = useSWR(restsOn === null ? null : `/captures/${restsOn}`, fetcher<CaptureJson>, once);
  const measurements = useSWR(
    capture.data?.status === 'ready' ? `/captures/${restsOn}/measurements` : null,
    fetcher<MeasurementsJson>,
    once,
  );
  const trouble: unknown = exercise.error ?? capture.error;
  if (trouble !== undefined)
    return (
      <div className="p-(--margin)">
        <Message verdict="bad" live="alert" title="It could not be loaded" happened={sentenceOf(trouble)} />
      </div>
    );
  if (capture.data === undefined || (id !== null && exercise.data === undefined))
    return <Skeleton label="Loading the capture" />;
  return (
    <EditorForm
      exercise={exercise.data?.data ?? null}
      etag={exercise.data?.etag ?? null}
      capture={capture.data}
      measurements={measurements.data ?? null}
    />
  );
}

interface EditorFormProps {
  exercise: ExerciseJson | null;
  etag: string | null;
  capture: CaptureJson;
  measurements: MeasurementsJson | null;
}

function EditorForm({ exercise, etag, capture, measurements }: EditorFormProps) {
  const [draft, setDraft] = useState<ExerciseDraft>(() =>
    exercise === null ? newDraft(capture) : draftOf(exercise, capture),
  );
  const [busy, setBusy] = useState(false);
  const [asking, setAsking] = useState(false);
  const [trouble, setTrouble] = useState<{ title: string; details: readonly string[] } | null>(null);
  const hidden = useMemo(
    () =>
      new Set(capture.signals.map(({ index }) => index).filter((index) => !draft.signals.includes(index))),
    [capture, draft.signals],
  );
  const model = usePlotModel({
    capture,
    address: `/api/v1/captures/${capture.id}/window`,
    version: capture.samplesVersion,
    opening: () => null,
    onRefused: () => location.reload(),
  });
  const span = useStore(model?.span ?? NO_SPAN);
  const change = (over: Partial<ExerciseDraft>) => setDraft((before) => ({ ...before, ...over }));
  const attempts = exercise?.staff?.attempts ?? 0;

  const failed = (thrown: unknown) => {
    const details =
      thrown instanceof ApiFailure
        ? thrown.details.map(({ path, message }) => `${wordsOf(path)} ${message}`)
        : [];
    setTrouble({ title: details.length > 0 ? 'Some fields need attention' : sentenceOf(thrown), details });
    setBusy(false);
  };
  const save = async () => {
    setBusy(true);
    setTrouble(null);
    const body = {
      title: draft.title,
      state: draft.state,
      content: contentOf(draft, capture, exercise?.staff?.content ?? null),
    };
    try {
      const { data } =
        exercise === null
          ? await api<ExerciseJson>('/exercises', { method: 'POST', body })
          : await api<ExerciseJson>(`/exercises/${exercise.id}`, { method: 'PATCH', body, etag });
      location.assign(`/teaching/exercises/${data.id}`);
    } catch (thrown) {
      failed(thrown);
    }
  };
  const remove = async () => {
    setAsking(false);
    setBusy(true);
    try {
      await api(`/exercises/${exercise?.id}`, { method: 'DELETE', etag });
      location.assign('/teaching');
    } catch (thrown) {
      failed(thrown);
    }
  };

  return (
    <div className="build">
      {attempts > 0 && (
        <Message
          verdict="info"
          title={attempts === 1 ? 'One answer was given already' : `${attempts} answers were given already`}
          happened="What you change becomes a new version."
          kept="Every answer keeps the version that it answered, with its marks."
        />
      )}
      {exercise?.staff?.captureChanged && (
        <Message
          verdict="watch"
          title="The capture was read again since"
          todo="Check that the places below still lie where they should, then save."
        />
      )}
      {(exercise?.staff?.openLinks ?? 0) > 0 && (
        <Message
          verdict="watch"
          title="The capture is shared by a link"
          happened="Whoever holds the link sees its names and numbers, a learner too."
          todo="Withdraw the link while the exercise is open."
        />
      )}
      <section className="build-part" aria-labelledby="trace">
        <h2 id="trace">
          {capture.title}
          {model !== null && (
            <span className="ml-auto">
              <SpanButton model={model} />
            </span>
          )}
        </h2>
        <div className="build-plot">
          {model !== null && (
            <Plot
              model={model}
              wheel={null}
              scale="seconds"
              hidden={hidden}
              evidence={
                draft.evidence.length === 0 ? null : { signal: null, label: '', stretches: draft.evidence }
              }
            />
          )}
        </div>
        <fieldset className="build-ticks">
          <legend className="sr-only">Signals shown</legend>
          {capture.signals.map(({ index, name }) => (
            <label key={index} className="build-tick">
              <input
                type="checkbox"
                className="tick"
                checked={draft.signals.includes(index)}
                onChange={(event) =>
                  change({
                    signals: event.target.checked
                      ? [...draft.signals, index]
                      : draft.signals.filter((each) => each !== index),
                    evidence: [],
                  })
                }
              />
              {name}
            </label>
          ))}
          <label className="build-tick">
            <input
              type="checkbox"
              className="tick"
              checked={draft.scales || draft.askValue}
              disabled={draft.askValue}
              onChange={(event) => change({ scales: event.target.checked })}
            />
            Numbers and units on the axes
          </label>
        </fieldset>
      </section>
      <section className="build-part" aria-labelledby="question">
        <h2 id="question">The question</h2>
        <Field label="Title" help="Learners see it: it must not give the answer away.">
          <input
            className="box"
            maxLength={120}
            value={draft.title}
            onChange={(event) => change({ title: event.target.value })}
          />
        </Field>
        <Field label="What to do">
          <textarea
            className="box"
            maxLength={600}
            value={draft.question}
            onChange={(event) => change({ question: event.target.value })}
          />
        </Field>
        <Field label="Complaint (may stay empty)">
          <input
            className="box"
            maxLength={200}
            value={draft.complaint}
            onChange={(event) => change({ complaint: event.target.value })}
          />
        </Field>
      </section>
      <section className="build-part" aria-labelledby="asked">
        <h2 id="asked">What is asked, and what is right</h2>
        <EditorAsks
          draft={draft}
          capture={capture}
          measurements={measurements}
          span={span}
          onChange={change}
        />
      </section>
      <section className="build-part" aria-labelledby="opens">
        <h2 id="opens">What opens after committing</h2>
        <Field label="The answer in one sentence">
          <input
            className="box"
            maxLength={300}
            value={draft.sentence}
            onChange={(event) => change({ sentence: event.target.value })}
          />
        </Field>
        {[0, 1, 2].map((at) => (
          <div key={at} className="build-row">
            <Field label={`Step ${at + 1} of the reasoning`}>
              <input
                className="box"
                maxLength={80}
                value={draft.reasoning[at]?.title ?? ''}
                onChange={(event) => change({ reasoning: stepped(draft, at, { title: event.target.value }) })}
              />
            </Field>
            <Field label={`What step ${at + 1} shows`}>
              <textarea
                className="box"
                maxLength={600}
                value={draft.reasoning[at]?.text ?? ''}
                onChange={(event) => change({ reasoning: stepped(draft, at, { text: event.target.value }) })}
              />
            </Field>
          </div>
        ))}
        <Field label="How it was proved (may stay empty)">
          <input
            className="box"
            maxLength={600}
            value={draft.proof}
            onChange={(event) => change({ proof: event.target.value })}
          />
        </Field>
        <Field label="What to take care of in the workshop (may stay empty)">
          <input
            className="box"
            maxLength={600}
            value={draft.caution}
            onChange={(event) => change({ caution: event.target.value })}
          />
        </Field>
      </section>
      {trouble !== null && (
        <Message verdict="bad" live="alert" title={trouble.title} kept="What you typed here.">
          {trouble.details.length > 0 && (
            <ul className="list-disc pl-6">
              {trouble.details.map((detail) => (
                <li key={detail}>{detail}</li>
              ))}
            </ul>
          )}
        </Message>
      )}
      <div className="build-save">
        <Segmented
          label="State"
          value={draft.state}
          options={[
            { value: 'draft', text: 'Draft' },
            { value: 'open', text: 'Open' },
            ...(exercise === null ? [] : [{ value: 'retracted' as const, text: 'Retracted' }]),
          ]}
          onChange={(state) => change({ state })}
        />
        <Button kind="main" busy={busy} onClick={save}>
          Save
        </Button>
        {exercise !== null && (
          <Button icon="bin" onClick={() => setAsking(true)}>
            Delete
          </Button>
        )}
      </div>
      <Dialog
        open={asking}
        title="Delete this exercise?"
        onClose={() => setAsking(false)}
        actions={
          <>
            <Button onClick={() => setAsking(false)}>Keep it</Button>
            <Button kind="bad" onClick={remove}>
              Delete the exercise
            </Button>
          </>
        }
      >
        <p>
          “{draft.title}” goes from its sets{attempts > 0 ? `, with ${attempts} answers` : ''}. It can be
          brought back for 30 days. To keep the answers in sight, retract it instead.
        </p>
      </Dialog>
    </div>
  );
}

const stepped = ({ reasoning }: ExerciseDraft, at: number, over: Partial<{ title: string; text: string }>) =>
  [0, 1, 2].map((place) => ({ title: '', text: '', ...reasoning[place], ...(place === at ? over : {}) }));

const FIELD_WORDS: readonly (readonly [RegExp, string])[] = [
  [/^title/, 'Title:'],
  [/question/, 'What to do:'],
  [/asks\.cause\.answer/, 'Which cause is right:'],
  [/asks\.cause/, 'Causes to choose from:'],
  [/asks\.value\.label/, 'What to measure:'],
  [/asks\.value\.tolerance/, 'Tolerance:'],
  [/asks\.value/, 'Value:'],
  [/asks\.text/, 'What to write about:'],
  [/asks\.circuit/, 'Circuit:'],
  [/answer\.evidence/, 'Where it shows:'],
  [/answer\.sentence/, 'The answer in one sentence:'],
  [/answer\.reasoning\.\d+\.title/, 'A step of the reasoning:'],
  [/answer\.reasoning/, 'What a step shows:'],
  [/signals/, 'Signals shown:'],
];

const wordsOf = (path: string) => FIELD_WORDS.find(([pattern]) => pattern.test(path))?.[1] ?? `${path}:`;
