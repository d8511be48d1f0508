import type { ActionAPIContext } from 'astro:actions';
import { type Browser, browserOfRequest } from '../server/session/browser.ts';

/** Where a form came from. */
export const browserOf = ({ clientAddress, request }: ActionAPIContext): Browser =>
  browserOfRequest(request, clientAddress);

/** A number of days from now as the end date that use cases take. */
export const endAfter = (days: number | undefined): string | undefined =>
  days === undefined ? undefined : new Date(Date.now() + days * 86_400_000).toISOString();
