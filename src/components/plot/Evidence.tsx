import { useId } from 'react';
import { type Lane, stackHeight } from './lanes.ts';
import type { PlotEvidence, View } from './types.ts';
import { shareOfTime } from './view.ts';

/** More stretches than this in one view are too dense to hatch one by one. */
const MOST = 120;
/** A label leaves the line when the stretch is narrower than it (7 px a letter). */
const LETTER_PX = 7.2;

interface EvidenceProps {
  evidence: PlotEvidence;
  lanes: readonly Lane[];
  view: View;
  width: number;
}

/** The samples behind the chosen number: hatched at 45 degrees, with a dimension line that carries the number. */
export function Evidence({ evidence, lanes, view, width }: EvidenceProps) {
  const pattern = `hatch${useId().replace(/\W/g, '')}`;
  const lane = lanes.find((each) => each.signal.index === evidence.signal);
  const top = lane?.top ?? 0;
  const height = lane?.height ?? stackHeight(lanes);
  const inView = evidence.stretches
    .filter((stretch) => stretch.to >= view.from && stretch.from <= view.to)
    .slice(0, MOST)
    .map((stretch) => ({
      from: Math.max(shareOfTime(view, stretch.from) * width, -2),
      to: Math.min(shareOfTime(view, stretch.to) * width, width + 2),
      key: `${stretch.from} ${stretch.to}`,
    }));
  if (inView.length === 0) return null;
  const lineY = top + height - 20;
  const dense = inView.length > 12;
  return (
    <g className="plot-evidence">
      <defs>
        <pattern
          id={pattern}
          width="7"
          height="7"
          patternUnits="userSpaceOnUse"
          patternTransform="rotate(45)"
        >
          <path className={dense ? 'plot-hatch plot-hatch-pale' : 'plot-hatch'} d="M0 0V7" />
        </pattern>
      </defs>
      {inView.map(({ from, to, key }) => (
        <g key={key}>
          <rect x={from} y={top} width={Math.max(to - from, 1)} height={height} fill={`url(#${pattern})`} />
          <path className="plot-evidence-edge" d={`M${from} ${top}v${height}M${to} ${top}v${height}`} />
        </g>
      ))}
      {inView.length <= 4 &&
        inView.map(({ from, to, key }) => (
          <Dimension key={key} from={from} to={to} y={lineY} width={width} text={evidence.label} />
        ))}
    </g>
  );
}

/** A dimension line: slashes at its ends, the number on it or, when it does not fit, beside it. */
export function Dimension({
  from,
  to,
  y,
  width,
  text,
}: {
  from: number;
  to: number;
  y: number;
  width: number;
  text: string;
}) {
  const textWidth = text.length * LETTER_PX + 14;
  const fits = to - from > textWidth + 16;
  const left = Math.max(from, 0);
  const right = Math.min(to, width);
  const toRight = right + textWidth + 8 < width;
  const middle = fits ? (left + right) / 2 : toRight ? right + 8 + textWidth / 2 : left - 8 - textWidth / 2;
  const line = fits
    ? `M${from} ${y}H${middle - textWidth / 2}M${middle + textWidth / 2} ${y}H${to}`
    : `M${from} ${y}H${to}`;
  return (
    <g className="plot-dimension">
      <path d={`${line}M${from - 5} ${y + 5}l10-10M${to - 5} ${y + 5}l10-10`} />
      <rect
        className="plot-dimension-back"
        x={middle - textWidth / 2}
        y={y - 9}
        width={textWidth}
        height={18}
      />
      <text x={middle} y={y + 4} textAnchor="middle">
        {text}
      </text>
    </g>
  );
}
