// @ts-check

/**
 * An object's key as a path below its bucket's folder, and back. `a/b` and `a` may both be objects, so an object's file
 * ends with `=` and a folder does not; every byte outside A-Z a-z 0-9 _ - is escaped as %XX, which makes `.` and `..`,
 * empty segments and any alphabet safe; a segment longer than a file name may be goes on in a folder ending with `+`.
 */

/** Up to 60 bytes, escaped or not: 180 characters at most, and never half an escape. */
const NAMES = /(?:%..|[^%]){1,60}/g;

/** @param {string} key */
export function pathOfKey(key) {
  const pieces = key.split('/').map((segment) => {
    const escaped = escapeBytes(Buffer.from(segment));
    const parts = escaped.match(NAMES) ?? [''];
    return parts.map((part, i) => (i < parts.length - 1 ? `${part}+` : part));
  });
  const names = pieces.flatMap((parts, i) =>
    parts.map((part, j) => (i < pieces.length - 1 && j === parts.length - 1 ? `${part}~` : part)),
  );
  return `${names.join('/')}=`;
}

/**
 * What one name in a folder adds to the key so far.
 * @param {string} name
 * @returns {{ text: string, folder: boolean }} `text` escaped, with `/` at the end of a segment
 */
export function partOfName(name) {
  const body = name.slice(0, -1);
  if (name.endsWith('=')) return { text: body, folder: false };
  return { text: name.endsWith('~') ? `${body}/` : body, folder: true };
}

/** @param {string} escaped */
export function keyOfEscaped(escaped) {
  const bytes = escaped.replace(/%([0-9A-F]{2})/g, (_, hex) => String.fromCharCode(Number.parseInt(hex, 16)));
  return Buffer.from(bytes, 'latin1').toString('utf8');
}

/** @param {Buffer} bytes */
function escapeBytes(bytes) {
  let text = '';
  for (const byte of bytes) {
    const char = String.fromCharCode(byte);
    text += /[A-Za-z0-9_-]/.test(char) ? char : `%${byte.toString(16).toUpperCase().padStart(2, '0')}`;
  }
  return text;
}
