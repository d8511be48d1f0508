// @ts-check
import { styleHash } from './mailbox.mjs';

/** @typedef {import('./mailbox.mjs').Mail} Mail */

const STYLE = `
:root { color-scheme: light dark; font: 16px/1.5 system-ui, sans-serif; }
body { max-width: 60rem; margin: 0 auto; padding: 1rem; }
ul { list-style: none; padding: 0; }
li a { display: block; padding: .75rem; border-top: 1px solid #8886; text-decoration: none; color: inherit; }
li a:hover { background: #8882; }
small, dt { opacity: .75; }
dl { display: grid; grid-template-columns: max-content 1fr; gap: .25rem 1rem; }
dd { margin: 0; overflow-wrap: anywhere; }
pre { white-space: pre-wrap; overflow-wrap: anywhere; font: inherit; }
iframe { width: 100%; min-height: 30rem; border: 1px solid #8886; background: #fff; }
`;

/** What a page of the catcher may do: its own style, and the framed message. */
export const PAGE_POLICY = `default-src 'none'; style-src ${styleHash(STYLE)}; frame-src 'self'; base-uri 'none'; form-action 'none'`;

/** What a message may do: look like something. No scripts, no forms, nothing from elsewhere. */
export const MESSAGE_POLICY = "sandbox; default-src 'none'; style-src 'unsafe-inline'; img-src data:";

/** @param {string} text */
function escapeHtml(text) {
  return text.replace(/[&<>"']/g, (c) => `&#${c.charCodeAt(0)};`);
}

/** @param {string} title @param {string} body */
function page(title, body) {
  return `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width">
<title>${escapeHtml(title)}</title><style>${STYLE}</style></head><body><main>${body}</main></body></html>`;
}

/** @param {Mail[]} mails */
export function listPage(mails) {
  const rows = mails.map(
    (mail) =>
      `<li><a href="/messages/${mail.id}"><strong>${escapeHtml(mail.subject || '(no subject)')}</strong><br>` +
      `<small>to ${escapeHtml(mail.to.join(', '))} · ${escapeHtml(mail.received)}</small></a></li>`,
  );
  const list =
    rows.length > 0 ? `<ul>${rows.join('')}</ul>` : '<p>Nothing yet. What this copy sends shows up here.</p>';
  return page('Caught mail', `<h1>Caught mail</h1><p>Nothing here left this machine.</p>${list}`);
}

/** @param {Mail} mail */
export function messagePage(mail) {
  const html =
    mail.html === null
      ? ''
      : `<h2>As HTML</h2><iframe sandbox title="The message as HTML" src="/messages/${mail.id}/html"></iframe>`;
  return page(
    mail.subject || '(no subject)',
    `<p><a href="/">All caught mail</a></p><h1>${escapeHtml(mail.subject || '(no subject)')}</h1>
<dl><dt>From</dt><dd>${escapeHtml(mail.from)}</dd><dt>To</dt><dd>${escapeHtml(mail.to.join(', '))}</dd><dt>Received</dt><dd>${escapeHtml(mail.received)}</dd></dl>
<pre>${linked(escapeHtml(mail.text))}</pre>${html}`,
  );
}

/** Addresses become links, so that a confirmation can be followed. @param {string} escaped */
function linked(escaped) {
  return escaped.replace(
    /https?:\/\/[^\s<>&]+(?:&#38;[^\s<>&]+)*/g,
    (url) => `<a href="${url}" rel="noreferrer">${url}</a>`,
  );
}
