import { Icon } from '../base/Icon.tsx';
import { Segmented } from '../base/Segmented.tsx';
import type { PlotModel } from '../plot/model.ts';
import { stepTurn, toggleSpan, turnInView } from '../plot/plot-keys.ts';
import type { ScaleKind } from '../plot/ScaleBar.tsx';
import type { PlotWheel } from '../plot/types.ts';
import { useStore } from '../plot/useStore.ts';
import { zoomAt } from '../plot/view.ts';
import { type Preset, presetOf, showPreset } from './view-of.ts';

interface TraceToolsProps {
  model: PlotModel;
  wheel: PlotWheel | null;
  scale: ScaleKind;
  onScale: (scale: ScaleKind) => void;
}

/** Beside the tabs on a desk: scale, set views, zoom, span, mark. */
export function TraceTools({ model, wheel, scale, onScale }: TraceToolsProps) {
  const view = useStore(model.view);
  const zoom = (factor: number) => model.show(zoomAt(view, (view.from + view.to) / 2, factor, model.bounds));
  const turns = wheel !== null && wheel.marksS.length > 1;
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
      <Segmented<Preset | 'between'>
        label="View"
        value={presetOf(view, model.bounds.whole, wheel) ?? 'between'}
        onChange={(preset) => preset !== 'between' && showPreset(preset, model, wheel)}
        options={[
          { value: 'whole', text: 'Whole' },
          ...(turns
            ? [
                { value: 'turn' as const, text: 'Turn' },
                { value: 'tooth' as const, text: 'Tooth' },
              ]
            : []),
        ]}
      />
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

/** On a phone: turn by turn, span and mark, in reach of the thumb. */
export function ThumbTools({ model, wheel }: { model: PlotModel; wheel: PlotWheel | null }) {
  useStore(model.view);
  const turn = turnInView(model, wheel);
  const turns = (wheel?.marksS.length ?? 1) - 1;
  return (
    <div className="thumb-tools">
      <button
        type="button"
        className="button button-icon"
        aria-label={turn === null ? 'Earlier' : 'Previous turn'}
        onClick={() => stepTurn(model, wheel, -1)}
      >
        <Icon name="left" small />
      </button>
      <p className="thumb-turn">
        {turn === null ? (
          'Move'
        ) : (
          <>
            <b>Turn {turn + 1}</b>
            <span>of {turns}</span>
          </>
        )}
      </p>
      <button
        type="button"
        className="button button-icon"
        aria-label={turn === null ? 'Later' : 'Next turn'}
        onClick={() => stepTurn(model, wheel, 1)}
      >
        <Icon name="right" small />
      </button>
      <SpanButton model={model} />
      <MarkButton model={model} main />
    </div>
  );
}
