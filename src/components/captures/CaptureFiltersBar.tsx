import { CIRCUIT_LIST, CIRCUIT_WORDS } from '../base/circuits.ts';
import type { CaptureFilters } from './useCaptureList.ts';
import { STATUS_WORDS } from './words.ts';

interface CaptureFiltersBarProps {
  filters: CaptureFilters;
  onChange: (filters: CaptureFilters) => void;
}

export function CaptureFiltersBar({ filters, onChange }: CaptureFiltersBarProps) {
  return (
    <div className="flex items-center gap-2 border-b border-line bg-ground px-(--margin) py-3">
      <select
        className={`choice max-w-52 ${filters.circuit === '' ? '' : 'choice-wash'}`}
        aria-label="Circuit"
        value={filters.circuit}
        onChange={(event) => onChange({ ...filters, circuit: event.target.value })}
      >
        <option value="">Any circuit</option>
        {CIRCUIT_LIST.map((circuit) => (
          <option key={circuit} value={circuit}>
            {CIRCUIT_WORDS[circuit].full}
          </option>
        ))}
      </select>
      <select
        className={`choice max-w-44 ${filters.status === '' ? '' : 'choice-wash'}`}
        aria-label="State"
        value={filters.status}
        onChange={(event) => onChange({ ...filters, status: event.target.value })}
      >
        <option value="">Any state</option>
        {Object.entries(STATUS_WORDS).map(([status, word]) => (
          <option key={status} value={status}>
            {word}
          </option>
        ))}
      </select>
      <span className="narrow ml-auto hidden text-soft desk:block">newest first</span>
    </div>
  );
}
