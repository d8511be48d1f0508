import { type DecodedWindow, decodeWindow } from './decode-window.ts';
import type { WindowRequest } from './window-cache.ts';

/** The samples were read again, the link has ended, the capture is gone: asking again does not help. */
export class WindowRefused extends Error {
  override name = 'WindowRefused';
  constructor(
    readonly status: number,
    message: string,
  ) {
    super(message);
  }
}

export type FetchWindow = (request: WindowRequest, abort: AbortSignal) => Promise<DecodedWindow>;

/** Windows of one capture or link. With `samplesVersion` the browser may keep the answers for good. */
export function windowFetcher(address: string, samplesVersion: number | null): FetchWindow {
  return async ({ from, to, columns }, abort) => {
    const query = new URLSearchParams({ from: String(from), to: String(to), columns: String(columns) });
    if (samplesVersion !== null) query.set('v', String(samplesVersion));
    const response = await fetch(`${address}?${query}`, { signal: abort });
    if (!response.ok) {
      const words = await messageOf(response);
      if (response.status < 500 && response.status !== 429) throw new WindowRefused(response.status, words);
      throw new Error(words);
    }
    return decodeWindow(response.headers, await response.arrayBuffer());
  };
}

async function messageOf(response: Response): Promise<string> {
  try {
    const body: unknown = await response.json();
    if (typeof body === 'object' && body !== null && 'error' in body) {
      const { error } = body;
      if (typeof error === 'object' && error !== null && 'message' in error) return String(error.message);
    }
  } catch {
    // not JSON: the status has to do
  }
  return `The samples could not be had (${response.status}).`;
}
