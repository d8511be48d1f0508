import { Mark } from './Mark.tsx';

interface ProgressProps {
  label: string;
  /** 0 to 1; absent: length unknown, the mark turns. */
  value?: number;
  /** What is counted, at the right: "62 %, 1 240 000 rows". */
  figure?: string;
}

/** Work under way: the mark filling clockwise from its gap, and a bar. */
export function Progress({ label, value, figure }: ProgressProps) {
  return (
    <div className="flex items-center gap-3">
      <span className="text-accent">
        <Mark size={24} {...(value === undefined ? { turning: true } : { progress: value })} />
      </span>
      <div className="min-w-0 grow">
        <div className="flex flex-wrap items-baseline justify-between gap-x-3">
          <span className="font-semibold">{label}</span>
          {figure !== undefined && <span className="figures text-soft text-dense">{figure}</span>}
        </div>
        <progress className="bar-progress mt-1" aria-label={label} max={1} value={value} />
      </div>
    </div>
  );
}
