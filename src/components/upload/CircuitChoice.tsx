import type { Circuit } from '../../engine/circuit.ts';
import { CIRCUIT_LIST, CIRCUIT_WORDS } from '../base/circuits.ts';

interface CircuitChoiceProps {
  label: string;
  value: Circuit | '';
  /** First line while nothing is chosen: "Another circuit". */
  placeholder?: string;
  disabled?: boolean;
  onChange: (circuit: Circuit) => void;
}

export function CircuitChoice({ label, value, placeholder, disabled = false, onChange }: CircuitChoiceProps) {
  return (
    <select
      className="choice"
      aria-label={label}
      value={value}
      disabled={disabled}
      onChange={(event) => {
        const chosen = CIRCUIT_LIST.find((circuit) => circuit === event.target.value);
        if (chosen !== undefined) onChange(chosen);
      }}
    >
      {placeholder !== undefined && <option value="">{placeholder}</option>}
      {CIRCUIT_LIST.map((circuit) => (
        <option key={circuit} value={circuit}>
          {CIRCUIT_WORDS[circuit].full}
        </option>
      ))}
    </select>
  );
}
