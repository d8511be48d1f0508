import { describe, expect, it } from 'vitest';
import { PLAIN_SETUP } from '../plot/lane-setup.ts';
import { addressOf, shownInAddress } from './address.ts';

describe('shownInAddress()', () => {
  it('takes stretch, span, cursor and lanes, and ignores what makes no sense', () => {
    const shown = shownInAddress('?from=0.1&to=0.5&span=0.2,0.3&at=0.25&lanes=2,0-&scales=common', [0, 1, 2]);
    expect(shown.view).toEqual({ from: 0.1, to: 0.5 });
    expect(shown.span).toEqual({ from: 0.2, to: 0.3 });
    expect(shown.cursorS).toBe(0.25);
    expect(shown.setup.order).toEqual([2, 0]);
    expect([...shown.setup.hidden]).toEqual([1]);
    expect([...shown.setup.inverted]).toEqual([0]);
    expect(shown.setup.common).toBe(true);
  });

  it('opens an address from before, with from and to only, and one of signals that are gone', () => {
    expect(shownInAddress('?from=-0.1&to=-0.05', [0])).toMatchObject({ span: null, cursorS: null });
    expect(shownInAddress('?lanes=7,9', [0, 1]).setup).toEqual(PLAIN_SETUP);
    for (const search of ['', '?from=1', '?from=2&to=1', '?from=x&to=y&span=a,b&at=&lanes=,,-'])
      expect(shownInAddress(search, [0])).toEqual({
        view: null,
        span: null,
        cursorS: null,
        setup: PLAIN_SETUP,
      });
  });
});

describe('addressOf()', () => {
  it('gives an address that opens the same again, and keeps other entries', () => {
    const shown = {
      view: { from: 0.123456789, to: 0.5 },
      span: { from: 0.2, to: 0.3 },
      cursorS: 0.25,
      setup: { ...PLAIN_SETUP, order: [1, 0, 2], hidden: new Set([2]), inverted: new Set([0]), common: true },
    };
    const search = addressOf('?set=a', shown, [0, 1, 2]);
    expect(search).toMatch(/^set=a&/);
    expect(shownInAddress(search, [0, 1, 2])).toEqual({ ...shown, setup: { ...shown.setup, order: [1, 0] } });
  });

  it('is empty for plain lanes without a view', () => {
    const plain = { view: null, span: null, cursorS: null, setup: PLAIN_SETUP };
    expect(addressOf('?lanes=1&at=3&scales=common', plain, [0, 1])).toBe('');
  });
});
