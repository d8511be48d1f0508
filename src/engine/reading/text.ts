import type { Encoding } from './types.ts';

/** Windows-1252, bytes 0x80 to 0x9F (WHATWG Encoding standard, index windows-1252). */
const UPPER_CONTROLS =
  '\u20ac\u0081\u201a\u0192\u201e\u2026\u2020\u2021\u02c6\u2030\u0160\u2039\u0152\u008d\u017d\u008f' +
  '\u0090\u2018\u2019\u201c\u201d\u2022\u2013\u2014\u02dc\u2122\u0161\u203a\u0153\u009d\u017e\u0178';

/** The text of some bytes. UTF-16 has been turned into UTF-8 before; a malformed sequence becomes U+FFFD. */
export function decodeText(bytes: Uint8Array, from: number, to: number, encoding: Encoding): string {
  let text = '';
  let i = from;
  while (i < to) {
    const lead = bytes[i++]!;
    if (lead < 0x80) text += String.fromCharCode(lead);
    else if (encoding === 'windows-1252') {
      text += lead < 0xa0 ? UPPER_CONTROLS[lead - 0x80] : String.fromCharCode(lead);
    } else {
      const more =
        lead >= 0xc2 && lead < 0xe0
          ? 1
          : lead >= 0xe0 && lead < 0xf0
            ? 2
            : lead >= 0xf0 && lead < 0xf5
              ? 3
              : 0;
      let code = more === 1 ? lead & 31 : more === 2 ? lead & 15 : lead & 7;
      let taken = 0;
      while (taken < more && i < to && (bytes[i]! & 0xc0) === 0x80) {
        code = (code << 6) | (bytes[i++]! & 63);
        taken++;
      }
      const least = more === 1 ? 0x80 : more === 2 ? 0x800 : 0x10000;
      const good =
        more > 0 && taken === more && code >= least && code <= 0x10ffff && (code < 0xd800 || code > 0xdfff);
      text += good ? String.fromCodePoint(code) : '\ufffd';
    }
  }
  return text;
}
