import { describe, expect, it } from 'vitest';
import { isPassing, refusal } from './refusal.ts';

describe('refusal()', () => {
  it("tells the server's own sentence and hint", () => {
    const body = JSON.stringify({
      error: { code: 'too_large', message: 'Over 2 GiB.', hint: 'Send a part.' },
    });
    expect(refusal(413, body)).toEqual({ happened: 'Over 2 GiB.', todo: 'Send a part.' });
  });
  it('has words of its own for an answer that is no JSON', () => {
    expect(refusal(413, '<html>').happened).toBe('The file is larger than this server takes.');
    expect(refusal(418, '').happened).toContain('418');
  });
});

describe('isPassing()', () => {
  it('holds for a lost line and a server that is away, not for a refusal', () => {
    expect([0, 503, 429, 423].every(isPassing)).toBe(true);
    expect([400, 401, 403, 404, 413].some(isPassing)).toBe(false);
  });
});
