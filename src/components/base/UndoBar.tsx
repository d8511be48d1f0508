import { useEffect, useState } from 'react';
import { Button } from './Button.tsx';
import { Icon } from './Icon.tsx';

interface UndoBarProps {
  text: string;
  onUndo: () => void;
  onGone: () => void;
  /** How long it stays while nobody is on it. */
  stayMs?: number;
}

/** Says what went and offers to bring it back; waits while it has focus or the pointer. */
export function UndoBar({ text, onUndo, onGone, stayMs = 10_000 }: UndoBarProps) {
  const [held, setHeld] = useState(false);
  useEffect(() => {
    if (held) return;
    const timer = setTimeout(onGone, stayMs);
    return () => clearTimeout(timer);
  }, [held, onGone, stayMs]);
  return (
    <div
      className="undo"
      role="status"
      onFocus={() => setHeld(true)}
      onBlur={() => setHeld(false)}
      onPointerEnter={() => setHeld(true)}
      onPointerLeave={() => setHeld(false)}
    >
      <span className="grow">{text}</span>
      <Button icon="undo" onClick={onUndo}>
        Undo
      </Button>
      <button
        type="button"
        className="button button-icon border-transparent"
        aria-label="Close"
        onClick={onGone}
      >
        <Icon name="cross" small />
      </button>
    </div>
  );
}
