import type { SignalRequest } from '../db/schema.ts';

/** What people asked for, by file column: a later request wins field by field, columns it does not name stay as they were. */
export function mergeSignalRequests(
  earlier: readonly SignalRequest[],
  later: readonly SignalRequest[],
): SignalRequest[] {
  const merged = new Map(earlier.map((request) => [request.column, request]));
  for (const request of later) merged.set(request.column, { ...merged.get(request.column), ...request });
  return [...merged.values()].sort((a, b) => a.column - b.column);
}
