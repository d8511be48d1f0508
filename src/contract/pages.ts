import type { EndpointId } from './endpoints.ts';
import type { AccessName } from './roles.ts';

/** Pages and who may open them: a page without a row does not open. `{name}` stands for one path segment. */
export const PAGES = {
  '/': 'open',
  '/sign-in': 'open',
  '/sign-up': 'open',
  '/sign-up/confirm': 'open',
  '/refused': 'open',
  '/404': 'open',
  '/500': 'open',
  '/s/{secret}': 'shareLook',
  '/captures': 'see',
  '/captures/{id}': 'see',
  '/captures/{id}/wheel': 'see',
  '/captures/{id}/turns': 'see',
  '/captures/{id}/spectrum': 'see',
  '/captures/{id}/reading': 'see',
  '/captures/{id}/compare': 'seeStaff',
  '/comparisons/{id}': 'seeStaff',
  '/jobs': 'seeStaff',
  '/library': 'seeStaff',
  '/library/{id}': 'seeStaff',
  '/teaching': 'self',
  '/teaching/exercises/new': 'teach',
  '/teaching/exercises/{id}': 'self',
  '/teaching/exercises/{id}/edit': 'teach',
  '/teaching/exercises/{id}/answers': 'seeTeach',
  '/teaching/sets/new': 'teach',
  '/teaching/sets/{id}': 'self',
  '/teaching/sets/{id}/edit': 'teach',
  '/workshop': 'self',
} as const satisfies Record<string, AccessName>;

/** Pages of one thing: the access door opens it by `{id}` for this endpoint, so the role held in its workshop counts. */
export const PAGE_OPENS: Readonly<Partial<Record<keyof typeof PAGES, EndpointId>>> = {
  '/captures/{id}': 'captures.get',
  '/captures/{id}/wheel': 'captures.get',
  '/captures/{id}/turns': 'captures.get',
  '/captures/{id}/spectrum': 'captures.get',
  '/captures/{id}/reading': 'captures.get',
  '/captures/{id}/compare': 'comparisons.create',
  '/comparisons/{id}': 'comparisons.get',
  '/library/{id}': 'knownGoods.get',
  '/teaching/exercises/{id}': 'exercises.get',
  '/teaching/exercises/{id}/edit': 'exercises.patch',
  '/teaching/exercises/{id}/answers': 'attempts.list',
  '/teaching/sets/{id}': 'sets.get',
  '/teaching/sets/{id}/edit': 'sets.patch',
};
