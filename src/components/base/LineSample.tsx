import { ROLE_DASHES, type SignalRole } from './circuits.ts';

/** A short piece of the role's line: what tells roles apart beside the name. */
export function LineSample({ role, width = 16 }: { role: SignalRole; width?: number }) {
  const dash = ROLE_DASHES[role].join(' ');
  return (
    <svg
      className={`line-sample role-${role}`}
      viewBox={`0 0 ${width} 4`}
      width={width}
      height="4"
      aria-hidden="true"
    >
      <path d={`M0 2H${width}`} strokeDasharray={dash === '' ? undefined : dash} />
    </svg>
  );
}
