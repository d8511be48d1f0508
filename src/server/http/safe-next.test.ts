import { describe, expect, it } from 'vitest';
import { safeNext } from './safe-next.ts';

describe('safeNext()', () => {
  it('keeps a path of our own with query and fragment', () => {
    expect(safeNext('/captures/abc?from=1#marks')).toBe('/captures/abc?from=1#marks');
  });

  it.each([
    undefined,
    null,
    '',
    'captures',
    'https://evil.example',
    '//evil.example',
    '/\\evil.example',
    '/\t/evil.example',
    'javascript:alert(1)',
    '/..//evil.example/../\\',
  ])('gives the captures for %j', (next) => {
    expect(safeNext(next)).toBe('/captures');
  });

  it('never gives a path that a browser reads as another site', () => {
    for (const next of ['/.//evil.example', '/a/..//evil.example'])
      expect(new URL(safeNext(next), 'https://gapmark.example').origin).toBe('https://gapmark.example');
  });
});
