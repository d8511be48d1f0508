import { Icon } from '../base/Icon.tsx';
import { Segmented } from '../base/Segmented.tsx';
import type { PlotModel } from '../plot/model.ts';
import { toggleSpan } from '../plot/plot-keys.ts';
import type { ScaleKind } from '../plot/ScaleBar.tsx';
import { type Steps, stepBy, stepInView } from '../plot/steps.ts';
import type { PlotWheel } from '../plot/types.ts';
import { useStore } from '../plot/useStore.ts';
import { zoomAt } from '../plot/view.ts';
import { presetOf, showPreset } from './view-of.ts';

interface TraceToolsProps {
  model: PlotModel;
  wheel: PlotWheel | null;
  scale: ScaleKind;
  onScale: (scale: ScaleKind) => void;
  /** Everything that repeats here; the model goes through one of them. */
  all: readonly Steps[];
  onLanes: () => void;
}

/** Beside the tabs on a desk: scale, set views, zoom, span, mark. */
export function TraceTools({ model, wheel, scale, onScale, all, onLanes }: TraceToolsProps) {
  const view = useStore(model.view);
  const zoom = (factor: number) => model.show(zoomAt(view, (view.from + view.to) / 2, factor, model.bounds));
  const steps = useStore(model.steps);
  const can = useStore(model.history.can);
  const teeth = steps?.word === 'Turn' && wheel !== null ? wheel.teethPerTurn : null;
  const preset = presetOf(view, model.bounds.whole, steps, teeth);
  const choose = (value: string) => {
    const wanted = all.find(({ word }) => word === value);
    if (wanted !== undefined) model.steps.set(wanted);
    const turning = value === 'tooth' ? all.find(({ word }) => word === 'Turn') : undefined;
    if (turning !== undefined) model.steps.set(turning);
    showPreset(
      wanted !== undefined ? 'step' : value === 'tooth' ? 'tooth' : 'whole',
      model,
      wheel?.teethPerTurn ?? null,
    );
  };
  return (
    <div className="trace-tools">
      {wheel !== null && (
        <Segmented<ScaleKind>
          label="Scale"
          value={scale}
          onChange={onScale}
          options={[
            { value: 'seconds', text: 'Seconds' },
            { value: 'degrees', text: 'Degrees' },
          ]}
        />
      )}
      <Segmented
        label="View"
        value={preset === 'step' ? (steps?.word ?? '') : (preset ?? 'between')}
        onChange={choose}
        options={[
          { value: 'whole', text: 'Whole' },
          ...all.map(({ word }) => ({ value: word as string, text: word as string })),
          ...(all[0]?.word === 'Turn' ? [{ value: 'tooth', text: 'Tooth' }] : []),
        ]}
      />
      <button
        type="button"
        className="button button-small button-icon"
        aria-label="Back to the view before"
        disabled={!can.back}
        onClick={model.history.back}
      >
        <Icon name="undo" small />
      </button>
      <button
        type="button"
        className="button button-small button-icon"
        aria-label="Zoom out"
        onClick={() => zoom(1 / 0.6)}
      >
        <Icon name="minus" small />
      </button>
      <button
        type="button"
        className="button button-small button-icon"
        aria-label="Zoom in"
        onClick={() => zoom(0.6)}
      >
        <Icon name="plus" small />
      </button>
      <button type="button" className="button button-small" onClick={onLanes}>
        <Icon name="lanes" small />
        Lanes
      </button>
      <SpanButton model={model} />
      <MarkButton model={model} />
    </div>
  );
}

export function SpanButton({ model }: { model: PlotModel }) {
  const span = useStore(model.span);
  return (
    <button
      type="button"
      className="button button-small"
      aria-pressed={span !== null}
      onClick={() => toggleSpan(model)}
    >
      <Icon name="span" small />
      Span
    </button>
  );
}

export function MarkButton({ model, main = false }: { model: PlotModel; main?: boolean }) {
  const tool = useStore(model.tool);
  return (
    <button
      type="button"
      className={main ? 'button button-main' : 'button button-small'}
      aria-pressed={tool === 'mark'}
      onClick={() => model.tool.set(tool === 'mark' ? 'move' : 'mark')}
    >
      <Icon name="pin" small />
      Mark
    </button>
  );
}

/** On a phone: turn by turn or firing by firing, span and mark, in reach of the thumb. */
export function ThumbTools({ model }: { model: PlotModel }) {
  useStore(model.view);
  const steps = useStore(model.steps);
  const place = stepInView(model);
  const word = steps?.word.toLowerCase();
  return (
    <div className="thumb-tools">
      <button
        type="button"
        className="button button-icon"
        aria-label={place === null ? 'Earlier' : `Previous ${word}`}
        onClick={() => stepBy(model, -1)}
      >
        <Icon name="left" small />
      </button>
      <p className="thumb-turn">
        {steps === null || place === null ? (
          'Move'
        ) : (
          <>
            <b>
              {steps.word} {place + 1}
            </b>
            <span>of {steps.stretches.length}</span>
          </>
        )}
      </p>
      <button
        type="button"
        className="button button-icon"
        aria-label={place === null ? 'Later' : `Next ${word}`}
        onClick={() => stepBy(model, 1)}
      >
        <Icon name="right" small />
      </button>
      <SpanButton model={model} />
      <MarkButton model={model} main />
    </div>
  );
}
