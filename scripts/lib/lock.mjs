// @ts-check
import { createHash } from 'node:crypto';
import { statSync } from 'node:fs';
import { createConnection, createServer } from 'node:net';
import { isEnding } from './ending.mjs';

/** @param {string} folder @param {string} purpose */
function socketName(folder, purpose) {
  // Device and inode: one folder reached by two paths is one folder, and a copy of it is another.
  const { dev, ino } = statSync(folder);
  const digest = createHash('sha256').update(`${dev}:${ino}`).digest('hex').slice(0, 24);
  return `\0gapmark-${purpose}-${digest}`;
}

/**
 * Takes a folder for this process alone. The lock is a name in the kernel's abstract socket space: it goes with the
 * process, whatever ends it, so there is never a stale lock to clear away. Source: unix(7), "Abstract sockets".
 * @param {string} folder an existing folder
 * @param {string} purpose
 * @returns {Promise<{ release: () => void } | { holder: string, ending: boolean }>} who holds it, when it is taken, and
 *   whether that process is about to end
 */
export async function lockFolder(folder, purpose) {
  const name = socketName(folder, purpose);
  const server = createServer((socket) => {
    socket.on('error', () => {});
    socket.end(`${process.pid} ${isEnding() ? 'ending' : 'staying'}`);
  });
  const taken = await new Promise((resolve, reject) => {
    server.once('error', (error) => {
      if ('code' in error && error.code === 'EADDRINUSE') resolve(true);
      else reject(error);
    });
    server.listen(name, () => resolve(false));
  });
  if (taken) return askHolder(name);
  server.unref();
  return { release: () => server.close() };
}

/** @param {string} name @returns {Promise<{ holder: string, ending: boolean }>} */
function askHolder(name) {
  return new Promise((resolve) => {
    let text = '';
    const socket = createConnection(name);
    socket.setTimeout(1_000, () => socket.destroy());
    socket.on('data', (data) => {
      text += String(data);
    });
    socket.on('error', () => {});
    socket.on('close', () => {
      const [pid = '', state] = text.split(' ');
      resolve({ holder: pid === '' ? 'another process' : `process ${pid}`, ending: state === 'ending' });
    });
  });
}
