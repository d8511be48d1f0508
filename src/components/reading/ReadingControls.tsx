import { type ReactNode, useState } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import { Button } from '../base/Button.tsx';
import { lengthText, rateText } from '../base/numbers.ts';
import type { CapturePatch } from '../upload/change-capture.ts';
import { timeUnitWord } from '../upload/understood.ts';
import { parseFactor } from './parse-factor.ts';
import { timeChoices } from './time-choices.ts';

export type ReadingPatch = NonNullable<CapturePatch['reading']>;

interface ReadingControlsProps {
  capture: CaptureJson;
  /** Names of the file's columns, in order. */
  columnNames: readonly string[];
  disabled: boolean;
  onChange: (patch: ReadingPatch) => void;
}

const DELIMITERS = [
  [',', 'Comma ,'],
  [';', 'Semicolon ;'],
  ['\t', 'Tab'],
  [' ', 'Spaces'],
  ['|', 'Bar |'],
] as const;
const DECIMALS = [
  ['.', 'Point .'],
  [',', 'Comma ,'],
] as const;
const UNITS = ['s', 'ms', 'us', 'ns', 'min', 'clock'] as const;
const ENCODINGS = [
  ['utf-8', 'UTF-8'],
  ['utf-16le', 'UTF-16, little-endian'],
  ['utf-16be', 'UTF-16, big-endian'],
  ['windows-1252', 'Windows-1252'],
] as const;
const NO_COLUMN = 'none';

/** What the file was understood as; a change reads it again at once. */
export function ReadingControls({ capture, columnNames, disabled, onChange }: ReadingControlsProps) {
  const { reading } = capture;
  const choices = reading?.timeUnit ? timeChoices(capture, reading.timeUnit) : [];
  const headerLine = reading?.headerLine ?? null;
  return (
    <>
      <Choice
        label="Delimiter"
        value={reading?.delimiter ?? ''}
        disabled={disabled}
        options={DELIMITERS}
        onChange={(value) => {
          const found = DELIMITERS.find(([sign]) => sign === value);
          if (found !== undefined) onChange({ delimiter: found[0] });
        }}
      />
      <Choice
        label="Decimal"
        value={reading?.decimal ?? ''}
        disabled={disabled}
        options={DECIMALS}
        onChange={(value) => {
          const found = DECIMALS.find(([sign]) => sign === value);
          if (found !== undefined) onChange({ decimal: found[0] });
        }}
      />
      <Control label="Names in line">
        {(id) => (
          <NamesLine
            id={id}
            key={headerLine}
            line={headerLine}
            disabled={disabled}
            onChange={(line) => onChange({ headerLine: line })}
          />
        )}
      </Control>
      <Choice
        label="Time column"
        value={reading === null ? '' : reading.timeColumn === null ? NO_COLUMN : String(reading.timeColumn)}
        disabled={disabled}
        options={[
          [NO_COLUMN, 'None: equal steps'],
          ...columnNames.map(
            (name, column) => [String(column), `${name || 'unnamed'}, column ${column}`] as const,
          ),
        ]}
        onChange={(value) => onChange({ timeColumn: value === NO_COLUMN ? null : Number(value) })}
      />
      <Choice
        label="Time unit"
        value={reading?.timeUnit ?? ''}
        disabled={disabled || reading?.timeColumn === null}
        options={UNITS.map((unit) => [unit, timeUnitWord(unit)] as const)}
        onChange={(value) => {
          const unit = UNITS.find((each) => each === value);
          if (unit !== undefined) onChange({ timeUnit: unit });
        }}
      />
      {(reading?.timeColumn === null || capture.error?.code === 'interval_needed') && (
        <Control label="Sample interval, s">
          {(id) => (
            <Interval
              id={id}
              seconds={capture.sampleRateHz === null ? null : 1 / capture.sampleRateHz}
              disabled={disabled}
              onChange={(sampleIntervalS) => onChange({ sampleIntervalS })}
            />
          )}
        </Control>
      )}
      <Choice
        label="Encoding"
        value={reading?.encoding ?? ''}
        disabled={disabled}
        options={ENCODINGS}
        onChange={(value) => {
          const found = ENCODINGS.find(([name]) => name === value);
          if (found !== undefined) onChange({ encoding: found[0] });
        }}
      />
      {choices.length > 1 && (
        <div className="grid grid-cols-2 gap-3 p-(--margin) pt-3">
          {choices.map((choice, index) => (
            <div
              key={choice.unit}
              className={`border p-3 ${index === 0 ? 'border-rule' : 'border-dashed border-line text-soft'}`}
            >
              <p className="font-semibold">
                {index === 0 ? 'In' : 'If it were'} {timeUnitWord(choice.unit)}
              </p>
              <p className="figures text-dense">{lengthText(choice.durationS)}</p>
              {choice.rateHz !== null && <p className="figures text-dense">{rateText(choice.rateHz)}</p>}
            </div>
          ))}
        </div>
      )}
    </>
  );
}

const slug = (label: string) => `reading-${label.toLowerCase().replace(/[^a-z]+/g, '-')}`;

function Control({ label, children }: { label: string; children: (id: string) => ReactNode }) {
  const id = slug(label);
  return (
    <div className="grid grid-cols-[104px_minmax(0,1fr)] items-center gap-3 border-b border-rule px-(--margin) py-1.5">
      <label htmlFor={id} className="font-medium">
        {label}
      </label>
      {children(id)}
    </div>
  );
}

interface ChoiceProps {
  label: string;
  value: string;
  options: readonly (readonly [string, string])[];
  disabled: boolean;
  onChange: (value: string) => void;
}

function Choice({ label, value, options, disabled, onChange }: ChoiceProps) {
  return (
    <Control label={label}>
      {(id) => (
        <select
          id={id}
          className="choice"
          value={value}
          disabled={disabled}
          onChange={(event) => onChange(event.target.value)}
        >
          {value === '' && <option value="">not known</option>}
          {options.map(([option, text]) => (
            <option key={option} value={option}>
              {text}
            </option>
          ))}
        </select>
      )}
    </Control>
  );
}

interface NamesLineProps {
  id: string;
  line: number | null;
  disabled: boolean;
  onChange: (line: number | null) => void;
}

function NamesLine({ id, line, disabled, onChange }: NamesLineProps) {
  const [text, setText] = useState(line === null ? '' : String(line));
  const number = Number(text);
  const right = text.trim() === '' || (Number.isInteger(number) && number >= 1 && number <= 10_000);
  const next = text.trim() === '' ? null : number;
  return (
    <form
      className="flex gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        if (right && next !== line) onChange(next);
      }}
    >
      <input
        id={id}
        className="box box-figures"
        inputMode="numeric"
        placeholder="none"
        value={text}
        disabled={disabled}
        aria-invalid={!right}
        onChange={(event) => setText(event.target.value)}
      />
      <Button type="submit" disabled={disabled || !right || next === line}>
        Take
      </Button>
    </form>
  );
}

interface IntervalProps {
  id: string;
  seconds: number | null;
  disabled: boolean;
  onChange: (seconds: number) => void;
}

function Interval({ id, seconds, disabled, onChange }: IntervalProps) {
  const [text, setText] = useState(seconds === null ? '' : String(Number(seconds.toPrecision(12))));
  const parsed = parseFactor(text);
  const right = parsed !== null && parsed > 0;
  return (
    <form
      className="flex gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        if (right) onChange(parsed);
      }}
    >
      <input
        id={id}
        className="box box-figures"
        inputMode="decimal"
        placeholder="0.00002"
        value={text}
        disabled={disabled}
        aria-invalid={text !== '' && !right}
        onChange={(event) => setText(event.target.value)}
      />
      <Button type="submit" disabled={disabled || !right}>
        Take
      </Button>
    </form>
  );
}
