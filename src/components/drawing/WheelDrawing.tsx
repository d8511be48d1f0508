interface WheelDrawingProps {
  /** Equal places round the wheel, missing ones included. */
  places?: number;
  missing?: number;
  /** A tooth drawn short, counted from the gap. */
  shortTooth?: number;
  /** Chain lines, degree ring, width of the gap and the balloon of the short tooth. */
  dimensioned?: boolean;
  label: string;
  className?: string;
}

const at = (deg: number, radius: number) => {
  const angle = ((deg - 90) * Math.PI) / 180;
  return `${(radius * Math.cos(angle)).toFixed(2)} ${(radius * Math.sin(angle)).toFixed(2)}`;
};

/** A trigger wheel drawn to its nominal angles: gap at the top, teeth clockwise from it. A drawing, not a measurement. */
export function WheelDrawing({
  places = 60,
  missing = 2,
  shortTooth = 23,
  dimensioned = false,
  label,
  className = '',
}: WheelDrawingProps) {
  const pitch = 360 / places;
  const teeth = places - missing;
  const firstDeg = ((missing + 1) / 2) * pitch;
  const toothDeg = (index: number) => firstDeg + index * pitch;
  const half = pitch * 0.25;
  const outline = Array.from({ length: teeth }, (_, index) => {
    const deg = toothDeg(index);
    const tip = index + 1 === shortTooth ? 78 : 94;
    // A tooth has parallel flanks: its half angle shrinks outwards.
    const tipHalf = (half * 64) / tip;
    return `L${at(deg - half, 64)}L${at(deg - tipHalf, tip)}L${at(deg + tipHalf, tip)}L${at(deg + half, 64)}`;
  }).join('');
  const body = `M${at(firstDeg - pitch + half, 64)}${outline}A64 64 0 0 1 ${at(firstDeg - half, 64)}Z`;
  const short = toothDeg(shortTooth - 1);
  const ticks = Array.from({ length: 72 }, (_, index) => index * 5)
    .map((deg) => `M${at(deg, 100)}L${at(deg, deg % 30 === 0 ? 104 : 101.5)}`)
    .join('');
  return (
    <svg
      viewBox={dimensioned ? '-114 -116 228 232' : '-98 -98 196 196'}
      className={className}
      role="img"
      aria-label={label}
      fill="none"
    >
      <path
        d={`${body}M${at(0, 58)}A58 58 0 1 0 ${at(180, 58)}A58 58 0 1 0 ${at(0, 58)}Z`}
        fillRule="evenodd"
        className="fill-crank/15 stroke-crank"
        strokeWidth="0.7"
      />
      {dimensioned && (
        <>
          <circle r="20" className="stroke-crank" strokeWidth="0.5" />
          <circle r="100" className="stroke-ink" strokeWidth="0.4" />
          <path d={ticks} className="stroke-ink" strokeWidth="0.5" />
          <path
            d="M0-98V112M-112 0H112"
            className="stroke-accent"
            strokeWidth="0.4"
            strokeDasharray="12 2 2 2"
          />
          <circle r="1" className="fill-accent" />
          <path
            d={`M${at(-firstDeg, 101)}L${at(-firstDeg, 110)}M${at(firstDeg, 101)}L${at(firstDeg, 110)}M${at(-firstDeg, 107)}A107 107 0 0 1 ${at(-3.6, 107)}M${at(3.6, 107)}A107 107 0 0 1 ${at(firstDeg, 107)}`}
            className="stroke-accent"
            strokeWidth="0.6"
          />
          <text y="-105" textAnchor="middle" className="figures fill-accent text-[6px]" fontSize="6">
            {((missing + 1) * pitch).toFixed(0)}°
          </text>
          <path d={`M${at(short, 79)}L${at(short, 106)}`} className="stroke-accent" strokeWidth="0.5" />
          <g transform={`translate(${at(short, 111).replace(' ', ',')})`}>
            <circle r="5" className="fill-sheet stroke-accent" strokeWidth="0.7" />
            <text y="1.9" textAnchor="middle" className="fill-accent font-semibold text-[5px]" fontSize="5">
              {shortTooth}
            </text>
          </g>
        </>
      )}
    </svg>
  );
}
