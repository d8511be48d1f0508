const BOXES = 10;

/** Ten boxes and the number. */
export function Confidence({ value }: { value: number }) {
  const full = Math.round(value * BOXES);
  return (
    <span className="flex items-center gap-2">
      <svg viewBox="0 0 80 8" width="80" height="8" aria-hidden="true" fill="none" className="text-ink">
        {Array.from({ length: BOXES }, (_, box) => (
          <rect
            // biome-ignore lint/suspicious/noArrayIndexKey: a box is its place
            key={box}
            x={box * 8 + 0.5}
            y="0.5"
            width="6.5"
            height="7"
            fill={box < full ? 'currentColor' : 'none'}
            stroke="currentColor"
            strokeWidth="0.7"
          />
        ))}
      </svg>
      <span className="figures text-dense">{value.toFixed(2)}</span>
    </span>
  );
}
