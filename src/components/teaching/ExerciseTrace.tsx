import { useMemo, useState } from 'react';
import type { ExerciseAnswer, ExerciseJson } from '../../contract/areas/teaching.ts';
import { Button } from '../base/Button.tsx';
import { Icon } from '../base/Icon.tsx';
import { VerdictShape } from '../base/Verdict.tsx';
import type { PlotModel } from '../plot/model.ts';
import { Plot } from '../plot/Plot.tsx';
import { toggleSpan } from '../plot/plot-keys.ts';
import type { PlotEvidence, PlotMark, PlotWheel } from '../plot/types.ts';
import { useStore } from '../plot/useStore.ts';
import { viewAround, zoomAt } from '../plot/view.ts';

interface ExerciseTraceProps {
  model: PlotModel;
  exercise: ExerciseJson;
  open: boolean;
  evidence: ExerciseAnswer['evidence'];
  wheel: PlotWheel | null;
  error: string | undefined;
}

/** The trace with its tools: laying a stretch before, choosing what of the evidence is hatched after. */
export function ExerciseTrace({ model, exercise, open, evidence, wheel, error }: ExerciseTraceProps) {
  const span = useStore(model.span);
  const tool = useStore(model.tool);
  const groups = useMemo(() => groupsOf(evidence), [evidence]);
  const [chosen, setChosen] = useState(0);
  const group = groups[chosen];
  const own = exercise.attempt?.answers.stretch;
  const marks = useMemo<PlotMark[]>(
    () =>
      open && own !== undefined
        ? [
            {
              id: 'own',
              kind: 'range',
              signal: null,
              from: own.from,
              to: own.to,
              value: null,
              text: 'your stretch',
              author: '',
            },
          ]
        : [],
    [open, own],
  );
  const zoom = (factor: number) => {
    const { from, to } = model.view.get();
    model.show(zoomAt(model.view.get(), (from + to) / 2, factor, model.bounds));
  };
  const laying = !open && (exercise.asks.stretch || exercise.scales);
  /** Puts a stretch in the middle of the view to begin with; then a drag on the trace lays another. */
  const lay = () => {
    if (span === null) toggleSpan(model);
    model.tool.set(tool === 'span' ? 'move' : 'span');
  };
  return (
    <>
      <div className="exercise-tools">
        {laying && exercise.asks.stretch && (
          <h2>
            <span className="balloon" aria-hidden="true">
              1
            </span>
            Lay a stretch
          </h2>
        )}
        {laying && (
          <Button small icon="span" aria-pressed={tool === 'span'} onClick={lay}>
            {exercise.asks.stretch ? 'Stretch' : 'Span'}
          </Button>
        )}
        {laying && span !== null && (
          <Button
            small
            icon="undo"
            className="exercise-clear"
            aria-label="Clear"
            onClick={() => {
              model.span.set(null);
              model.tool.set('move');
            }}
          >
            <span>Clear</span>
          </Button>
        )}
        {open &&
          groups.map(({ label }, at) => (
            <Button
              key={label}
              small
              aria-pressed={at === chosen}
              onClick={() => {
                setChosen(at);
                const first = groups[at]?.stretches[0];
                if (first !== undefined) model.show(viewAround(first, 4, model.bounds));
              }}
            >
              {label}
            </Button>
          ))}
        <span className="exercise-zoom">
          <Button small className="button-icon" aria-label="Zoom out" onClick={() => zoom(1 / 0.6)}>
            <Icon name="minus" small />
          </Button>
          <Button small className="button-icon" aria-label="Zoom in" onClick={() => zoom(0.6)}>
            <Icon name="plus" small />
          </Button>
          <Button small onClick={() => model.show(model.bounds.whole)}>
            Whole
          </Button>
        </span>
      </div>
      {error !== undefined && (
        <p className="field-error px-(--margin)" role="alert">
          <VerdictShape verdict="bad" />
          <span>{error}</span>
        </p>
      )}
      <div className="exercise-plot">
        <Plot
          model={model}
          wheel={open ? wheel : null}
          scale={open && wheel !== null ? 'degrees' : 'seconds'}
          marks={marks}
          // Several places stand close to each other on a phone: the button above carries their name.
          evidence={
            open && group !== undefined
              ? { ...group, label: group.stretches.length > 1 ? '' : group.label }
              : null
          }
        />
      </div>
      <p className="exercise-foot">
        {open
          ? 'Names, numbers and colours are open now.'
          : exercise.scales
            ? 'Names and colours are held back until you commit. A span measures what you lay it on.'
            : 'Names, numbers and colours are held back until you commit.'}
      </p>
    </>
  );
}

/** Stretches of one signal under one label are shown together. */
function groupsOf(evidence: ExerciseAnswer['evidence']): PlotEvidence[] {
  const groups = new Map<
    string,
    { signal: number | null; label: string; stretches: { from: number; to: number }[] }
  >();
  for (const { signal, label, from, to } of evidence) {
    const key = `${signal} ${label}`;
    const group = groups.get(key) ?? { signal, label: label === '' ? 'The answer' : label, stretches: [] };
    group.stretches.push({ from, to });
    groups.set(key, group);
  }
  return [...groups.values()];
}
