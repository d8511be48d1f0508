import useSWRInfinite from 'swr/infinite';
import type { JobRowJson } from '../../contract/areas/jobs.ts';
import { fetcher } from '../base/api.ts';

export interface JobFilters {
  readonly search: string;
  /** Empty: all. */
  readonly state: string;
  /** `me`, or empty. */
  readonly assignee: string;
}
export interface JobList {
  readonly items: readonly JobRowJson[];
  readonly nextCursor: string | null;
}

export const NO_FILTERS: JobFilters = { search: '', state: '', assignee: '' };
export const hasFilters = (filters: JobFilters): boolean =>
  Object.values(filters).some((text) => text !== '');

/** The filters as a query, without those that are not set. */
export function filterQuery(filters: JobFilters): URLSearchParams {
  const query = new URLSearchParams();
  for (const [name, text] of Object.entries(filters)) if (text !== '') query.set(name, text);
  return query;
}

/** The filters that a page's address asks for. */
export const filtersOf = (query: URLSearchParams): JobFilters => {
  const state = query.get('state') ?? '';
  return {
    search: (query.get('search') ?? '').slice(0, 200),
    state: ['open', 'waiting', 'closed'].includes(state) ? state : '',
    assignee: query.get('assignee') === 'me' ? 'me' : '',
  };
};

/** Jobs page by page. `initial` spares the first request. */
export function useJobList(filters: JobFilters, initial: JobList | null) {
  const key = (index: number, previous: JobList | null) => {
    if (previous !== null && previous.nextCursor === null) return null;
    const query = filterQuery(filters);
    if (index > 0 && previous?.nextCursor) query.set('cursor', previous.nextCursor);
    return `/jobs?${query}`;
  };
  return useSWRInfinite<JobList, Error>(key, fetcher, {
    ...(initial === null ? {} : { fallbackData: [initial], revalidateOnMount: false }),
    keepPreviousData: true,
    revalidateFirstPage: true,
  });
}
