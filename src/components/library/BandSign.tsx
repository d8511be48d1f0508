import type { SignalRole } from '../base/circuits.ts';

/** A pale band with a middle line: three or more known-goods give a spread. */
export function BandSign({ role }: { role: SignalRole }) {
  return (
    <svg viewBox="0 0 24 10" width="24" height="10" className={`role-${role}`} fill="none" aria-hidden="true">
      <path d="M0 1.5Q6-.5 12 1.5T24 1.5V8.5Q18 10.5 12 8.5T0 8.5Z" fill="currentColor" opacity="0.25" />
      <path d="M0 5Q6 3 12 5T24 5" stroke="currentColor" strokeWidth="1.6" />
    </svg>
  );
}
