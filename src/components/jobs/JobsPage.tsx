import { useEffect, useRef, useState } from 'react';
import { sentenceOf } from '../base/api.ts';
import { Button, buttonClass } from '../base/Button.tsx';
import { Icon } from '../base/Icon.tsx';
import { Message } from '../base/Message.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { Skeleton } from '../base/Skeleton.tsx';
import { EmptyJobs } from './EmptyJobs.tsx';
import { JobListRow } from './JobListRow.tsx';
import {
  filterQuery,
  hasFilters,
  type JobFilters,
  type JobList,
  NO_FILTERS,
  useJobList,
} from './useJobList.ts';

interface JobsPageProps {
  /** The first page as the server had it; null: ask for it. */
  initial: JobList | null;
  initialFilters: JobFilters;
  timeZone: string;
}

const SETTLE_MS = 250;
const STATES = [
  { value: '', text: 'All' },
  { value: 'open', text: 'Open' },
  { value: 'waiting', text: 'Waiting' },
  { value: 'closed', text: 'Closed' },
] as const;
const WHOSE = [
  { value: '', text: 'Everybody’s' },
  { value: 'me', text: 'Mine' },
] as const;

/** Jobs of the workshop, and the way in for a new one. */
export function JobsPage({ initial, initialFilters, timeZone }: JobsPageProps) {
  const [filters, setFilters] = useState(initialFilters);
  const [typed, setTyped] = useState(initialFilters.search);
  const same = JSON.stringify(filters) === JSON.stringify(initialFilters);
  const list = useJobList(filters, same ? initial : null);
  const rows = list.data?.flatMap((page) => page.items);
  const nothing = rows?.length === 0;

  const change = (next: JobFilters) => {
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

  return (
    <>
      <header className="title-row">
        <h1>Jobs</h1>
        {/* biome-ignore lint/a11y/useSemanticElements: <search> has no implicit role in every browser yet */}
        <div className="relative order-last w-full desk:order-none desk:ml-auto desk:w-80" role="search">
          <span className="pointer-events-none absolute inset-y-0 left-3 grid place-items-center text-soft">
            <Icon name="search" small />
          </span>
          <input
            className="box pl-9"
            type="search"
            aria-label="Search jobs"
            placeholder="Plate, VIN, vehicle, complaint, code, note"
            data-search
            maxLength={200}
            value={typed}
            onChange={(event) => setTyped(event.target.value)}
          />
        </div>
        <div className="title-actions desk:ml-0">
          <a className={buttonClass('main', false, 'hidden desk:inline-flex')} href="/jobs/new">
            <Icon name="plus" />
            New job
          </a>
        </div>
      </header>
      {(!nothing || hasFilters(filters)) && (
        <div className="flex flex-wrap items-center gap-2 border-b border-line bg-ground px-(--margin) py-3">
          <Segmented
            label="State"
            options={STATES}
            value={STATES.find((each) => each.value === filters.state)?.value ?? ''}
            onChange={(state) => change({ ...filters, state })}
          />
          <Segmented
            label="Whose"
            options={WHOSE}
            value={filters.assignee === 'me' ? 'me' : ''}
            onChange={(assignee) => change({ ...filters, assignee })}
          />
          <span className="narrow ml-auto hidden text-soft desk:block">newest first</span>
        </div>
      )}
      <section className="min-w-0 grow" aria-label="List of jobs" aria-busy={list.isLoading}>
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
        {rows === undefined && list.error === undefined && <Skeleton rows={6} label="Loading jobs" />}
        {nothing && !hasFilters(filters) && <EmptyJobs />}
        {nothing && hasFilters(filters) && (
          <div className="grid justify-items-start gap-2 p-(--margin)" role="status">
            <h2 className="text-head">No job fits</h2>
            <p className="text-soft">
              Every word must occur in the vehicle, plate, VIN, complaint, codes, notes, readings or a
              capture’s title.
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
              <JobListRow key={row.id} row={row} timeZone={timeZone} />
            ))}
          </ul>
        )}
        {list.data?.at(-1)?.nextCursor && (
          <div className="p-(--margin)">
            <Button busy={list.isValidating} onClick={() => list.setSize(list.size + 1)}>
              Show more
            </Button>
          </div>
        )}
      </section>
      <div className="thumb-strip">
        <a className={buttonClass('main', false, 'grow')} href="/jobs/new">
          <Icon name="plus" />
          New job
        </a>
      </div>
    </>
  );
}
