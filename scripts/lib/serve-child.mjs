// @ts-check

/** Open connections get this long to finish before they are cut. */
const LAST_WAIT_MS = 5_000;

/**
 * The inside of a service process: opens its servers on the ports named in SERVICE_PORTS (JSON; missing or 0: any), tells
 * the parent which ones it got, and ends when told to, or when the parent is gone.
 * @param {(ports: Record<string, number>) => Promise<Record<string, import('node:net').Server>>} open
 */
export async function serveChild(open) {
  const servers = await open(JSON.parse(process.env.SERVICE_PORTS ?? '{}'));
  const ports = Object.fromEntries(
    Object.entries(servers).map(([name, server]) => {
      const address = server.address();
      return [name, typeof address === 'object' && address ? address.port : 0];
    }),
  );
  const end = () => {
    let open = Object.keys(servers).length;
    for (const server of Object.values(servers)) {
      server.close(() => {
        open -= 1;
        if (open === 0) process.exit(0);
      });
      if ('closeIdleConnections' in server && typeof server.closeIdleConnections === 'function')
        server.closeIdleConnections();
    }
    setTimeout(() => process.exit(0), LAST_WAIT_MS).unref();
  };
  process.once('SIGTERM', end);
  process.once('SIGINT', end);
  // Killed outright, the parent cannot stop us; the channel closing tells.
  process.once('disconnect', end);
  process.send?.({ ports });
}
