import type { ActionAPIContext } from 'astro:actions';

/** Where a form came from: its address, and the cookies that its browser holds. */
export const browserOf = ({ clientAddress, request }: ActionAPIContext) => ({
  address: clientAddress,
  cookieHeader: request.headers.get('cookie') ?? undefined,
});

/** A number of days from now as the end date that use cases take. */
export const endAfter = (days: number | undefined): string | undefined =>
  days === undefined ? undefined : new Date(Date.now() + days * 86_400_000).toISOString();
