// @ts-check
import { createServer } from 'node:net';

/**
 * @param {number} port 0 for any
 * @param {string} host
 * @returns {Promise<{ port: number } | { code: string }>} the port that could be taken, or the system's reason
 */
export function tryPort(port, host = '127.0.0.1') {
  return new Promise((resolve) => {
    const server = createServer();
    server.once('error', (error) => resolve({ code: 'code' in error ? String(error.code) : 'UNKNOWN' }));
    server.listen({ port, host, exclusive: true }, () => {
      const address = server.address();
      const given = typeof address === 'object' && address ? address.port : port;
      server.close(() => resolve({ port: given }));
    });
  });
}

/** A port of this machine that nothing listens on now. @returns {Promise<number>} */
export async function freePort(host = '127.0.0.1') {
  const found = await tryPort(0, host);
  if ('port' in found) return found.port;
  throw new Error(`No free port on ${host} (${found.code}).`);
}
