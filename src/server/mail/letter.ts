/** A part of a mail: a paragraph, a link on a line of its own, or words that somebody else typed. */
export type Part =
  | string
  | { readonly link: string; readonly label: string }
  | { readonly quote: string }
  | { readonly pictureId: string; readonly alternative: string };

export interface Letter {
  readonly text: string;
  readonly html: string;
}

const ENTITIES: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** What was typed is never markup. */
export const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (one) => ENTITIES[one] ?? one);

const lines = (text: string) => escapeHtml(text).replace(/\r?\n/g, '<br>');

function plain(part: Part): string {
  if (typeof part === 'string') return part;
  if ('link' in part) return `${part.label}:\n${part.link}`;
  if ('quote' in part) return part.quote;
  return `[Picture: ${part.alternative}]`;
}

function markup(part: Part): string {
  if (typeof part === 'string') return `<p>${lines(part)}</p>`;
  if ('link' in part) {
    const address = escapeHtml(part.link);
    return `<p><a href="${address}" style="color:#6B2D5C">${escapeHtml(part.label)}</a><br><small>${address}</small></p>`;
  }
  if ('quote' in part)
    return `<blockquote style="margin:16px 0;padding-left:12px;border-left:4px solid #6B2D5C">${lines(part.quote)}</blockquote>`;
  return `<p><img src="cid:${escapeHtml(part.pictureId)}" alt="${escapeHtml(part.alternative)}" style="max-width:100%"></p>`;
}

/** The two bodies of a mail from the same parts, so that they say the same. */
export function letter(parts: readonly Part[]): Letter {
  return {
    text: `${parts.map(plain).join('\n\n')}\n`,
    html:
      '<!doctype html><html lang="en"><body style="margin:0;padding:24px;background:#F4F1EA;color:#20262B;' +
      'font:16px/24px Archivo,Helvetica,sans-serif"><div style="max-width:560px">' +
      `${parts.map(markup).join('')}</div></body></html>\n`,
  };
}
