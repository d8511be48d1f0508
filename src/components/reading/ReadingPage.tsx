import { useState } from 'react';
import useSWR from 'swr';
import type { z } from 'zod';
import type { preview } from '../../contract/areas/captures.ts';
import { fetcher, sentenceOf } from '../base/api.ts';
import { Button, buttonClass } from '../base/Button.tsx';
import { Message } from '../base/Message.tsx';
import { bytesText, grouped, lengthText, timeText } from '../base/numbers.ts';
import { Progress } from '../base/Progress.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { Skeleton } from '../base/Skeleton.tsx';
import { isUnderWay } from '../captures/words.ts';
import { type CapturePatch, changeCapture } from '../upload/change-capture.ts';
import { rejectedWords, stepWords } from '../upload/understood.ts';
import { useCapture } from '../upload/useCapture.ts';
import { ColumnRow } from './ColumnRow.tsx';
import { columnNamesOf } from './column-names.ts';
import { PreviewLines } from './PreviewLines.tsx';
import { ReadingControls } from './ReadingControls.tsx';

type Preview = z.infer<typeof preview>;

const CYLINDERS = ['3', '4', '5', '6', '8', '10', '12', 'unknown'] as const;
const PHASE_WORDS: Readonly<Record<string, string>> = {
  queued: 'Waits its turn',
  reading: 'Reading rows',
  measuring: 'Measuring',
};

/** How a file was understood, in the open, and where it is corrected. The original never changes. */
export function ReadingPage({ id, timeZone }: { id: string; timeZone: string }) {
  const { data: seen, error, mutate } = useCapture(id);
  const revision = seen?.data.revision;
  const settled = seen !== undefined && seen.data.status !== 'queued' && seen.data.status !== 'reading';
  const rows = useSWR<Preview, Error>(
    revision === undefined ? null : [`/captures/${id}/preview`, revision, settled],
    ([path]: [string]) => fetcher<Preview>(path),
    { keepPreviousData: true },
  );
  const [acting, setActing] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);

  if (seen === undefined) {
    if (error === undefined) return <Skeleton rows={5} label="Loading how the file was read" />;
    return (
      <div className="p-(--margin)">
        <h1 className="sr-only">How it was read</h1>
        <Message verdict="bad" live="alert" title="This capture did not open" happened={sentenceOf(error)} />
      </div>
    );
  }
  const capture = seen.data;
  const { reading } = capture;
  const underWay = isUnderWay(capture.status);
  const change = async (patch: CapturePatch) => {
    setActing(true);
    setTrouble(null);
    try {
      await mutate(await changeCapture(seen, patch), { revalidate: true });
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    }
    setActing(false);
  };
  const names = columnNamesOf(rows.data?.lines ?? [], capture.signals);
  const read = new Set(capture.signals.map((signal) => signal.column));
  const leftOut = names
    .map((name, column) => ({ name, column }))
    .filter(({ column }) => column !== reading?.timeColumn && !read.has(column));
  const readColumns = (columns: number[]) => change({ reading: { columns: columns.sort((a, b) => a - b) } });
  const rejected = reading === null ? null : rejectedWords(reading);
  const cells: [string, string][] = [
    ['Received', timeText(capture.createdAt, timeZone)],
    ['Size', bytesText(capture.bytes)],
    [
      'Rows',
      reading === null ? 'none' : `${grouped(reading.rows)}, ${grouped(reading.rejectedCount)} rejected`,
    ],
    ['Step', stepWords(capture)],
    ['Length', capture.durationS > 0 ? lengthText(capture.durationS) : 'none'],
    ['Original', `kept as it came, sha ${capture.sha256.slice(0, 4)}…${capture.sha256.slice(-4)}`],
  ];

  return (
    <>
      <header>
        <div className="title-row">
          <h1>{capture.title}</h1>
          <p className="title-aside">how it was read</p>
          <div className="title-actions">
            {(capture.status === 'failed' || capture.status === 'cancelled') && (
              <Button busy={acting} onClick={() => change({ reading: {} })}>
                Read again
              </Button>
            )}
            {capture.samplesVersion > 0 && (
              <a className={buttonClass('main')} href={`/captures/${id}`}>
                Right, open the trace
              </a>
            )}
          </div>
        </div>
        <dl className="cells">
          {cells.map(([label, value]) => (
            <div key={label} className="cell">
              <dt>{label}</dt>
              <dd className="figures">{value}</dd>
            </div>
          ))}
        </dl>
      </header>
      <div className="grid gap-3 px-(--margin) pt-3 empty:hidden">
        {underWay && (
          <Progress
            label={PHASE_WORDS[capture.status] ?? 'Under way'}
            {...(capture.status === 'queued' ? {} : { value: capture.progress })}
            figure={capture.status === 'queued' ? '' : `${Math.floor(capture.progress * 100)} %`}
          />
        )}
        {capture.status === 'failed' && (
          <Message
            verdict="bad"
            live="alert"
            title={
              capture.error?.line
                ? `Line ${capture.error.line} stopped it`
                : 'This file could not be read as it stands'
            }
            happened={capture.error?.message}
            kept={`The file as it came, ${bytesText(capture.bytes)}.`}
            todo={capture.error?.hint}
          />
        )}
        {trouble !== null && (
          <Message verdict="bad" live="alert" title="That did not work" happened={trouble} />
        )}
      </div>
      <div className="grid border-b border-line panel:grid-cols-[minmax(0,3fr)_minmax(360px,2fr)]">
        <section className="min-w-0 panel:border-r panel:border-rule" aria-labelledby="rows-title">
          <div className="panel-head">
            <h2 id="rows-title">First rows, as they came</h2>
            <p className="narrow text-dense text-soft">tap a line’s number to make it the names</p>
          </div>
          {rows.data === undefined ? (
            <p className="px-(--margin) pb-4 text-soft">
              {rows.error === undefined ? 'Loading the rows …' : sentenceOf(rows.error)}
            </p>
          ) : (
            <PreviewLines
              lines={rows.data.lines}
              reading={reading}
              signals={capture.signals}
              disabled={acting || underWay}
              onNames={(headerLine) => change({ reading: { headerLine } })}
            />
          )}
          {rejected !== null && <p className="px-(--margin) py-3 text-dense">{rejected}</p>}
          {reading?.remarks.map((remark) => (
            <p key={remark} className="px-(--margin) pb-2 text-dense text-soft">
              {remark}
            </p>
          ))}
        </section>
        <section aria-labelledby="understood-title">
          <div className="panel-head">
            <h2 id="understood-title">Understood as</h2>
            <p className="narrow text-dense text-soft">correct what is wrong, it is read again at once</p>
          </div>
          <ReadingControls
            capture={capture}
            columnNames={names}
            disabled={acting || underWay}
            onChange={(patch) => change({ reading: patch })}
          />
        </section>
      </div>
      <section aria-labelledby="columns-title">
        <div className="panel-head">
          <h2 id="columns-title">Columns and their circuits</h2>
          <p className="narrow text-dense text-soft">
            {capture.signals.length} {capture.signals.length === 1 ? 'signal' : 'signals'}. A factor changes
            the reading, never the samples.
          </p>
        </div>
        <ul className="border-t border-rule">
          {capture.signals.map((signal) => (
            <ColumnRow
              key={signal.column}
              capture={capture}
              signal={signal}
              disabled={acting || underWay}
              onChange={(next) => change({ signals: [{ column: signal.column, ...next }] })}
              onLeaveOut={
                capture.signals.length > 1
                  ? () => readColumns([...read].filter((column) => column !== signal.column))
                  : null
              }
            />
          ))}
        </ul>
        {leftOut.length > 0 && (
          <p className="flex flex-wrap items-center gap-2 px-(--margin) py-3">
            <span className="text-soft">Left out:</span>
            {leftOut.map(({ name, column }) => (
              <Button
                key={column}
                small
                icon="plus"
                disabled={acting || underWay}
                onClick={() => readColumns([...read, column])}
              >
                {name || `column ${column}`}
              </Button>
            ))}
          </p>
        )}
        <div className="flex flex-wrap items-center gap-3 px-(--margin) py-4">
          <span className="font-semibold">Cylinders</span>
          <div className="max-w-full overflow-x-auto">
            <Segmented
              label="Cylinders"
              value={CYLINDERS.find((count) => count === String(capture.cylinders)) ?? 'unknown'}
              options={CYLINDERS.map((count) => ({ value: count, text: count }))}
              onChange={(count) => change({ cylinders: count === 'unknown' ? null : Number(count) })}
            />
          </div>
          <p className="narrow ml-auto text-dense text-soft">You can leave. What you corrected is kept.</p>
        </div>
      </section>
    </>
  );
}
