// @ts-check
import { closeSync, fsyncSync, openSync, renameSync, writeSync } from 'node:fs';

/**
 * Writes a small file so that a reader, and a start after a power cut, see the old content or the new and nothing between.
 * @param {string} path
 * @param {string} text
 * @param {number} [mode]
 */
export function writeFileAtomically(path, text, mode = 0o600) {
  const temporary = `${path}.${process.pid}.new`;
  const file = openSync(temporary, 'w', mode);
  try {
    writeSync(file, text);
    fsyncSync(file);
  } finally {
    closeSync(file);
  }
  renameSync(temporary, path);
}
