import type { ReactNode } from 'react';
import type { SetItemJson } from '../../contract/areas/teaching.ts';
import { Button } from '../base/Button.tsx';
import { Field } from '../base/Field.tsx';
import { Icon } from '../base/Icon.tsx';

/** What an item names. */
export interface Named {
  readonly id: string;
  readonly title: string;
}

/** An item while it is being edited; `key` holds it in place in the list. */
export interface Draft {
  readonly key: string;
  readonly id?: string;
  readonly kind: SetItemJson['kind'];
  readonly text: string;
  readonly afterCommit: boolean;
  readonly thing: Named | null;
}

interface ItemProps {
  item: Draft;
  number: number;
  first: boolean;
  last: boolean;
  onChange: (over: Partial<Draft>) => void;
  onMove: (by: -1 | 1) => void;
  onRemove: () => void;
}

/** One item of a set while it is built: its words, its place in the order, a way out. */
export function SetEditorItem({ item, number, first, last, onChange, onMove, onRemove }: ItemProps) {
  const name = item.thing?.title ?? (item.kind === 'text' ? 'Text' : 'no longer there');
  return (
    <li>
      <span className="balloon" aria-hidden="true">
        {number}
      </span>
      <div className="grid grow gap-2">
        {item.kind !== 'text' && (
          <p>
            <span className="text-soft">{item.kind === 'exercise' ? 'Exercise: ' : 'Capture: '}</span>
            <b>{name}</b>
          </p>
        )}
        {item.kind !== 'exercise' && (
          <Field label={item.kind === 'text' ? `Text of item ${number}` : `Caption of item ${number}`}>
            <textarea
              className="box"
              maxLength={item.kind === 'text' ? 8000 : 2000}
              value={item.text}
              onChange={(event) => onChange({ text: event.target.value })}
            />
          </Field>
        )}
        {item.kind === 'text' && (
          <label className="build-tick">
            <input
              type="checkbox"
              className="tick"
              checked={item.afterCommit}
              onChange={(event) => onChange({ afterCommit: event.target.checked })}
            />
            Show it only after the exercises before it are answered
          </label>
        )}
      </div>
      <Move label={`Move item ${number} up`} disabled={first} turned onMove={() => onMove(-1)} />
      <Move label={`Move item ${number} down`} disabled={last} onMove={() => onMove(1)} />
      <Button className="button-icon" aria-label={`Remove item ${number}: ${name}`} onClick={onRemove}>
        <Icon name="cross" small />
      </Button>
    </li>
  );
}

function Move({
  label,
  disabled,
  turned = false,
  onMove,
}: {
  label: string;
  disabled: boolean;
  turned?: boolean;
  onMove: () => void;
}): ReactNode {
  return (
    <Button
      className={`button-icon${turned ? ' rotate-180' : ''}`}
      aria-label={label}
      disabled={disabled}
      onClick={onMove}
    >
      <Icon name="down" small />
    </Button>
  );
}
