import type { ComparisonJson } from '../../contract/areas/library.ts';
import { Verdict, type VerdictName } from '../base/Verdict.tsx';
import { bandBar, rowText } from './row-text.ts';

const SHAPES: Record<ComparisonJson['rows'][number]['verdict'], VerdictName> = {
  inside: 'good',
  outside: 'bad',
  undecided: 'undecided',
};

/** Quantity, here, reference, band, difference, verdict; on a phone two lines a row, never scrolled sideways. */
export function ComparisonTable({ comparison }: { comparison: ComparisonJson }) {
  const banded = comparison.rows.some((row) => row.low !== null);
  const n = comparison.other?.n ?? 1;
  return (
    <table className={banded ? 'table comparison-table' : 'table comparison-table comparison-single'}>
      <caption className="sr-only">Values here and in the reference</caption>
      <thead>
        <tr>
          <th scope="col">Quantity</th>
          <th scope="col" className="number">
            Here
          </th>
          <th scope="col" className="number">
            Reference{n > 1 ? `, n = ${n}` : ''}
          </th>
          {banded && (
            <th scope="col" className="number">
              Band
            </th>
          )}
          <th scope="col" className="number">
            Difference
          </th>
          {banded && <th scope="col">In the band</th>}
          <th scope="col">Verdict</th>
        </tr>
      </thead>
      <tbody>
        {comparison.rows.map((row) => {
          const text = rowText(row);
          const bar = bandBar(row);
          const unit = text.unit === '°' ? '°' : text.unit === '' ? '' : ` ${text.unit}`;
          const after = (value: string) => (value === '' || value === 'none' ? value : `${value}${unit}`);
          return (
            <tr key={`${row.key} ${row.part}`}>
              <th scope="row" className="comparison-quantity">
                {text.label}
              </th>
              <td className="number comparison-here">{after(text.here)}</td>
              <td className="number comparison-reference">{after(text.reference)}</td>
              {banded && <td className="number comparison-band">{after(text.band)}</td>}
              <td className="number comparison-difference">{after(text.difference)}</td>
              {banded && (
                <td className="comparison-bar">
                  {bar !== null && (
                    <svg viewBox="0 0 120 16" width="120" height="16" aria-hidden="true">
                      <path className="bar-line" d="M0 8H120" />
                      <rect
                        className="bar-band"
                        x={bar.low * 120}
                        y="4"
                        width={(bar.high - bar.low) * 120}
                        height="8"
                      />
                      <rect
                        className={row.verdict === 'outside' ? 'bar-here bar-here-out' : 'bar-here'}
                        x={bar.here * 120 - 1.25}
                        y="1"
                        width="2.5"
                        height="14"
                      />
                    </svg>
                  )}
                </td>
              )}
              <td className="comparison-verdict">
                <Verdict verdict={SHAPES[row.verdict]} word={row.verdict} />
                {row.verdict !== 'inside' && row.why !== '' && (
                  <span className="comparison-why">{row.why}</span>
                )}
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
