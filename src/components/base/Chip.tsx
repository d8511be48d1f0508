import { circuitWords } from './circuits.ts';
import { LineSample } from './LineSample.tsx';

interface ChipProps {
  circuit: string;
  /** Instead of the circuit's own short name. */
  name?: string;
  showWiring?: boolean;
  /** With it the chip is a button that shows and hides its lane. */
  shown?: boolean;
  onToggle?: () => void;
}

/** A circuit: its line, its name, its wiring in soft. Colour only in the line. */
export function Chip({ circuit, name, showWiring = false, shown, onToggle }: ChipProps) {
  const words = circuitWords(circuit);
  const content = (
    <>
      <LineSample role={words.role} />
      {name ?? words.name}
      {showWiring && words.wiring !== null && <span className="chip-wiring">{words.wiring}</span>}
    </>
  );
  if (onToggle === undefined) return <span className="chip">{content}</span>;
  return (
    <button type="button" className="chip" aria-pressed={shown ?? true} onClick={onToggle}>
      {content}
    </button>
  );
}
