import { cloneElement, type ReactElement, useId } from 'react';
import { VerdictShape } from './Verdict.tsx';

interface FieldProps {
  label: string;
  help?: string;
  error?: string | null;
  /** One input, select or textarea; gets id, aria-invalid and aria-describedby. */
  children: ReactElement<{ id?: string; 'aria-invalid'?: boolean; 'aria-describedby'?: string }>;
}

export function Field({ label, help, error, children }: FieldProps) {
  const id = useId();
  const wrong = error !== undefined && error !== null && error !== '';
  const described = [help === undefined ? '' : `${id}-help`, wrong ? `${id}-error` : ''].join(' ').trim();
  return (
    <div className="field">
      <label className="field-label" htmlFor={id}>
        {label}
      </label>
      {cloneElement(children, {
        id,
        'aria-invalid': wrong || undefined,
        'aria-describedby': described === '' ? undefined : described,
      })}
      {help !== undefined && (
        <p className="field-help" id={`${id}-help`}>
          {help}
        </p>
      )}
      {wrong && (
        <p className="field-error" id={`${id}-error`}>
          <VerdictShape verdict="bad" />
          <span>{error}</span>
        </p>
      )}
    </div>
  );
}
