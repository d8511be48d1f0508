import useSWRInfinite from 'swr/infinite';
import type { CaptureRowJson } from '../../contract/areas/captures.ts';
import { fetcher } from '../base/api.ts';
import { isUnderWay } from './words.ts';

export interface CaptureFilters {
  readonly search: string;
  readonly circuit: string;
  readonly status: string;
}
export interface CaptureList {
  readonly items: readonly CaptureRowJson[];
  readonly nextCursor: string | null;
}

export const NO_FILTERS: CaptureFilters = { search: '', circuit: '', status: '' };
export const hasFilters = (filters: CaptureFilters): boolean =>
  Object.values(filters).some((text) => text !== '');

/** The filters as a query, without those that are not set. */
export function filterQuery(filters: CaptureFilters): URLSearchParams {
  const query = new URLSearchParams();
  for (const [name, text] of Object.entries(filters)) if (text !== '') query.set(name, text);
  return query;
}

/** The filters that a page's address asks for. */
export const filtersOf = (query: URLSearchParams): CaptureFilters => ({
  search: query.get('search') ?? '',
  circuit: query.get('circuit') ?? '',
  status: query.get('status') ?? '',
});

const WATCH_MS = 2_500;

const isWatched = (page: CaptureList) => page.items.some((row) => isUnderWay(row.status));

/** Captures page by page; asked for again while one of them is read or measured. `initial` spares the first request. */
export function useCaptureList(filters: CaptureFilters, initial: CaptureList | null) {
  const key = (index: number, previous: CaptureList | null) => {
    if (previous !== null && previous.nextCursor === null) return null;
    const query = filterQuery(filters);
    if (index > 0 && previous?.nextCursor) query.set('cursor', previous.nextCursor);
    return `/captures?${query}`;
  };
  return useSWRInfinite<CaptureList, Error>(key, fetcher, {
    ...(initial === null ? {} : { fallbackData: [initial], revalidateOnMount: false }),
    keepPreviousData: true,
    revalidateFirstPage: true,
    // Before the first answer SWR knows nothing of the page that came with the document.
    refreshInterval: (pages) =>
      (pages ?? (initial === null ? [] : [initial])).some(isWatched) ? WATCH_MS : 0,
  });
}
