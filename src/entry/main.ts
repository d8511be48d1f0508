import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { config } from '../server/config.ts';
import { closeDatabase } from '../server/db/client.ts';
import { log } from '../server/log.ts';
import { queue, stopQueue } from '../server/queue/boss.ts';
import { closeStore } from '../server/storage/client.ts';
import { ensureBucket } from '../server/storage/ensure-bucket.ts';
import { handle } from './handle.ts';
import { staticFiles } from './static-files.ts';
import { tus } from './tus/tus-server.ts';

/** The web process. It keeps no state: any number of them run beside each other. */
type AstroHandler = (
  request: IncomingMessage,
  response: ServerResponse,
  next: (error?: unknown) => void,
  locals: object,
) => void;

/** The built pages lie beside this program: dist/entry/main.js, dist/server/entry.mjs, dist/client. */
const pages: { handler: AstroHandler } = await import(new URL('../server/entry.mjs', import.meta.url).href);
const serveStatic = staticFiles(fileURLToPath(new URL('../client', import.meta.url)));

const server = createServer(
  {
    // A slow Wi-Fi may need long for a large file; one that sends no headers is not waited for.
    requestTimeout: 60 * 60_000,
    headersTimeout: 20_000,
    keepAliveTimeout: 65_000,
    maxHeaderSize: 32 * 1024,
    connectionsCheckingInterval: 5_000,
  },
  (request, response) => {
    handle(
      request,
      response,
      (requestId) => {
        pages.handler(
          request,
          response,
          (error) => {
            if (error !== undefined) log.error({ err: error, requestId }, 'a page failed');
            if (!response.headersSent) response.writeHead(error === undefined ? 404 : 500);
            response.end();
          },
          { requestId },
        );
      },
      serveStatic,
    );
  },
);
server.maxRequestsPerSocket = 0;

let stopping = false;

/** Takes nothing new, lets what runs finish, and ends within ten seconds. */
async function stop(name: string): Promise<void> {
  if (stopping) return;
  stopping = true;
  log.info({ signal: name }, 'web process stops');
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  server.closeIdleConnections();
  const idle = setInterval(() => server.closeIdleConnections(), 200);
  await Promise.race([closed, sleep(7_000)]);
  clearInterval(idle);
  server.closeAllConnections();
  await Promise.race([
    Promise.allSettled([tus().locker.close(), stopQueue(), closeDatabase()]),
    sleep(2_000),
  ]);
  closeStore();
  process.exit(0);
}

for (const name of ['SIGTERM', 'SIGINT'] as const) process.on(name, () => void stop(name));

/** What the services need once. They may still be coming up, or be away: requests then get 503 and it is tried again. */
async function prepare(): Promise<void> {
  while (!stopping) {
    try {
      await ensureBucket();
      await queue();
      return;
    } catch (error) {
      log.warn({ err: error }, 'waiting for the database or the store');
      await sleep(1_000);
    }
  }
}

server.listen(config().port, config().host, () => {
  log.info({ address: server.address() }, 'web process listens');
});
await prepare();
