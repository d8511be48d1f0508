import type { AccessName } from './roles.ts';

/** Pages and who may open them: a page without a row does not open. `{name}` stands for one path segment. */
export const PAGES = {
  '/': 'open',
  '/sign-in': 'open',
  '/sign-up': 'open',
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
  '/workshop': 'self',
} as const satisfies Record<string, AccessName>;
