import { type PointerEvent, type ReactNode, useRef, useState } from 'react';

export type SheetHeight = 'low' | 'half' | 'full';
const ORDER: readonly SheetHeight[] = ['low', 'half', 'full'];

interface SheetProps {
  label: string;
  children: ReactNode;
}

/** Beside the plot on a desk; below 1100 px a sheet from below with three heights, set by drag, tap or arrow keys. */
export function Sheet({ label, children }: SheetProps) {
  const [height, setHeight] = useState<SheetHeight>('half');
  const start = useRef<number | null>(null);
  const step = (by: number) => {
    const place = ORDER.indexOf(height) + by;
    setHeight(ORDER[Math.min(Math.max(place, 0), ORDER.length - 1)] ?? 'half');
  };
  const up = (event: PointerEvent) => {
    if (start.current === null) return;
    const moved = event.clientY - start.current;
    start.current = null;
    if (Math.abs(moved) > 24) step(moved < 0 ? (moved < -260 ? 2 : 1) : moved > 260 ? -2 : -1);
    else setHeight(height === 'full' ? 'low' : (ORDER[ORDER.indexOf(height) + 1] ?? 'half'));
  };
  return (
    <aside className={`sheet sheet-${height}`} aria-label={label}>
      <button
        type="button"
        className="sheet-grip"
        aria-label={`Height of the panel: ${height}`}
        onPointerDown={(event) => {
          start.current = event.clientY;
          event.currentTarget.setPointerCapture(event.pointerId);
        }}
        onPointerUp={up}
        onPointerCancel={() => {
          start.current = null;
        }}
        onKeyDown={(event) => {
          if (event.key === 'ArrowUp') step(1);
          else if (event.key === 'ArrowDown') step(-1);
          else if (event.key === 'Enter' || event.key === ' ') step(height === 'full' ? -2 : 1);
          else return;
          event.preventDefault();
        }}
      >
        <i />
      </button>
      <div className="sheet-body">{children}</div>
    </aside>
  );
}
