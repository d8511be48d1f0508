import pino from 'pino';

/** Structured lines on standard output. They carry ids and codes: no secrets, names, samples or addresses with secrets. */
export const log = pino({
  name: 'gapmark',
  level: process.env.GAPMARK_LOG_LEVEL ?? 'info',
  base: { pid: process.pid },
});
