import type { CaptureJson } from '../../contract/areas/captures.ts';
import { Icon } from '../base/Icon.tsx';
import { grouped } from '../base/numbers.ts';
import { digitsFor, fixed } from '../plot/format.ts';
import type { PlotModel } from '../plot/model.ts';
import type { View } from '../plot/types.ts';
import { useStore } from '../plot/useStore.ts';
import type { Chosen } from './Numbers.tsx';
import { samplesIn } from './view-of.ts';

interface FootLineProps {
  capture: CaptureJson;
  model: PlotModel;
  chosen: Chosen | null;
  step: number;
  onStep: (step: number) => void;
}

/** Under the plot: which samples are shaded and which are in view, with their counts. */
export function FootLine({ capture, model, chosen, step, onStep }: FootLineProps) {
  const view = useStore(model.view);
  const span = view.to - view.from;
  const stretch = chosen?.evidence[step];
  const count = chosen?.evidence.length ?? 0;
  return (
    <footer className="foot-line">
      {chosen !== null && stretch !== undefined && (
        <p role="status">
          <b>
            {chosen.label} {chosen.text}
          </b>{' '}
          <span className="text-soft">Shaded</span>{' '}
          <span className="figures">
            {stretchText(capture, stretch, Math.min(span, stretch.to - stretch.from || span))}
          </span>
        </p>
      )}
      {count > 1 && (
        <span className="foot-steps">
          <button
            type="button"
            className="button button-quiet button-icon"
            aria-label="Samples before"
            disabled={step === 0}
            onClick={() => onStep(step - 1)}
          >
            <Icon name="left" small />
          </button>
          <span className="figures">
            {step + 1} of {count}
          </span>
          <button
            type="button"
            className="button button-quiet button-icon"
            aria-label="Next samples"
            disabled={step >= count - 1}
            onClick={() => onStep(step + 1)}
          >
            <Icon name="right" small />
          </button>
        </span>
      )}
      <p className="foot-view">
        <span className="text-soft">View</span>{' '}
        <span className="figures">
          {stretchText(capture, view, span, false)}
          {capture.axis === 'even' && ` of ${grouped(capture.samples)}`}
        </span>
      </p>
    </footer>
  );
}

function stretchText(capture: CaptureJson, stretch: View, span: number, word = true): string {
  const digits = Math.max(digitsFor(span / 500), 3);
  const n = samplesIn(capture, stretch);
  const range =
    stretch.from === stretch.to
      ? `${fixed(stretch.from, digits)} s`
      : `${fixed(stretch.from, digits)} to ${fixed(stretch.to, digits)} s`;
  if (n === null) return range;
  return `${range}, ${grouped(n)}${word ? (n === 1 ? ' sample' : ' samples') : ''}`;
}
