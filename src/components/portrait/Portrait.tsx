import { circuitWords, ROLE_DASHES } from '../base/circuits.ts';
import { type PortraitLike, portraitPath } from './portrait-path.ts';

interface PortraitProps {
  portrait: PortraitLike;
  circuit: string;
  width?: number;
  height?: number;
  className?: string;
}

/** A signal, small, in its role's colour. Decoration beside words that say the same. */
export function Portrait({ portrait, circuit, width = 66, height = 34, className = '' }: PortraitProps) {
  const { role } = circuitWords(circuit);
  const dash = ROLE_DASHES[role].join(' ');
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      width={width}
      height={height}
      preserveAspectRatio="none"
      className={`role-${role} shrink-0 ${className}`}
      aria-hidden="true"
    >
      <path
        d={portraitPath(portrait, { width, height })}
        fill="none"
        stroke="currentColor"
        strokeWidth="1"
        strokeDasharray={dash === '' ? undefined : dash}
        vectorEffect="non-scaling-stroke"
      />
    </svg>
  );
}
