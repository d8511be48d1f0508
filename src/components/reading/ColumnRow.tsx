import { useState } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { Circuit } from '../../engine/circuit.ts';
import { Button } from '../base/Button.tsx';
import { Verdict } from '../base/Verdict.tsx';
import { Thumbnail } from '../captures/Thumbnail.tsx';
import { asSentence, sureness } from '../captures/words.ts';
import { CircuitChoice } from '../upload/CircuitChoice.tsx';
import { Confidence } from './Confidence.tsx';
import { parseFactor } from './parse-factor.ts';

type Signal = CaptureJson['signals'][number];

export interface SignalChange {
  readonly circuit?: Circuit;
  readonly unit?: string;
  readonly factor?: number;
}

interface ColumnRowProps {
  capture: CaptureJson;
  signal: Signal;
  disabled: boolean;
  /** Null for the only column: a capture without a signal is none. */
  onLeaveOut: (() => void) | null;
  onChange: (change: SignalChange) => void;
}

/** One column of the file: its shape, what it measures and how sure that is, unit and factor. */
export function ColumnRow({ capture, signal, disabled, onLeaveOut, onChange }: ColumnRowProps) {
  const sure = sureness(signal.circuitConfidence);
  const doubtful = sure.verdict !== 'good';
  return (
    <li
      className={`grid gap-x-4 gap-y-2 border-b border-rule px-(--margin) py-3 xl:grid-cols-[112px_200px_208px_144px_minmax(0,1fr)_264px] xl:items-center ${doubtful ? 'bg-wash shadow-[inset_4px_0_0_var(--color-accent)]' : ''}`}
    >
      <div className="min-w-0">
        <p className="text-head font-semibold break-words">{signal.name}</p>
        <p className="narrow text-caption text-soft">column {signal.column}, from 0</p>
      </div>
      <Thumbnail capture={capture} signal={signal.index} width={220} height={56} className="h-14 w-full" />
      <CircuitChoice
        label={`Circuit of ${signal.name}`}
        value={signal.circuit}
        disabled={disabled}
        onChange={(circuit) => onChange({ circuit })}
      />
      <div className="flex flex-wrap items-center gap-x-3 xl:block">
        <Confidence value={signal.circuitConfidence} />
        <Verdict verdict={sure.verdict} word={sure.word} />
      </div>
      <p className="text-dense">{asSentence(signal.circuitBecause)}</p>
      <div className="flex flex-wrap items-end gap-2">
        <SmallField
          key={`unit ${signal.unit}`}
          label="Unit"
          of={signal.name}
          start={signal.unit}
          wrong={(text) => (text.length > 20 ? 'At most 20 letters' : null)}
          disabled={disabled}
          onTake={(text) => onChange({ unit: text.trim() })}
        />
        <SmallField
          key={`factor ${signal.factor}`}
          label="Factor"
          of={signal.name}
          start={String(signal.factor)}
          wrong={(text) => (parseFactor(text) === null ? 'Needs a number: 20 or 20:1' : null)}
          disabled={disabled}
          onTake={(text) => {
            const factor = parseFactor(text);
            if (factor !== null) onChange({ factor });
          }}
        />
        {onLeaveOut !== null && (
          <Button
            kind="quiet"
            small
            disabled={disabled}
            aria-label={`Leave out ${signal.name}`}
            onClick={onLeaveOut}
          >
            Leave out
          </Button>
        )}
      </div>
    </li>
  );
}

interface SmallFieldProps {
  label: string;
  of: string;
  start: string;
  wrong: (text: string) => string | null;
  disabled: boolean;
  onTake: (text: string) => void;
}

/** Taken on Enter or when the field is left with something else in it. */
function SmallField({ label, of, start, wrong, disabled, onTake }: SmallFieldProps) {
  const [text, setText] = useState(start);
  const trouble = wrong(text);
  const take = () => {
    if (trouble === null && text.trim() !== start) onTake(text);
  };
  return (
    <label className="grid w-20 gap-1 text-caption">
      <span className="narrow text-soft">{label}</span>
      <input
        className="box box-figures"
        aria-label={`${label} of ${of}`}
        value={text}
        disabled={disabled}
        aria-invalid={trouble !== null}
        onChange={(event) => setText(event.target.value)}
        onBlur={take}
        onKeyDown={(event) => {
          if (event.key === 'Enter') take();
        }}
      />
      {trouble !== null && (
        <span className="text-bad" role="alert">
          {trouble}
        </span>
      )}
    </label>
  );
}
