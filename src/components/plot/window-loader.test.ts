import { describe, expect, it, vi } from 'vitest';
import type { ColumnsWindow } from './decode-window.ts';
import { WindowRefused } from './fetch-window.ts';
import type { WindowRequest } from './window-cache.ts';
import { createWindowLoader } from './window-loader.ts';

const whole = { from: 0, to: 100 };

function server() {
  const asked: {
    request: WindowRequest;
    signal: AbortSignal;
    answer: () => void;
    fail: (e: unknown) => void;
  }[] = [];
  const fetchWindow = (request: WindowRequest, signal: AbortSignal) =>
    new Promise<ColumnsWindow>((resolve, reject) => {
      signal.addEventListener('abort', () => reject(new DOMException('aborted', 'AbortError')));
      const window: ColumnsWindow = {
        layout: 'columns',
        from: request.from,
        to: request.to,
        count: request.columns,
        samplesVersion: 1,
        signals: new Map(),
      };
      asked.push({ request, signal, answer: () => resolve(window), fail: reject });
    });
  return { asked, fetchWindow };
}
const settle = () => vi.advanceTimersByTimeAsync(100);

describe('createWindowLoader()', () => {
  it('asks for the whole capture first, then for the finer window of the view', async () => {
    vi.useFakeTimers();
    const { asked, fetchWindow } = server();
    const loader = createWindowLoader(whole, fetchWindow);
    loader.show({ from: 10, to: 12 }, 1000);
    expect(asked).toHaveLength(1);
    expect(asked[0]!.request).toEqual({ from: 0, to: 100, columns: 1000 });
    asked[0]!.answer();
    await settle();
    expect(loader.best({ from: 10, to: 12 }, 1000)?.to).toBe(100);
    expect(asked).toHaveLength(2);
    asked[1]!.answer();
    await settle();
    expect(loader.best({ from: 10, to: 12 }, 1000)?.to).toBeLessThan(20);
    expect(asked).toHaveLength(2);
    loader.close();
    vi.useRealTimers();
  });

  it('gives up a request that the view has left, and keeps one that still serves', async () => {
    vi.useFakeTimers();
    const { asked, fetchWindow } = server();
    const loader = createWindowLoader(whole, fetchWindow);
    loader.show(whole, 1000);
    asked[0]!.answer();
    await settle();
    loader.show({ from: 10, to: 20 }, 1000);
    await settle();
    loader.show({ from: 11, to: 21 }, 1000);
    await settle();
    expect(asked).toHaveLength(2);
    loader.show({ from: 60, to: 70 }, 1000);
    await settle();
    expect(asked[1]!.signal.aborted).toBe(true);
    expect(asked).toHaveLength(3);
    expect(loader.state.get().trouble).toBeNull();
    loader.close();
    vi.useRealTimers();
  });

  it('keeps what is there when the network goes, says so and recovers by itself', async () => {
    vi.useFakeTimers();
    const { asked, fetchWindow } = server();
    const loader = createWindowLoader(whole, fetchWindow);
    loader.show(whole, 1000);
    asked[0]!.answer();
    await settle();
    loader.show({ from: 10, to: 20 }, 1000);
    await settle();
    asked[1]!.fail(new TypeError('network'));
    await settle();
    expect(loader.state.get().trouble).toContain('trying again');
    expect(loader.best({ from: 10, to: 20 }, 1000)).not.toBeNull();
    await vi.advanceTimersByTimeAsync(2000);
    expect(asked).toHaveLength(3);
    asked[2]!.answer();
    await settle();
    expect(loader.state.get().trouble).toBeNull();
    loader.close();
    vi.useRealTimers();
  });

  it('does not ask again what was refused', async () => {
    vi.useFakeTimers();
    const { asked, fetchWindow } = server();
    const loader = createWindowLoader(whole, fetchWindow);
    loader.show(whole, 1000);
    asked[0]!.fail(new WindowRefused(409, 'The samples were read again since.'));
    await vi.advanceTimersByTimeAsync(60_000);
    expect(asked).toHaveLength(1);
    expect(loader.state.get()).toMatchObject({
      refused: true,
      trouble: 'The samples were read again since.',
    });
    loader.close();
    vi.useRealTimers();
  });
});
