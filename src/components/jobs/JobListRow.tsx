import type { JobRowJson } from '../../contract/areas/jobs.ts';
import { timeText } from '../base/numbers.ts';
import { Verdict } from '../base/Verdict.tsx';
import { countsText, jobName, STATE_WORDS, vehicleText } from './words.ts';

/** One job in the list: complaint, vehicle, state, who works on it, what it holds. */
export function JobListRow({ row, timeZone }: { row: JobRowJson; timeZone: string }) {
  const { plate } = row.vehicle;
  const cause = row.outcome?.cause ?? '';
  return (
    <li className="relative grid gap-x-6 gap-y-1 border-b border-rule px-(--margin) py-4 hover:bg-ground desk:grid-cols-[88px_minmax(0,1fr)_minmax(0,16rem)_minmax(128px,auto)]">
      <p className="figures flex gap-3 text-dense text-soft desk:block">
        {jobName(row.number)}
        <span className="desk:hidden">
          <Verdict {...STATE_WORDS[row.state]} />
        </span>
      </p>
      <div className="min-w-0">
        <h2 className="text-head leading-6">
          <a
            className="line-clamp-2 break-words text-ink after:absolute after:inset-0"
            href={`/jobs/${row.id}`}
          >
            {row.complaint}
          </a>
        </h2>
        <p className="flex flex-wrap gap-x-3 text-dense text-soft">
          <span className="min-w-0 break-words">{vehicleText(row.vehicle)}</span>
          {plate !== '' && <span className="figures text-ink">{plate}</span>}
          {row.codes.slice(0, 4).map((code, place) => (
            // biome-ignore lint/suspicious/noArrayIndexKey: a code may be typed twice
            <span key={`${code} ${place}`} className="figures">
              {code}
            </span>
          ))}
        </p>
        {cause !== '' && <p className="mt-1 line-clamp-2 text-dense break-words">Found: {cause}</p>}
      </div>
      <div className="min-w-0 text-dense">
        <p className="hidden desk:block">
          <Verdict {...STATE_WORDS[row.state]} />
        </p>
        <p className="narrow text-soft">{countsText(row)}</p>
      </div>
      <div className="flex flex-wrap gap-x-3 desk:block">
        <p className="figures text-caption desk:text-dense">{timeText(row.createdAt, timeZone)}</p>
        <p className="narrow text-caption text-soft desk:text-dense">{row.assignee?.name ?? 'nobody yet'}</p>
      </div>
    </li>
  );
}
