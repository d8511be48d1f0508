import { Field } from '../base/Field.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { typedNumber } from '../base/typed-number.ts';

interface NumberBoxProps {
  label: string;
  value: string;
  /** What was chosen where the number can be read in two ways: `decimal`, `thousands`, or nothing yet. */
  meant: string;
  onChange: (value: string, meant: string) => void;
  /** Whether somebody tried to go on with it. */
  wrong: boolean;
}

/** The number that a box holds; null when it holds none, or when it is not said which of two is meant. */
export function numberOf(value: string, meant: string): number | null {
  const read = typedNumber(value);
  if (read.kind === 'number') return read.value;
  if (read.kind === 'asks' && meant === 'decimal') return read.decimal;
  return read.kind === 'asks' && meant === 'thousands' ? read.thousands : null;
}

/** Takes 12.6 and 12,6 alike, and asks which is meant by 1,234. */
export function NumberBox({ label, value, meant, onChange, wrong }: NumberBoxProps) {
  const read = typedNumber(value);
  const asks = read.kind === 'asks';
  const error = !wrong
    ? null
    : asks && meant === ''
      ? 'Choose which number is meant'
      : read.kind === 'none'
        ? 'A number, such as 12.6 or 12,6'
        : null;
  return (
    <div className="grid content-start gap-2">
      <Field label={label} error={error}>
        <input
          className="box box-figures"
          inputMode="decimal"
          autoComplete="off"
          maxLength={40}
          value={value}
          onChange={(event) => onChange(event.target.value, '')}
        />
      </Field>
      {asks && (
        <div className="grid gap-1" role="status">
          <p className="text-dense">This can be two numbers. Which is meant?</p>
          <Segmented
            label={`Which number ${value} is`}
            options={[
              { value: 'decimal', text: `${read.decimal}` },
              { value: 'thousands', text: `${read.thousands}` },
            ]}
            value={meant}
            onChange={(chosen) => onChange(value, chosen)}
          />
        </div>
      )}
    </div>
  );
}
