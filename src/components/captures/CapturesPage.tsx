import { useEffect, useRef, useState } from 'react';
import { sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Icon } from '../base/Icon.tsx';
import { Message } from '../base/Message.tsx';
import { Skeleton } from '../base/Skeleton.tsx';
import { SamplePicker } from '../upload/SamplePicker.tsx';
import { UploadPanel } from '../upload/UploadPanel.tsx';
import { useFileDrop } from '../upload/useFileDrop.ts';
import { useUploads } from '../upload/useUploads.ts';
import { CaptureFiltersBar } from './CaptureFiltersBar.tsx';
import { CaptureListRow } from './CaptureListRow.tsx';
import { EmptyCaptures } from './EmptyCaptures.tsx';
import {
  type CaptureFilters,
  type CaptureList,
  filterQuery,
  hasFilters,
  NO_FILTERS,
  useCaptureList,
} from './useCaptureList.ts';

interface CapturesPageProps {
  /** The first page as the server had it; null: ask for it. */
  initial: CaptureList | null;
  initialFilters: CaptureFilters;
  timeZone: string;
}

const SETTLE_MS = 250;

/** Captures of the workshop, and the way in for new ones. */
export function CapturesPage({ initial, initialFilters, timeZone }: CapturesPageProps) {
  const [filters, setFilters] = useState(initialFilters);
  const [typed, setTyped] = useState(initialFilters.search);
  const [samplesOpen, setSamplesOpen] = useState(false);
  const picker = useRef<HTMLInputElement>(null);
  const uploads = useUploads();
  const addFiles = (files: readonly File[]) => uploads.add(files.map((file) => ({ file })));
  const over = useFileDrop(addFiles);
  const same = JSON.stringify(filters) === JSON.stringify(initialFilters);
  const list = useCaptureList(filters, same ? initial : null);
  const rows = list.data?.flatMap((page) => page.items);
  const last = list.data?.at(-1);

  const change = (next: CaptureFilters) => {
    setFilters(next);
    const query = filterQuery(next).toString();
    history.replaceState(null, '', query === '' ? location.pathname : `?${query}`);
  };
  const changeRef = useRef(change);
  changeRef.current = change;
  useEffect(() => {
    if (typed.trim() === filters.search) return;
    const timer = setTimeout(() => changeRef.current({ ...filters, search: typed.trim() }), SETTLE_MS);
    return () => clearTimeout(timer);
  }, [typed, filters]);

  const addRef = useRef(addFiles);
  addRef.current = addFiles;
  // Files that were chosen before this page's script was there are not lost.
  useEffect(() => {
    const input = picker.current;
    if (!input?.files?.length) return;
    addRef.current([...input.files]);
    input.value = '';
  }, []);

  const choose = () => picker.current?.click();
  const nothing = rows?.length === 0;
  return (
    <>
      <header className="title-row">
        <h1>Captures</h1>
        {/* biome-ignore lint/a11y/useSemanticElements: <search> has no implicit role in every browser yet */}
        <div className="relative order-last w-full desk:order-none desk:ml-auto desk:w-72" role="search">
          <span className="pointer-events-none absolute inset-y-0 left-3 grid place-items-center text-soft">
            <Icon name="search" small />
          </span>
          <input
            className="box pl-9"
            type="search"
            aria-label="Search captures by title"
            placeholder="Title"
            data-search
            maxLength={200}
            value={typed}
            onChange={(event) => setTyped(event.target.value)}
          />
        </div>
        <div className="title-actions desk:ml-0">
          <Button kind="main" icon="upload" className="hidden desk:inline-flex" onClick={choose}>
            Add a capture
          </Button>
        </div>
        <input
          ref={picker}
          className="hidden"
          type="file"
          multiple
          accept=".csv,.txt,.tsv,.dat,.log,text/csv,text/plain,text/tab-separated-values"
          aria-label="Choose files"
          tabIndex={-1}
          onChange={(event) => {
            addFiles([...(event.target.files ?? [])]);
            event.target.value = '';
          }}
        />
      </header>
      <div className="grid grow content-start panel:grid-cols-[minmax(0,1fr)_348px] panel:content-stretch">
        <section
          className="order-2 min-w-0 panel:order-1"
          aria-label="List of captures"
          aria-busy={list.isLoading}
        >
          {(!nothing || hasFilters(filters)) && <CaptureFiltersBar filters={filters} onChange={change} />}
          {list.error !== undefined && (
            <div className="p-(--margin)">
              <Message
                verdict="bad"
                live="alert"
                title="The list did not come"
                happened={sentenceOf(list.error)}
                kept="Everything in it."
                actions={
                  <Button small onClick={() => list.mutate()}>
                    Try again
                  </Button>
                }
              />
            </div>
          )}
          {rows === undefined && list.error === undefined && <Skeleton rows={6} label="Loading captures" />}
          {nothing && !hasFilters(filters) && uploads.items.length === 0 && (
            <EmptyCaptures onSample={() => setSamplesOpen(true)} />
          )}
          {nothing && hasFilters(filters) && (
            <div className="grid justify-items-start gap-2 p-(--margin)" role="status">
              <h2 className="text-head">No capture fits</h2>
              <p className="text-soft">
                Search looks in titles. Try fewer letters, or another circuit or state.
              </p>
              <Button
                small
                onClick={() => {
                  setTyped('');
                  change(NO_FILTERS);
                }}
              >
                Show all
              </Button>
            </div>
          )}
          {rows !== undefined && rows.length > 0 && (
            <ul>
              {rows.map((row) => (
                <CaptureListRow key={row.id} row={row} timeZone={timeZone} />
              ))}
            </ul>
          )}
          {last?.nextCursor && (
            <div className="p-(--margin)">
              <Button busy={list.isValidating} onClick={() => list.setSize(list.size + 1)}>
                Show more
              </Button>
            </div>
          )}
        </section>
        <aside
          className="order-1 px-(--margin) panel:order-2 panel:border-l panel:border-rule panel:px-5 panel:pt-4"
          aria-label="Add captures"
        >
          <div className="desk:max-panel:pt-4">
            <UploadPanel
              uploads={uploads}
              over={over}
              onChoose={choose}
              onSample={() => setSamplesOpen(true)}
              onChange={() => list.mutate()}
            />
          </div>
        </aside>
      </div>
      <div className="thumb-strip">
        <Button onClick={() => setSamplesOpen(true)}>Sample</Button>
        <Button kind="main" icon="upload" className="grow" onClick={choose}>
          Add a file
        </Button>
      </div>
      <SamplePicker
        open={samplesOpen}
        onClose={() => setSamplesOpen(false)}
        onChosen={(file) => uploads.add([file])}
      />
    </>
  );
}
