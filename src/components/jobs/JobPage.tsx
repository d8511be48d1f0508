import { useRef, useState } from 'react';
import type { JobJson, PhotoJson, TimelineItemJson } from '../../contract/areas/jobs.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button, buttonClass } from '../base/Button.tsx';
import { Message } from '../base/Message.tsx';
import { UndoBar } from '../base/UndoBar.tsx';
import { PathOfChecks } from '../path/PathOfChecks.tsx';
import { UploadRow } from '../upload/UploadRow.tsx';
import { useUploads } from '../upload/useUploads.ts';
import { CaptionDialog } from './CaptionDialog.tsx';
import { DeletedJob } from './DeletedJob.tsx';
import { DeleteJobDialog } from './DeleteJobDialog.tsx';
import { EditJobDialog } from './EditJobDialog.tsx';
import { EntryDialog } from './EntryDialog.tsx';
import { JobHead } from './JobHead.tsx';
import { LinkCaptureDialog } from './LinkCaptureDialog.tsx';
import { OutcomePanel } from './OutcomePanel.tsx';
import { PhotoQueueList } from './PhotoQueueList.tsx';
import { TimelineItem } from './TimelineItem.tsx';
import { useJob } from './useJob.ts';
import { usePhotoQueue } from './usePhotoQueue.ts';
import { WorksOnIt } from './WorksOnIt.tsx';
import { jobName } from './words.ts';

interface JobPageProps {
  job: JobJson;
  items: readonly TimelineItemJson[];
  people: readonly { readonly id: string; readonly name: string }[];
  personId: string;
  timeZone: string;
  mayDelete: boolean;
}

type Open =
  | { readonly kind: 'note' | 'reading' | 'edit' | 'delete' | 'link' | 'deleted' }
  | { readonly kind: 'caption'; readonly photo: PhotoJson }
  | null;

/** A job: complaint and vehicle on top, the path of checks, everything in order of time, the outcome beside it. */
export function JobPage({
  job: first,
  items: firstItems,
  people,
  personId,
  timeZone,
  mayDelete,
}: JobPageProps) {
  const { job, items, put, reload } = useJob(first, firstItems);
  const [open, setOpen] = useState<Open>(null);
  const [undo, setUndo] = useState<{ text: string; run: () => Promise<unknown> } | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const uploads = useUploads();
  const photos = usePhotoQueue(job.id, reload);
  const filePicker = useRef<HTMLInputElement>(null);
  const photoPicker = useRef<HTMLInputElement>(null);
  const close = () => setOpen(null);
  const done = () => {
    setOpen(null);
    void reload();
  };

  const takeAway = async (item: TimelineItemJson) => {
    setTrouble(null);
    const [text, gone, back] = wayOut(item, job.id);
    try {
      await gone();
      setUndo({ text, run: back });
      await reload();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    }
  };
  const bringBack = () => {
    const run = undo?.run;
    setUndo(null);
    run?.().then(reload, (thrown: unknown) => setTrouble(sentenceOf(thrown)));
  };
  if (open?.kind === 'deleted') return <DeletedJob id={job.id} name={jobName(job.number)} onBack={done} />;

  const add = (
    <>
      <Button icon="plus" onClick={() => setOpen({ kind: 'note' })}>
        Note
      </Button>
      <Button onClick={() => setOpen({ kind: 'reading' })}>Reading</Button>
      <Button onClick={() => photoPicker.current?.click()}>Photo</Button>
    </>
  );
  return (
    <>
      <JobHead job={job} timeZone={timeZone}>
        <Button onClick={() => setOpen({ kind: 'edit' })}>Edit</Button>
        <a className={buttonClass()} href={`/api/v1/jobs/${job.id}/report?for=colleague`}>
          Report
        </a>
        <Button
          kind="main"
          icon="upload"
          className="hidden desk:inline-flex"
          onClick={() => filePicker.current?.click()}
        >
          Add a capture
        </Button>
      </JobHead>
      <input
        ref={filePicker}
        className="hidden"
        type="file"
        multiple
        accept=".csv,.txt,.tsv,.dat,.log,text/csv,text/plain,text/tab-separated-values"
        aria-label="Choose captures"
        tabIndex={-1}
        onChange={(event) => {
          uploads.add([...(event.target.files ?? [])].map((file) => ({ file, jobId: job.id })));
          event.target.value = '';
        }}
      />
      <input
        ref={photoPicker}
        className="hidden"
        type="file"
        multiple
        accept="image/jpeg,image/png,image/webp"
        aria-label="Choose photos"
        tabIndex={-1}
        onChange={(event) => {
          photos.add([...(event.target.files ?? [])]);
          event.target.value = '';
        }}
      />
      <div className="grid grow content-start panel:grid-cols-[minmax(0,1fr)_348px] panel:content-stretch">
        <div className="min-w-0">
          <PathOfChecks jobId={job.id} closed={job.state === 'closed'} />
          <section aria-labelledby="timeline">
            <div className="panel-head border-b border-line bg-ground">
              <h2 id="timeline">What happened, in order</h2>
              <div className="ml-auto hidden flex-wrap gap-2 desk:flex">
                {add}
                <Button onClick={() => setOpen({ kind: 'link' })}>Take in a capture</Button>
              </div>
            </div>
            {trouble !== null && (
              <div className="p-(--margin)">
                <Message verdict="bad" live="alert" title="That did not work" happened={trouble} />
              </div>
            )}
            {uploads.items.length > 0 && (
              <ul aria-label="Files on their way" className="px-(--margin)">
                {uploads.items.map((item) => (
                  <UploadRow key={item.key} item={item} uploads={uploads} onChange={reload} />
                ))}
              </ul>
            )}
            <PhotoQueueList queue={photos} />
            <ol>
              {items.map((item) => (
                <TimelineItem
                  key={keyOf(item)}
                  item={item}
                  timeZone={timeZone}
                  onTakeAway={takeAway}
                  onCaption={(each) =>
                    each.type === 'photo' && setOpen({ kind: 'caption', photo: each.photo })
                  }
                />
              ))}
            </ol>
          </section>
        </div>
        <aside className="min-w-0 panel:border-l panel:border-rule" aria-label="Outcome and who works on it">
          <OutcomePanel job={job} personId={personId} timeZone={timeZone} onChanged={put} onStale={reload} />
          <WorksOnIt job={job} people={people} onChanged={put} onStale={reload} />
          <section aria-labelledby="reports" className="grid gap-2 border-b border-rule px-(--margin) py-4">
            <h2 id="reports" className="text-head">
              Report
            </h2>
            <ReportLinks id={job.id} whom="customer" text="For the customer, in plain words" />
            <ReportLinks id={job.id} whom="colleague" text="For a colleague, all numbers" />
          </section>
          {mayDelete && (
            <p className="px-(--margin) py-3">
              <Button icon="bin" small onClick={() => setOpen({ kind: 'delete' })}>
                Delete the job
              </Button>
            </p>
          )}
        </aside>
      </div>
      <div className="thumb-strip">
        {add}
        <Button kind="main" icon="upload" className="grow" onClick={() => filePicker.current?.click()}>
          Capture
        </Button>
      </div>
      {(open?.kind === 'note' || open?.kind === 'reading') && (
        <EntryDialog jobId={job.id} personId={personId} kind={open.kind} onClose={close} onSaved={done} />
      )}
      {open?.kind === 'edit' && (
        <EditJobDialog
          job={job}
          onClose={close}
          onSaved={(changed) => {
            put(changed);
            close();
          }}
          onStale={reload}
        />
      )}
      {open?.kind === 'delete' && (
        <DeleteJobDialog job={job} onClose={close} onDeleted={() => setOpen({ kind: 'deleted' })} />
      )}
      {open?.kind === 'link' && (
        <LinkCaptureDialog jobId={job.id} timeZone={timeZone} onClose={close} onLinked={done} />
      )}
      {open?.kind === 'caption' && <CaptionDialog photo={open.photo} onClose={close} onSaved={done} />}
      {undo !== null && <UndoBar text={undo.text} onUndo={bringBack} onGone={() => setUndo(null)} />}
    </>
  );
}

function ReportLinks({ id, whom, text }: { id: string; whom: 'customer' | 'colleague'; text: string }) {
  const address = `/api/v1/jobs/${id}/report?for=${whom}`;
  return (
    <p className="flex flex-wrap items-center gap-x-3">
      <span className="grow">{text}</span>
      <a href={address}>Read</a>
      <a href={`${address}&format=pdf`}>PDF</a>
    </p>
  );
}

const keyOf = (item: TimelineItemJson): string =>
  item.type === 'entry' ? item.entry.id : item.type === 'photo' ? item.photo.id : item.capture.id;

type WayOut = readonly [text: string, gone: () => Promise<unknown>, back: () => Promise<unknown>];

/** How a line is taken away and brought back; a capture only leaves the job. */
function wayOut(item: TimelineItemJson, jobId: string): WayOut {
  if (item.type === 'capture') {
    const path = `/captures/${item.capture.id}`;
    return [
      'The capture left the job',
      () => api(path, { method: 'PATCH', body: { jobId: null } }),
      () => api(path, { method: 'PATCH', body: { jobId } }),
    ];
  }
  const [name, path, etag] =
    item.type === 'photo'
      ? ['The photo', `/photos/${item.photo.id}`, item.photo.etag]
      : ['The note', `/job-entries/${item.entry.id}`, item.entry.etag];
  return [
    `${name} is taken away`,
    () => api(path, { method: 'DELETE', etag }),
    () => api(`${path}/restore`, { method: 'POST' }),
  ];
}
