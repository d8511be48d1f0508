import { describe, expect, it } from 'vitest';
import { columnS, decodeWindow, WindowFormatError } from './decode-window.ts';

const headers = (over: Record<string, string> = {}) =>
  new Headers({
    'Gapmark-Layout': 'columns',
    'Gapmark-Count': '2',
    'Gapmark-Signals': '0,3',
    'Gapmark-From': '-0.5',
    'Gapmark-To': '1.5',
    'Gapmark-Samples-Version': '7',
    ...over,
  });

describe('decodeWindow()', () => {
  it('gives four values a column for each signal in the order of the header', () => {
    const body = Float32Array.from([1, 2, 3, 4, 5, 6, 7, 8, -1, -2, -3, -4, -5, -6, -7, -8]).buffer;
    const window = decodeWindow(headers(), body);
    expect(window.layout).toBe('columns');
    expect([...window.signals.keys()]).toEqual([0, 3]);
    expect([...window.signals.get(0)!]).toEqual([1, 2, 3, 4, 5, 6, 7, 8]);
    expect([...window.signals.get(3)!].slice(4)).toEqual([-5, -6, -7, -8]);
    expect(columnS(window)).toBe(1);
    expect(window.samplesVersion).toBe(7);
  });

  it('lays even samples at start + i * step and keeps holes as NaN', () => {
    const body = Float32Array.from([1, Number.NaN, 3]).buffer;
    const window = decodeWindow(
      headers({
        'Gapmark-Layout': 'samples',
        'Gapmark-Axis': 'even',
        'Gapmark-Count': '3',
        'Gapmark-Signals': '0',
        'Gapmark-Start': '0.25',
        'Gapmark-Step': '0.5',
      }),
      body,
    );
    if (window.layout !== 'samples') throw new Error('expected samples');
    expect([...window.times]).toEqual([0.25, 0.75, 1.25]);
    expect([...window.signals.get(0)!]).toEqual([1, Number.NaN, 3]);
    expect(columnS(window)).toBe(0);
  });

  it('reads the float64 times of an uneven axis before the values and tells steps that hold', () => {
    const body = new ArrayBuffer(2 * 8 + 2 * 4);
    new Float64Array(body, 0, 2).set([0.1, 0.7]);
    new Float32Array(body, 16, 2).set([0, 1]);
    const window = decodeWindow(
      headers({ 'Gapmark-Layout': 'samples', 'Gapmark-Axis': 'holds', 'Gapmark-Signals': '4' }),
      body,
    );
    if (window.layout !== 'samples') throw new Error('expected samples');
    expect([...window.times]).toEqual([0.1, 0.7]);
    expect([...window.signals.get(4)!]).toEqual([0, 1]);
    expect(window.holds).toBe(true);
  });

  it('takes an empty window', () => {
    const window = decodeWindow(
      headers({ 'Gapmark-Layout': 'samples', 'Gapmark-Axis': 'even', 'Gapmark-Count': '0' }),
      new ArrayBuffer(0),
    );
    expect(window.count).toBe(0);
  });

  it('refuses a body of another length, a missing header and an unknown layout', () => {
    expect(() => decodeWindow(headers(), new ArrayBuffer(12))).toThrow(WindowFormatError);
    const missing = headers();
    missing.delete('Gapmark-From');
    expect(() => decodeWindow(missing, new ArrayBuffer(64))).toThrow(/Gapmark-From/);
    expect(() => decodeWindow(headers({ 'Gapmark-Layout': 'rows' }), new ArrayBuffer(64))).toThrow(/rows/);
  });
});
