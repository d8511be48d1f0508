/** Where the ring is open: the gap's centre, clockwise from the top. */
const GAP_DEG = 30;

const point = (deg: number, radius: number) => {
  const angle = ((deg - 90) * Math.PI) / 180;
  return `${(radius * Math.cos(angle)).toFixed(2)} ${(radius * Math.sin(angle)).toFixed(2)}`;
};

const arc = (fromDeg: number, toDeg: number, radius: number) =>
  `M${point(fromDeg, radius)}A${radius} ${radius} 0 ${toDeg - fromDeg > 180 ? 1 : 0} 1 ${point(toDeg, radius)}`;

interface MarkProps {
  /** CSS pixels it will be shown at; below 22 it has 8 places instead of 12. */
  size?: number;
  /** 0 to 1 fills ring and teeth clockwise from the gap; absent: all filled. */
  progress?: number;
  /** Turns in steps of one place, for work of unknown length. */
  turning?: boolean;
  /** Absent: decoration, hidden from assistive technology. */
  label?: string;
  className?: string;
}

/** The mark: an open ring of short teeth with one gap at one o'clock. With `progress` it is the progress mark. */
export function Mark({ size = 34, progress, turning = false, label, className = '' }: MarkProps) {
  const places = size < 22 ? 8 : 12;
  const tooth = size < 22 ? 6.4 : 4.8;
  const ring = size < 22 ? 6.6 : 5.4;
  const flankDeg = (Math.asin(tooth / 2 / 13) * 180) / Math.PI;
  const pitch = 360 / places;
  const teeth = Array.from({ length: places - 1 }, (_, index) => GAP_DEG + (index + 1) * pitch);
  const startDeg = teeth[0]! - flankDeg;
  const endDeg = teeth[teeth.length - 1]! + flankDeg;
  const done = progress === undefined ? 1 : Math.min(1, Math.max(0, progress));
  const doneDeg = startDeg + done * (endDeg - startDeg);
  const filled = (deg: number) => deg - flankDeg <= doneDeg && done > 0;
  const teethPath = (which: boolean) =>
    teeth
      .filter((deg) => filled(deg) === which)
      .map((deg) => `M${point(deg, 14)}L${point(deg, 22.5)}`)
      .join('');
  return (
    <svg
      viewBox="-24 -24 48 48"
      width={size}
      height={size}
      className={className}
      role={label === undefined ? undefined : 'img'}
      aria-label={label}
      aria-hidden={label === undefined ? true : undefined}
    >
      <g className={turning ? 'mark-turning' : undefined}>
        {done < 1 && (
          <g className="mark-rest" fill="none">
            <path d={arc(Math.max(startDeg, doneDeg), endDeg, 13)} strokeWidth={ring} />
            <path d={teethPath(false)} strokeWidth={tooth} />
          </g>
        )}
        {done > 0 && (
          <g>
            <path className="mark-ring" d={arc(startDeg, doneDeg, 13)} strokeWidth={ring} />
            <path className="mark-teeth" d={teethPath(true)} strokeWidth={tooth} />
          </g>
        )}
      </g>
    </svg>
  );
}
