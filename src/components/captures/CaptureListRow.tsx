import type { CaptureRowJson } from '../../contract/areas/captures.ts';
import { Chip } from '../base/Chip.tsx';
import { lengthText, timeText } from '../base/numbers.ts';
import { Verdict } from '../base/Verdict.tsx';
import { Thumbnail } from './Thumbnail.tsx';
import { rowVerdict } from './words.ts';

const MOST_CHIPS = 4;

const marksText = (count: number) => (count === 0 ? '' : count === 1 ? '1 mark' : `${count} marks`);

/** One capture in the list: its trace small, what it holds, what was noticed, when and by whom. */
export function CaptureListRow({ row, timeZone }: { row: CaptureRowJson; timeZone: string }) {
  const verdict = rowVerdict(row);
  const under = row.status === 'reading' || row.status === 'measuring';
  const address = row.status === 'failed' ? `/captures/${row.id}/reading` : `/captures/${row.id}`;
  return (
    <li className="relative grid gap-x-4 gap-y-2 border-b border-rule px-(--margin) py-4 hover:bg-ground desk:grid-cols-[220px_minmax(0,8fr)_minmax(0,6fr)_minmax(112px,auto)_72px] desk:gap-y-0 broad:grid-cols-[320px_minmax(0,8fr)_minmax(0,6fr)_minmax(112px,auto)_72px]">
      <Thumbnail capture={row} className="h-16 w-full desk:row-span-3 desk:h-[72px]" />
      <div className="min-w-0">
        <h2 className="text-head leading-6">
          <a className="text-ink after:absolute after:inset-0" href={address}>
            {row.title}
          </a>
        </h2>
        <p className="narrow hidden truncate text-dense text-soft desk:block">{row.fileName}</p>
        <p className="mt-1 flex flex-wrap gap-1">
          {row.signals.slice(0, MOST_CHIPS).map((signal) => (
            <Chip key={signal.index} circuit={signal.circuit} />
          ))}
          {row.signals.length > MOST_CHIPS && (
            <span className="self-center text-dense text-soft">
              and {row.signals.length - MOST_CHIPS} more
            </span>
          )}
        </p>
      </div>
      <div className="min-w-0 desk:pt-3">
        {row.headline.slice(0, 2).map((line) => (
          <p key={line.signal} className="figures text-dense">
            {line.text}
          </p>
        ))}
        {verdict !== null && (
          <p className="mt-0.5 text-dense">
            <Verdict verdict={verdict.verdict} word={verdict.word} />
          </p>
        )}
        {under && (
          <progress
            className="bar-progress mt-1 max-w-40"
            aria-label="Progress"
            max={1}
            value={row.progress}
          />
        )}
      </div>
      <div className="flex flex-wrap gap-x-3 desk:block desk:pt-3">
        <p className="figures text-caption desk:text-dense">{timeText(row.createdAt, timeZone)}</p>
        <p className="narrow text-caption text-soft desk:text-dense">{row.createdBy.name}</p>
        <p className="figures ml-auto text-caption desk:hidden">
          {row.durationS > 0 && lengthText(row.durationS)}{' '}
          <span className="unit">{marksText(row.marks)}</span>
        </p>
      </div>
      <div className="hidden text-right desk:block desk:pt-3">
        <p className="figures text-dense">{row.durationS > 0 && lengthText(row.durationS)}</p>
        <p className="narrow text-dense text-soft">{marksText(row.marks)}</p>
      </div>
    </li>
  );
}
