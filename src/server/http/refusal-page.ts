import type { ApiError } from '../errors.ts';

const ENTITIES: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (character) => ENTITIES[character] ?? '');

/**
 * A refusal as a bare page, for when the product's own page cannot be used: a refused form must not be handed on, since Astro
 * runs a form's action before it draws any page.
 */
export function refusalPage(error: ApiError): Response {
  const hint = error.hint === undefined ? '' : `<p>${escapeHtml(error.hint)}</p>`;
  const body =
    `<!doctype html><html lang="en"><meta charset="utf-8"><meta name="viewport" content="width=device-width">` +
    `<title>Gapmark</title><main><h1>${escapeHtml(error.message)}</h1>${hint}<p><a href="/">Gapmark</a></p></main></html>`;
  const headers: Record<string, string> = {
    'Content-Type': 'text/html; charset=utf-8',
    'Cache-Control': 'no-store',
    'Content-Security-Policy':
      "default-src 'none'; frame-ancestors 'none'; base-uri 'none'; form-action 'none'",
  };
  if (error.retryAfterS !== undefined)
    headers['Retry-After'] = String(Math.max(1, Math.ceil(error.retryAfterS)));
  return new Response(body, { status: error.status, headers });
}
