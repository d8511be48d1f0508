import { Evidence } from './Evidence.tsx';
import { type Lane, stackHeight } from './lanes.ts';
import { MarkLines } from './Marks.tsx';
import type { PlacedMark } from './mark-layout.ts';
import type { PlotModel } from './model.ts';
import { SpanLines } from './Span.tsx';
import type { PlotEvidence, PlotWheel, View } from './types.ts';
import { shareOfTime } from './view.ts';

interface OverlayProps {
  model: PlotModel;
  lanes: readonly Lane[];
  wheel: PlotWheel | null;
  placed: readonly PlacedMark[];
  evidence: PlotEvidence | null;
  view: View;
  width: number;
}

/** The layer above the traces: reference marks, evidence, marks, span. It never draws a trace. */
export function Overlay({ model, lanes, wheel, placed, evidence, view, width }: OverlayProps) {
  const height = stackHeight(lanes);
  const inView = wheel?.marksS.filter((mark) => mark >= view.from && mark <= view.to) ?? [];
  return (
    <svg className="plot-overlay" width={width} height={height} aria-hidden="true">
      {inView.length < width / 8 && (
        <path
          className="plot-chain"
          d={inView.map((mark) => `M${(shareOfTime(view, mark) * width).toFixed(1)} 0v${height}`).join('')}
        />
      )}
      {evidence !== null && <Evidence evidence={evidence} lanes={lanes} view={view} width={width} />}
      <MarkLines placed={placed} width={width} />
      <SpanLines model={model} lanes={lanes} width={width} />
    </svg>
  );
}
