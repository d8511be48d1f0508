import type { ReactNode } from 'react';
import type { TimelineItemJson } from '../../contract/areas/jobs.ts';
import { Chip } from '../base/Chip.tsx';
import { Icon } from '../base/Icon.tsx';
import { timeText } from '../base/numbers.ts';
import { Verdict } from '../base/Verdict.tsx';
import { Thumbnail } from '../captures/Thumbnail.tsx';
import { rowVerdict } from '../captures/words.ts';

interface TimelineItemProps {
  item: TimelineItemJson;
  timeZone: string;
  onTakeAway: (item: TimelineItemJson) => void;
  onCaption: (item: TimelineItemJson) => void;
}

const MOST_CHIPS = 4;

/** One line of a job's timeline: a note, a reading, a photo, a capture, or what happened to the job. */
export function TimelineItem({ item, timeZone, onTakeAway, onCaption }: TimelineItemProps) {
  if (item.type === 'entry' && item.entry.kind === 'event') {
    return (
      <li className="flex flex-wrap gap-x-3 border-b border-rule px-(--margin) py-2 text-dense text-soft">
        <span className="figures">{timeText(item.at, timeZone)}</span>
        <span className="min-w-0 break-words">
          {item.entry.text}, by {item.entry.by}
        </span>
      </li>
    );
  }
  const takeAway = (name: string) => (
    <button
      type="button"
      className="button button-icon border-transparent"
      aria-label={name}
      onClick={() => onTakeAway(item)}
    >
      <Icon name={item.type === 'capture' ? 'cross' : 'bin'} small />
    </button>
  );
  if (item.type === 'entry') {
    const { entry } = item;
    return (
      <Row at={item.at} timeZone={timeZone} by={entry.by} action={takeAway('Take this away')}>
        {entry.kind === 'reading' && (
          <p className="flex flex-wrap items-baseline gap-x-3">
            <span className="min-w-0 break-words">{entry.what}</span>
            <span className="figures text-head font-semibold">
              {entry.value} <span className="unit">{entry.unit}</span>
            </span>
          </p>
        )}
        {entry.text !== '' && <p className="max-w-[72ch] break-words whitespace-pre-line">{entry.text}</p>}
      </Row>
    );
  }
  if (item.type === 'photo') {
    const { photo } = item;
    const address = `/api/v1/photos/${photo.id}/image`;
    const caption = photo.caption || 'Photo without a caption';
    return (
      <Row at={item.at} timeZone={timeZone} by={photo.by} action={takeAway('Take this photo away')}>
        <a href={address} className="inline-block max-w-full">
          <img
            className="block max-h-48 w-auto max-w-full border border-rule"
            src={`${address}?size=small`}
            width={photo.width}
            height={photo.height}
            loading="lazy"
            alt={caption}
          />
        </a>
        <p className="mt-1 flex flex-wrap items-center gap-2 text-dense">
          <span className={`min-w-0 break-words ${photo.caption === '' ? 'text-soft' : ''}`}>{caption}</span>
          <button type="button" className="button button-quiet" onClick={() => onCaption(item)}>
            {photo.caption === '' ? 'Say what it shows' : 'Change'}
          </button>
        </p>
      </Row>
    );
  }
  const { capture } = item;
  const verdict = rowVerdict(capture);
  return (
    <Row
      at={item.at}
      timeZone={timeZone}
      by={capture.createdBy.name}
      action={takeAway('Take this capture out of the job')}
    >
      <a href={`/captures/${capture.id}`} className="block text-ink">
        <Thumbnail capture={capture} width={320} className="h-20 w-full max-w-160" />
        <span className="mt-1 block font-semibold break-words">{capture.title}</span>
      </a>
      <p className="mt-1 flex flex-wrap gap-1">
        {capture.signals.slice(0, MOST_CHIPS).map((signal) => (
          <Chip key={signal.index} circuit={signal.circuit} />
        ))}
      </p>
      {capture.headline.slice(0, 3).map((line) => (
        <p key={line.signal} className="figures text-dense">
          {line.text}
        </p>
      ))}
      {verdict !== null && (
        <p className="text-dense">
          <Verdict verdict={verdict.verdict} word={verdict.word} />
        </p>
      )}
    </Row>
  );
}

interface RowProps {
  at: string;
  timeZone: string;
  by: string;
  action: ReactNode;
  children: ReactNode;
}

function Row({ at, timeZone, by, action, children }: RowProps) {
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_auto] gap-x-3 border-b border-rule px-(--margin) py-3">
      <div className="min-w-0">
        <p className="narrow flex flex-wrap gap-x-3 text-caption text-soft">
          <span className="figures">{timeText(at, timeZone)}</span>
          <span>{by}</span>
        </p>
        {children}
      </div>
      {action}
    </li>
  );
}
