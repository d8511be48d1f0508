import './capture.css';
import './lanes.css';
import { lazy, Suspense, useCallback, useEffect, useMemo, useState } from 'react';
import type { MarkJson } from '../../contract/areas/marks.ts';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Message } from '../base/Message.tsx';
import { UndoBar } from '../base/UndoBar.tsx';
import { type LaneSetup, PLAIN_SETUP } from '../plot/lane-setup.ts';
import { type MarkPlace, Plot } from '../plot/Plot.tsx';
import type { ScaleKind } from '../plot/ScaleBar.tsx';
import { nearestValue } from '../plot/span-statistics.ts';
import type { PlotEvidence } from '../plot/types.ts';
import { shownInAddress } from './address.ts';
import { CaptureActions } from './CaptureActions.tsx';
import { CaptureHead } from './CaptureHead.tsx';
import { CaptureGone, CaptureSkeleton, CaptureState } from './CaptureState.tsx';
import { FootLine } from './FootLine.tsx';
import { LaneGrips } from './LaneGrips.tsx';
import type { MarkDraft } from './MarkDialog.tsx';
import { MarkHandles } from './MarkHandles.tsx';
import { MarksList } from './MarksList.tsx';
import { type Chosen, Numbers } from './Numbers.tsx';
import { Sheet } from './Sheet.tsx';
import { stepsOf } from './steps-of.ts';
import { ThumbTools, TraceTools } from './TraceTools.tsx';
import { isPending, useCapture, useFindings, useMarks } from './use-capture.ts';
import { useAddress } from './useAddress.ts';
import { usePlotModel } from './usePlotModel.ts';
import { bringIntoView, openingView } from './view-of.ts';

const MarkDialog = lazy(() => import('./MarkDialog.tsx').then((m) => ({ default: m.MarkDialog })));

const LanesDialog = lazy(() => import('./LanesDialog.tsx').then((m) => ({ default: m.LanesDialog })));

/** Where a mark is put by hand. */
type MarkPlaceChange = Partial<Pick<MarkJson, 'from' | 'to' | 'value'>>;

const NO_MARKS: readonly MarkJson[] = [];
const NARROW = '(width < 40rem)';

/** The capture's first tab: the trace, its numbers and marks. Knows only the id; everything else it asks for. */
export function CaptureTrace({ id }: { id: string }) {
  const loaded = useCapture(id);
  const capture = loaded.data?.data;
  const { measurements, wheel: wheelAnswer } = useFindings(id, capture);
  const there = capture !== undefined && capture.samples > 0 && capture.status !== 'failed';
  const marksAnswer = useMarks(id, there);
  const marks = marksAnswer.data?.items ?? NO_MARKS;
  const wheel = wheelAnswer.data ?? null;
  const answered = (answer: { data?: unknown; error?: unknown }) =>
    answer.data !== undefined || answer.error !== undefined;
  // A turn of the wheel is where a capture opens; without a wheel it is a firing, which the numbers tell.
  const opens =
    capture?.status !== 'ready' || wheel !== null || (answered(wheelAnswer) && answered(measurements));
  const all = useMemo(() => stepsOf(wheel, measurements.data), [wheel, measurements.data]);

  const [setup, setSetup] = useState<LaneSetup>(PLAIN_SETUP);
  const [lanesOpen, setLanesOpen] = useState(false);
  const [scale, setScale] = useState<ScaleKind>('degrees');
  const [chosen, setChosen] = useState<Chosen | null>(null);
  const [step, setStep] = useState(0);
  const [chosenMark, setChosenMark] = useState<string | null>(null);
  const [draft, setDraft] = useState<MarkDraft | null>(null);
  const [deleted, setDeleted] = useState<MarkJson | null>(null);
  const [moved, setMoved] = useState<{ mark: MarkJson; before: MarkPlaceChange } | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);

  const model = usePlotModel({
    capture: there && opens ? capture : null,
    address: `/api/v1/captures/${id}/window`,
    version: capture?.samplesVersion ?? null,
    opening: () =>
      shownInAddress(location.search, []).view ?? openingView(all[0] ?? null, matchMedia(NARROW).matches),
    onRefused: () => void loaded.mutate(),
  });
  useAddress(model, setup);
  useEffect(() => {
    if (model === null) return;
    const signals = model.capture.signals.map(({ index }) => index);
    const { span, cursorS, setup: wanted } = shownInAddress(location.search, signals);
    model.span.set(span);
    model.cursorS.set(cursorS);
    setSetup(wanted);
  }, [model]);
  useEffect(() => {
    if (model !== null && !all.some(({ word }) => word === model.steps.get()?.word))
      model.steps.set(all[0] ?? null);
  }, [model, all]);

  const evidence = useMemo<PlotEvidence | null>(
    () =>
      chosen === null
        ? null
        : { signal: chosen.signal, label: chosen.text || 'shaded', stretches: chosen.evidence },
    [chosen],
  );
  const showStep = (of: Chosen, place: number) => {
    setStep(place);
    const stretch = of.evidence[place];
    if (model !== null && stretch !== undefined) bringIntoView(model, stretch);
  };
  const choose = (next: Chosen | null) => {
    setChosen(next);
    if (next !== null) showStep(next, 0);
  };
  const chooseMark = (mark: MarkJson) => {
    setChosenMark(mark.id);
    if (model !== null && mark.kind !== 'level')
      bringIntoView(model, { from: mark.from, to: mark.to ?? mark.from });
  };
  const place = useCallback((at: MarkPlace) => setDraft({ ...at, id: null, etag: null, text: '' }), []);
  const remove = async (mark: MarkJson) => {
    setTrouble(null);
    try {
      await api(`/marks/${mark.id}`, { method: 'DELETE', etag: mark.etag });
      setDeleted(mark);
    } catch (thrown) {
      setTrouble(`The mark is still there. ${sentenceOf(thrown)}`);
    }
    await marksAnswer.mutate();
  };
  /** A point keeps to the trace: its value is that of the sample there, or none where samples are too dense to tell. */
  const valueAt = (mark: MarkJson, to: MarkPlaceChange): MarkPlaceChange => {
    const signal = model?.capture.signals.find(({ index }) => index === mark.signal);
    if (mark.kind !== 'point' || to.value !== undefined || model === null || signal === undefined) return {};
    const window = model.loader.best(model.view.get(), model.devicePixels());
    return { value: window === null ? null : nearestValue(window, signal, to.from ?? mark.from) };
  };
  const held = marks.find(({ id: markId }) => markId === chosenMark);
  /** Moved by hand; the one before can be had back. Somebody else's change is never overwritten: theirs is shown. */
  const moveMark = async (mark: MarkJson, to: MarkPlaceChange) => {
    setTrouble(null);
    setMoved(null);
    try {
      const body = { ...to, ...valueAt(mark, to) };
      const { data } = await api<MarkJson>(`/marks/${mark.id}`, {
        method: 'PATCH',
        etag: mark.etag,
        body,
      });
      setMoved({ mark: data, before: { from: mark.from, to: mark.to, value: mark.value } });
    } catch (thrown) {
      const stale = thrown instanceof ApiFailure && thrown.status === 412;
      setTrouble(
        stale
          ? `“${mark.text || 'The mark'}” was changed by somebody else meanwhile. It stands where they put it; move it again if need be.`
          : `The mark stands where it was. ${sentenceOf(thrown)}`,
      );
    }
    await marksAnswer.mutate();
  };
  const undo = async () => {
    if (deleted === null) return;
    setDeleted(null);
    await api(`/marks/${deleted.id}/restore`, { method: 'POST' }).catch((thrown) =>
      setTrouble(sentenceOf(thrown)),
    );
    await marksAnswer.mutate();
  };

  if (capture === undefined)
    return loaded.error === undefined ? <CaptureSkeleton /> : <CaptureGone error={loaded.error} />;
  return (
    <div className="capture">
      <CaptureHead
        capture={capture}
        tab="trace"
        hidden={setup.hidden}
        onToggle={(index) => setSetup((old) => ({ ...old, hidden: toggled(old.hidden, index) }))}
        actions={<CaptureActions capture={capture} onLanes={() => setLanesOpen(true)} />}
        tools={
          model && (
            <TraceTools
              model={model}
              wheel={wheel}
              scale={scale}
              onScale={setScale}
              all={all}
              onLanes={() => setLanesOpen(true)}
            />
          )
        }
      />
      {!there && <CaptureState capture={capture} onChange={() => void loaded.mutate()} />}
      {there && model === null && <CaptureSkeleton />}
      {model !== null && (
        <div className="capture-body">
          <div className="capture-trace">
            <Plot
              model={model}
              wheel={wheel}
              scale={wheel === null ? 'seconds' : scale}
              marks={marks}
              chosenMark={chosenMark}
              evidence={evidence}
              setup={setup}
              handles={
                held !== undefined && held.kind !== 'level' ? (
                  <MarkHandles
                    key={held.id}
                    model={model}
                    mark={held}
                    onMove={(mark, at) => void moveMark(mark, at)}
                  />
                ) : undefined
              }
              grips={(lanes) => <LaneGrips lanes={lanes} setup={setup} onSetup={setSetup} />}
              onPlace={place}
              onChooseMark={(markId) => {
                const mark = marks.find((each) => each.id === markId);
                if (mark !== undefined) chooseMark(mark);
              }}
            />
            <FootLine
              capture={capture}
              model={model}
              chosen={chosen}
              step={step}
              onStep={(next) => chosen !== null && showStep(chosen, next)}
            />
          </div>
          <Sheet label="Numbers and marks">
            {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
            {isPending(capture.status) && (
              <CaptureState capture={capture} onChange={() => void loaded.mutate()} />
            )}
            {measurements.data !== undefined && (
              <Numbers
                capture={capture}
                measurements={measurements.data}
                wheel={wheel}
                chosen={chosen?.id ?? null}
                onChoose={choose}
              />
            )}
            {measurements.error !== undefined && (
              <Message
                verdict="bad"
                live="alert"
                title="The numbers could not be loaded"
                happened={sentenceOf(measurements.error)}
              />
            )}
            <MarksList
              marks={marks}
              wheel={wheel}
              chosen={chosenMark}
              onChoose={chooseMark}
              onEdit={(mark) => setDraft(mark)}
              onDelete={remove}
              onMake={() => model.tool.set('mark')}
            />
          </Sheet>
          <ThumbTools model={model} />
        </div>
      )}
      {moved !== null && (
        <UndoBar
          text="Mark moved"
          onUndo={() => {
            void moveMark(moved.mark, moved.before).then(() => setMoved(null));
          }}
          onGone={() => setMoved(null)}
        />
      )}
      {deleted !== null && <UndoBar text="Mark deleted" onUndo={undo} onGone={() => setDeleted(null)} />}
      <Suspense fallback={null}>
        {lanesOpen && (
          <LanesDialog
            capture={capture}
            etag={loaded.data?.etag ?? null}
            setup={setup}
            onSetup={setSetup}
            onChanged={() => void loaded.mutate()}
            onClose={() => setLanesOpen(false)}
          />
        )}
        {draft !== null && (
          <MarkDialog
            key={draft.id ?? 'new'}
            capture={capture}
            draft={draft}
            onClose={() => setDraft(null)}
            onSaved={() => {
              setDraft(null);
              void marksAnswer.mutate();
            }}
            reload={async (markId) =>
              (await marksAnswer.mutate())?.items.find((mark) => mark.id === markId) ?? null
            }
          />
        )}
      </Suspense>
    </div>
  );
}

function toggled(set: ReadonlySet<number>, index: number): ReadonlySet<number> {
  const next = new Set(set);
  if (!next.delete(index)) next.add(index);
  return next;
}
