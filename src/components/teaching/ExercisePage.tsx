import './exercise.css';
import { useCallback, useEffect, useMemo, useState } from 'react';
import useSWR from 'swr';
import type { WheelJson } from '../../contract/areas/captures.ts';
import type { ExerciseJson } from '../../contract/areas/teaching.ts';
import { ApiFailure, api, fetcher, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Message } from '../base/Message.tsx';
import { Skeleton } from '../base/Skeleton.tsx';
import { usePlotModel } from '../capture/usePlotModel.ts';
import { openingView } from '../capture/view-of.ts';
import { createStore } from '../plot/store.ts';
import type { PlotCapture, View } from '../plot/types.ts';
import { useStore } from '../plot/useStore.ts';
import { AnswerPanel } from './AnswerPanel.tsx';
import { AnswerParts } from './AnswerParts.tsx';
import { attemptBody, type Draft, emptyDraft, type Missing, missingOf } from './draft.ts';
import { ExerciseHead } from './ExerciseHead.tsx';
import { ExerciseTrace } from './ExerciseTrace.tsx';

const NO_SPAN = createStore<View | null>(null);
const once = { revalidateOnFocus: false, shouldRetryOnError: false };

/** One exercise: the trace under neutral names, the answer form, and what opens after committing. */
export function ExercisePage({ id }: { id: string }) {
  const loaded = useSWR(`/exercises/${id}`, fetcher<ExerciseJson>, once);
  const { data: exercise, error, mutate } = loaded;
  const [draft, setDraft] = useState<Draft | null>(null);
  const [missing, setMissing] = useState<Missing>({});
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  /** An instructor looks at the answer without committing. */
  const [looking, setLooking] = useState(false);

  const open = exercise !== undefined && exercise.answer !== null && (exercise.attempt !== null || looking);
  const captureId = open ? (exercise.answer?.captureId ?? null) : null;
  const wheel = useSWR(captureId === null ? null : `/captures/${captureId}/wheel`, fetcher<WheelJson>, once);
  const capture = useMemo<PlotCapture | null>(() => plotCapture(exercise, open), [exercise, open]);
  const reload = useCallback(() => void mutate(), [mutate]);
  const model = usePlotModel({
    capture,
    address: `/api/v1/exercises/${id}/window`,
    version: exercise?.trace?.samplesVersion ?? null,
    opening: () => openingView(null, matchMedia('(width < 40rem)').matches),
    onRefused: reload,
  });
  const stretch = useStore(model?.span ?? NO_SPAN);
  const evidence = exercise?.answer?.evidence;
  useEffect(() => {
    // What was committed stays in sight as a mark; the tool itself is put away.
    if (open) model?.span.set(null);
  }, [open, model]);

  if (error !== undefined && exercise === undefined)
    return (
      <div className="p-(--margin)">
        <Message
          verdict="bad"
          live="alert"
          title="The exercise could not be loaded"
          happened={sentenceOf(error)}
          actions={<Button onClick={reload}>Try again</Button>}
        />
      </div>
    );
  if (exercise === undefined) return <Skeleton label="Loading the exercise" />;

  const current = draft ?? emptyDraft(exercise);
  const commit = async () => {
    const lacks = missingOf(exercise, current, stretch);
    setMissing(lacks);
    setTrouble(null);
    if (Object.keys(lacks).length > 0) return;
    setBusy(true);
    try {
      const { data } = await api<ExerciseJson>(`/exercises/${id}/attempts`, {
        method: 'POST',
        body: attemptBody(exercise, current, stretch),
      });
      await mutate(data, { revalidate: false });
      scrollTo({ top: 0 });
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      if (thrown instanceof ApiFailure) {
        setMissing(Object.fromEntries(thrown.details.map(({ path, message }) => [path, message])));
        // Committed already, or changed meanwhile: what is true now is shown.
        if (thrown.status === 409) reload();
      }
    } finally {
      setBusy(false);
    }
  };
  const blind = !open && !exercise.scales;
  const staff = exercise.staff !== null;
  return (
    <div className={`exercise${blind ? ' exercise-blind' : ''}${open ? ' exercise-open' : ''}`}>
      <ExerciseHead exercise={exercise} open={open} />
      {!open && <p className="exercise-question">{exercise.question}</p>}
      {open && exercise.answer !== null && <p className="exercise-question">{exercise.answer.sentence}</p>}
      <div className="exercise-body">
        <div className="exercise-main">
          {exercise.trace === null && (
            <div className="p-(--margin)">
              <Message
                verdict="watch"
                title="The trace is no longer there"
                happened="The capture behind this exercise was deleted."
                kept="What was answered."
                todo="Ask the person who set it."
              />
            </div>
          )}
          {model !== null && (
            <ExerciseTrace
              model={model}
              exercise={exercise}
              open={open}
              evidence={evidence ?? []}
              wheel={wheel.data ?? null}
              error={missing.stretch}
            />
          )}
        </div>
        <div className="exercise-side">
          {staff && exercise.attempt === null && (
            <div className="exercise-staff">
              <p className="text-soft">
                {exercise.state === 'open'
                  ? 'This is what learners see. You may open the answer without committing.'
                  : exercise.state === 'draft'
                    ? 'A draft: learners do not see it yet.'
                    : 'Retracted: it takes no more answers.'}
              </p>
              <div className="flex flex-wrap gap-2">
                <Button small aria-pressed={looking} onClick={() => setLooking(!looking)}>
                  {looking ? 'Hide the answer' : 'Show the answer'}
                </Button>
                <a className="button button-small" href={`/teaching/exercises/${id}/edit`}>
                  Change
                </a>
              </div>
            </div>
          )}
          {open && <AnswerPanel exercise={exercise} />}
          {!open && exercise.trace !== null && (
            <>
              <AnswerParts
                exercise={exercise}
                draft={current}
                missing={missing}
                first={exercise.asks.stretch ? 2 : 1}
                onChange={(change) => setDraft({ ...current, ...change })}
              />
              <div className="exercise-commit">
                {trouble !== null && (
                  <Message verdict="bad" live="alert" title="Nothing was counted yet" happened={trouble} />
                )}
                {Object.keys(missing).length > 0 && trouble === null && (
                  <p className="field-error" role="alert">
                    {Object.values(missing).join('. ')}.
                  </p>
                )}
                <Button kind="main" className="button-block" busy={busy} onClick={commit}>
                  Commit my answer
                </Button>
                <p className="text-soft">Once only. Then names, numbers, answer and reasoning open.</p>
              </div>
            </>
          )}
        </div>
      </div>
    </div>
  );
}

/** The trace as drawn: neutral and in ink, or under its own names and colours. */
function plotCapture(exercise: ExerciseJson | undefined, open: boolean): PlotCapture | null {
  if (exercise === undefined || exercise.trace === null) return null;
  const { trace, answer } = exercise;
  const signals =
    open && answer !== null ? answer.signals : trace.signals.map((each) => ({ ...each, plain: true }));
  return { ...trace, signals };
}
