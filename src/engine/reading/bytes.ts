/** Byte values that the reader looks for; all tables are brought to an encoding in which these are single bytes. */
export const TAB = 9;
export const LF = 10;
export const CR = 13;
export const SPACE = 32;
export const QUOTE = 34;

/** One array with the bytes of both. */
export function joined(a: Uint8Array, b: Uint8Array): Uint8Array {
  if (a.length === 0) return b;
  if (b.length === 0) return a;
  const all = new Uint8Array(a.length + b.length);
  all.set(a);
  all.set(b, a.length);
  return all;
}
