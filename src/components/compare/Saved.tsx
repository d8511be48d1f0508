import useSWR from 'swr';
import type { ComparisonListRowJson } from '../../contract/areas/library.ts';
import { fetcher } from '../base/api.ts';
import { timeText } from '../base/numbers.ts';
import { Verdict } from '../base/Verdict.tsx';

/** Comparisons of this capture that were made before. */
export function Saved({ captureId }: { captureId: string }) {
  const { data } = useSWR(
    `/comparisons?limit=20&captureId=${captureId}`,
    fetcher<{ items: ComparisonListRowJson[] }>,
    { shouldRetryOnError: false },
  );
  if (data === undefined || data.items.length === 0) return null;
  return (
    <section aria-labelledby="saved-title">
      <h2 id="saved-title">Compared before</h2>
      <ul className="saved-list">
        {data.items.map((row) => (
          <li key={row.id}>
            <a href={`/comparisons/${row.id}`}>
              <b>{row.here}</b>
              <span className="text-soft">
                {row.other === '' ? row.status : `against ${row.other}`}, {timeText(row.createdAt)}
              </span>
              {row.status === 'ready' && (
                <Verdict
                  verdict={row.outside > 0 ? 'bad' : 'good'}
                  word={
                    row.outside > 0 ? `${row.outside} of ${row.rows} outside` : `none of ${row.rows} outside`
                  }
                />
              )}
            </a>
          </li>
        ))}
      </ul>
    </section>
  );
}
