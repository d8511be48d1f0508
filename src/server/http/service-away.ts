/** System and PostgreSQL codes that mean: the other side is not there now. */
const AWAY = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'EPIPE',
  'ETIMEDOUT',
  'ENOTFOUND',
  'EAI_AGAIN',
  'EHOSTUNREACH',
  'ENETUNREACH',
  '53300', // too_many_connections
  '57P01', // admin_shutdown
  '57P02', // crash_shutdown
  '57P03', // cannot_connect_now
  '25P03', // idle_in_transaction_session_timeout
]);

/** pg's own words where it gives no code. */
const AWAY_WORDS =
  /connection terminated|timeout exceeded when trying to connect|client has encountered a connection error|query read timeout/i;

/** Whether an error says that the database or the store is away, however deep it is wrapped. */
export function isServiceAway(error: unknown): boolean {
  let cause: unknown = error;
  for (let depth = 0; depth < 6 && cause instanceof Error; depth += 1) {
    const code = 'code' in cause && typeof cause.code === 'string' ? cause.code : '';
    // Class 08 of PostgreSQL's codes: connection exceptions.
    if (AWAY.has(code) || /^08\d/.test(code) || AWAY_WORDS.test(cause.message)) return true;
    if (cause.name === 'TimeoutError' || cause.name === 'SlowDown' || cause.name === 'ServiceUnavailable')
      return true;
    if (cause instanceof AggregateError && cause.errors.some(isServiceAway)) return true;
    cause = cause.cause;
  }
  return false;
}
