import type { MeasurementsJson } from '../../contract/areas/captures.ts';
import { type NumberRow, numberRows } from '../capture/number-rows.ts';

/** What is read first, in this order; the rest is behind "All numbers". */
const FIRST = [
  'irregular_teeth',
  'rpm_mean',
  'wheel_pattern',
  'polarity',
  'dwell',
  'kick_peak',
  'burn_time',
  'peak_current',
  'pulse_width',
  'cranking_mean',
  'inrush_peak',
  'supply_level',
];
const FEW = 3;

/** Three numbers that say most, and all of them on request. */
export function FewNumbers({ measurements }: { measurements: MeasurementsJson }) {
  const values = [...measurements.signals, ...measurements.relations].flatMap((part) => part.values);
  const rows = values.flatMap((value) => numberRows(value, null).map((row) => ({ key: value.key, row })));
  const known = rows.filter(({ row }) => row.text !== null);
  const few = FIRST.flatMap((key) => known.filter((each) => each.key === key)).slice(0, FEW);
  const notices = [...measurements.signals, ...measurements.relations].flatMap((part) => part.notices);
  return (
    <>
      <dl className="few-numbers">
        {(few.length > 0 ? few : known.slice(0, FEW)).map(({ row, key }, place) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: two signals may have the same key
          <div key={`${key} ${place}`}>
            <dt>{row.label}</dt>
            <dd>
              {row.text}
              <Unit row={row} />
              {row.detail !== '' && <span className="few-detail">{row.detail}</span>}
            </dd>
          </div>
        ))}
      </dl>
      <details className="all-numbers">
        <summary>All {rows.length} numbers</summary>
        <table className="table">
          <thead>
            <tr>
              <th scope="col">Quantity</th>
              <th scope="col" className="number-column">
                Value
              </th>
            </tr>
          </thead>
          <tbody>
            {rows.map(({ row, key }, place) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: two signals may have the same key
              <tr key={`${key} ${place}`}>
                <th scope="row">{row.label}</th>
                <td className="number-column">
                  {row.text ?? 'none'}
                  <Unit row={row} />
                  {row.detail !== '' && <span className="few-detail">{row.detail}</span>}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
        {notices.map((notice) => (
          <p key={`${notice.code} ${notice.text}`} className="share-notice">
            {notice.text}
          </p>
        ))}
      </details>
    </>
  );
}

function Unit({ row }: { row: NumberRow }) {
  if (row.unit === '') return null;
  return row.unit === '°' ? '°' : <span className="unit"> {row.unit}</span>;
}
