import { config } from '../config.ts';

/** With an https origin browsers bind a `__Host-` cookie to this very host and path `/`. Plain http is for loopback only. */
export const secureCookies = (origin = config().origin): boolean => new URL(origin).protocol === 'https:';

export const cookieName = (origin = config().origin): string =>
  secureCookies(origin) ? '__Host-gapmark' : 'gapmark';
