import type { PlacedMark } from './mark-layout.ts';

/** Leaders, frames and level lines of marks; their balloons are buttons above (Balloons). */
export function MarkLines({ placed, width }: { placed: readonly PlacedMark[]; width: number }) {
  return (
    <g className="plot-marks">
      {placed.map(({ mark, balloon, point, range, level }) => (
        <g key={mark.id}>
          {range !== null && (
            <rect
              className="plot-mark-frame"
              x={range.from}
              y={range.top + 3}
              width={Math.max(range.to - range.from, 2)}
              height={range.height - 6}
            />
          )}
          {level !== null && <path className="plot-mark-level" d={`M0 ${level}H${width}`} />}
          {range === null && level === null && (
            <>
              <path className="plot-leader" d={`M${balloon.x} ${balloon.y}L${point.x} ${point.y}`} />
              <circle className="plot-mark-dot" cx={point.x} cy={point.y} r="3.5" />
            </>
          )}
        </g>
      ))}
    </g>
  );
}

interface BalloonsProps {
  placed: readonly PlacedMark[];
  chosen: string | null;
  narrow: boolean;
  onChoose: (id: string) => void;
}

/** Numbered balloons with their text beside them. */
export function Balloons({ placed, chosen, narrow, onChoose }: BalloonsProps) {
  return placed.map(({ mark, number, balloon, side, room }) => (
    <div
      key={mark.id}
      className={`plot-balloon plot-balloon-${side}`}
      style={{ left: balloon.x, top: balloon.y }}
    >
      <button
        type="button"
        className="balloon"
        aria-pressed={chosen === mark.id}
        aria-label={`Mark ${number}: ${mark.text}`}
        onClick={() => onChoose(mark.id)}
      >
        {number}
      </button>
      {room > 60 && (
        <p className="plot-balloon-text" style={{ maxWidth: Math.min(room, 240) }}>
          <b>{mark.text}</b>
          {!narrow && <span>{mark.author}</span>}
        </p>
      )}
    </div>
  ));
}
