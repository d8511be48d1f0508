import { config } from '../config.ts';

/** Pages and API of share links: nothing stays in caches, search engines or other sites' logs. */
const isShared = (pathname: string) => /^\/(s|api\/v1\/shared)\//.test(pathname);

const isApi = (pathname: string) => pathname.startsWith('/api/');

/**
 * Headers of every answer, files and refusals included. The page's own Content-Security-Policy comes from Astro, with the
 * hashes of its scripts; answers that are not pages get one that allows nothing.
 */
export function securityHeaders(pathname: string): Record<string, string> {
  const shared = isShared(pathname);
  return {
    'X-Content-Type-Options': 'nosniff',
    'Referrer-Policy': shared ? 'no-referrer' : 'same-origin',
    'Permissions-Policy':
      'accelerometer=(), camera=(), display-capture=(), geolocation=(), gyroscope=(), hid=(), microphone=(), midi=(), ' +
      'payment=(), serial=(), usb=()',
    'Cross-Origin-Opener-Policy': 'same-origin',
    'Cross-Origin-Resource-Policy': 'same-origin',
    ...(shared ? { 'Cache-Control': 'no-store', 'X-Robots-Tag': 'noindex, nofollow' } : {}),
    ...(isApi(pathname) ? { 'Content-Security-Policy': "default-src 'none'; frame-ancestors 'none'" } : {}),
    ...(config().origin.startsWith('https:') ? { 'Strict-Transport-Security': 'max-age=31536000' } : {}),
  };
}
