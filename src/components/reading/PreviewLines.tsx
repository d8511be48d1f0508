import { Fragment } from 'react';
import type { z } from 'zod';
import type { CaptureJson, preview } from '../../contract/areas/captures.ts';
import { circuitWords } from '../base/circuits.ts';

type Line = z.infer<typeof preview>['lines'][number];
type Reading = NonNullable<CaptureJson['reading']>;

interface PreviewLinesProps {
  lines: readonly Line[];
  reading: Reading | null;
  signals: CaptureJson['signals'];
  disabled: boolean;
  onNames: (line: number) => void;
}

const ROLE_WORDS: Record<Line['role'], string> = {
  text: 'free text, set aside',
  empty: 'empty',
  names: 'names',
  units: 'units',
  numbers: '',
  rejected: 'rejected',
};

const DELIMITER_SIGNS: Readonly<Record<string, string>> = { '\t': '⇥', ' ': '␣' };

/** The first rows as they came, with what the reader made of each. */
export function PreviewLines({ lines, reading, signals, disabled, onNames }: PreviewLinesProps) {
  const roles = new Map(signals.map((signal) => [signal.column, circuitWords(signal.circuit).role]));
  const firstNumbers = lines.find((line) => line.role === 'numbers')?.line;
  const split = lines.some((line) => line.role === 'numbers' || line.role === 'names');
  return (
    <ol className="figures overflow-x-auto text-dense">
      {lines.map((line, index) => {
        const before = lines[index - 1];
        const rejected = reading?.rejectedRows.find((row) => row.line === line.line);
        const word =
          rejected === undefined
            ? line.line === firstNumbers
              ? 'numbers from here'
              : ROLE_WORDS[line.role]
            : `rejected: ${rejected.found === '' ? 'empty' : `“${rejected.found}”`}, expected ${rejected.expected}`;
        return (
          <Fragment key={line.line}>
            {before !== undefined && line.line > before.line + 1 && (
              <li className="border-b border-rule px-(--margin) py-1 text-soft" aria-hidden="true">
                ⋮
              </li>
            )}
            <li className={lineClass(line)}>
              <button
                type="button"
                className="w-14 shrink-0 cursor-pointer self-stretch pr-3 text-right text-soft hover:text-accent"
                disabled={disabled}
                aria-label={`Line ${line.line}: take it as the names`}
                title="Take this line as the names"
                onClick={() => onNames(line.line)}
              >
                {line.line}
              </button>
              <span className="grow whitespace-pre">
                {line.cells.map((cell, column) => (
                  // biome-ignore lint/suspicious/noArrayIndexKey: a cell is its place in the line
                  <Fragment key={column}>
                    {column > 0 && split && reading !== null && (
                      <span className="mx-1 border border-rule px-1 text-soft">
                        {DELIMITER_SIGNS[reading.delimiter] ?? reading.delimiter}
                      </span>
                    )}
                    <span className={cellClass(line, cell, rejected?.found, roles.get(column))}>
                      {withDecimal(line, cell, reading?.decimal)}
                    </span>
                  </Fragment>
                ))}
              </span>
              {word !== '' && (
                <span
                  className={`narrow shrink-0 bg-inherit px-3 font-sans ${line.role === 'rejected' ? 'font-semibold text-bad' : line.role === 'names' ? 'font-semibold text-accent' : 'text-soft'}`}
                >
                  {word}
                </span>
              )}
            </li>
          </Fragment>
        );
      })}
    </ol>
  );
}

function lineClass(line: Line): string {
  const base = 'flex min-h-7 items-center border-b border-rule';
  if (line.role === 'text' || line.role === 'empty') return `${base} hatched-rule`;
  if (line.role === 'names') return `${base} bg-wash outline-2 -outline-offset-2 outline-accent`;
  return base;
}

function cellClass(line: Line, cell: string, found: string | undefined, role: string | undefined): string {
  if (line.role === 'rejected' && found !== undefined && cell.trim() === found.trim())
    return 'inline-block min-h-5 min-w-6 bg-bad/15 px-1 text-bad';
  if (role === undefined || (line.role !== 'numbers' && line.role !== 'names' && line.role !== 'rejected'))
    return '';
  return `role-${role}`;
}

/** The decimal sign in accent: a wrong guess shows at once. */
function withDecimal(line: Line, cell: string, decimal: string | undefined) {
  if (line.role !== 'numbers' || decimal === undefined) return cell;
  const at = cell.indexOf(decimal);
  if (at < 0) return cell;
  return (
    <>
      {cell.slice(0, at)}
      <b className="text-accent">{decimal}</b>
      {cell.slice(at + 1)}
    </>
  );
}
