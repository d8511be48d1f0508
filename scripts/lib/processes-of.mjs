// @ts-check
import { readdirSync, readFileSync, readlinkSync } from 'node:fs';

/**
 * Processes that have to do with this folder: named in their arguments or their environment, or working in it.
 * @param {string} folder
 * @returns {number[]} process ids, this one not among them
 */
export function processesOf(folder) {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name) && Number(name) !== process.pid)
    .filter((name) => {
      try {
        if (/^\S+ \(.*\) [ZX]/s.test(readFileSync(`/proc/${name}/stat`, 'utf8'))) return false;
        return (
          readFileSync(`/proc/${name}/cmdline`, 'utf8').includes(folder) ||
          readFileSync(`/proc/${name}/environ`, 'utf8').includes(folder) ||
          readlinkSync(`/proc/${name}/cwd`).startsWith(folder)
        );
      } catch {
        return false; // ended meanwhile, or not ours to read
      }
    })
    .map(Number);
}
