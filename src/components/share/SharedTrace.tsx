import './share.css';
import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Message } from '../base/Message.tsx';
import { timeText } from '../base/numbers.ts';
import { stepsOf } from '../capture/steps-of.ts';
import { usePlotModel } from '../capture/usePlotModel.ts';
import { bringIntoView, openingView } from '../capture/view-of.ts';
import { whereOf } from '../capture/where-of.ts';
import { type MarkPlace, Plot } from '../plot/Plot.tsx';
import { createStore } from '../plot/store.ts';
import type { PlotMark } from '../plot/types.ts';
import { useStore } from '../plot/useStore.ts';
import type { Tool } from '../plot/view-model.ts';
import { AnswerForm } from './AnswerForm.tsx';
import { FewNumbers } from './FewNumbers.tsx';
import { useShared } from './useShared.ts';

const MOVING = createStore<Tool>('move');

/** What a colleague opens on a phone, without an account: the trace first, then marks, question, numbers, answers. */
export function SharedTrace({ secret }: { secret: string }) {
  const { shared, measurements, asked, error, reload } = useShared(secret);
  const [place, setPlace] = useState<MarkPlace | null>(null);
  const [chosenMark, setChosenMark] = useState<string | null>(null);
  const seen = useRef(false);
  const plot = useRef<HTMLDivElement>(null);
  const wheel = shared?.wheel ?? null;
  const steps = useMemo(() => stepsOf(wheel, measurements ?? undefined)[0] ?? null, [wheel, measurements]);
  const drawable = shared !== null && shared.capture.samples > 0;

  const model = usePlotModel({
    capture: drawable && (wheel !== null || asked) ? shared.capture : null,
    address: `/api/v1/shared/${secret}/window`,
    version: shared?.capture.samplesVersion ?? null,
    opening: () => {
      const view = openingView(steps, matchMedia('(width < 40rem)').matches);
      const mark = shared?.marks[0];
      if (view === null || mark === undefined || (mark.from >= view.from && mark.from <= view.to))
        return view;
      const half = (view.to - view.from) / 2;
      return { from: mark.from - half, to: mark.from + half };
    },
    onRefused: reload,
  });
  useEffect(() => model?.steps.set(steps), [model, steps]);
  const tool = useStore(model?.tool ?? MOVING);

  /** "Seen" counts once the trace stands, not when the address was asked for. */
  const drawn = useCallback(() => {
    if (seen.current) return;
    seen.current = true;
    void api(`/shared/${secret}/seen`, { method: 'POST' }).catch(() => {});
  }, [secret]);
  const marks = useMemo<PlotMark[]>(() => {
    const there = shared?.marks ?? [];
    return place === null ? [...there] : [...there, { ...place, id: 'mine', text: 'your mark', author: '' }];
  }, [shared, place]);
  const goTo = (mark: PlotMark) => {
    setChosenMark(mark.id);
    if (model !== null && mark.kind !== 'level')
      bringIntoView(model, { from: mark.from, to: mark.to ?? mark.from });
  };

  if (error !== null && shared === null) return <SharedTrouble error={error} onAgain={reload} />;
  if (shared === null) return <SharedSkeleton />;
  return (
    <>
      <div className="share-title">
        <h1>{shared.capture.title}</h1>
      </div>
      {!drawable && (
        <Message
          verdict="info"
          title="The trace is not there yet"
          happened="The capture is still being read."
          todo="Open the link again in a moment."
        />
      )}
      {drawable && (
        <div ref={plot} className="share-plot">
          {model !== null && (
            <Plot
              model={model}
              wheel={wheel}
              scale={wheel === null ? 'seconds' : 'degrees'}
              marks={marks}
              chosenMark={chosenMark}
              onPlace={setPlace}
              onChooseMark={setChosenMark}
              onDrawn={drawn}
            />
          )}
        </div>
      )}
      <div className="share-rest">
        {shared.marks.length > 0 && (
          <ol className="share-marks" aria-label="Marks">
            {shared.marks.map((mark, number) => (
              <li key={mark.id}>
                <button type="button" onClick={() => goTo(mark)}>
                  <span className="balloon">{number + 1}</span>
                  <span>
                    {mark.text || 'No text'} <span className="text-soft">{whereOf(mark, wheel)}</span>
                  </span>
                </button>
              </li>
            ))}
          </ol>
        )}
        {shared.question !== '' && (
          <section className="share-question">
            <p className="text-soft">{shared.sharedBy} asks</p>
            <h2>{shared.question}</h2>
          </section>
        )}
        {measurements !== null && <FewNumbers measurements={measurements} />}
        {shared.answers.length > 0 && (
          <ul className="share-replies" aria-label="Answers">
            {shared.answers.map((answer) => (
              <li key={answer.id}>
                <p>
                  <b>{answer.name}</b> <span className="text-soft">{timeText(answer.createdAt)}</span>
                </p>
                <p>{answer.text}</p>
              </li>
            ))}
          </ul>
        )}
      </div>
      {shared.mayAnswer && model !== null && (
        <AnswerForm
          secret={secret}
          place={place}
          placeWords={place === null ? '' : whereOf(place, wheel)}
          marking={tool === 'mark'}
          onMark={() => {
            model.tool.set(tool === 'mark' ? 'move' : 'mark');
            plot.current?.scrollIntoView({ block: 'nearest' });
          }}
          onForgetPlace={() => setPlace(null)}
          onSent={() => {
            setPlace(null);
            reload();
          }}
        />
      )}
    </>
  );
}

function SharedTrouble({ error, onAgain }: { error: unknown; onAgain: () => void }) {
  const ended = error instanceof ApiFailure && (error.status === 410 || error.status === 404);
  return (
    <div className="share-rest">
      <Message
        verdict={ended ? 'info' : 'bad'}
        live="alert"
        title={ended ? 'This link no longer opens' : 'The trace could not be loaded'}
        happened={sentenceOf(error)}
        actions={
          ended ? undefined : (
            <button type="button" className="button" onClick={onAgain}>
              Try again
            </button>
          )
        }
      />
    </div>
  );
}

/** The shape that is coming. */
export function SharedSkeleton() {
  return (
    <div className="share-skeleton" role="status">
      <span className="sr-only">Loading the trace</span>
      <div className="skeleton" aria-hidden="true" />
      <div className="skeleton" aria-hidden="true" />
    </div>
  );
}
