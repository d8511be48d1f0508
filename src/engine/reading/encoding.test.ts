import fc from 'fast-check';
import { expect, test } from 'vitest';
import { detectEncoding } from './encoding.ts';
import { decodeText } from './text.ts';
import { Utf16ToUtf8 } from './utf16.ts';

const utf16 = (text: string, littleEndian: boolean) =>
  Uint8Array.from(
    [...Array(text.length).keys()].flatMap((i) => {
      const unit = text.charCodeAt(i);
      return littleEndian ? [unit & 255, unit >> 8] : [unit >> 8, unit & 255];
    }),
  );

test('detectEncoding() knows UTF-16 without a mark from its zero bytes', () => {
  expect(detectEncoding(utf16('Time;Volt\r\n0;1\r\n', true)).encoding).toBe('utf-16le');
  expect(detectEncoding(utf16('Time;Volt\r\n0;1\r\n', false)).encoding).toBe('utf-16be');
});

test('detectEncoding() takes bytes that are not UTF-8 for Windows-1252', () => {
  expect(detectEncoding(Uint8Array.of(0x5a, 0xb5, 0x73)).encoding).toBe('windows-1252');
  expect(detectEncoding(new TextEncoder().encode('Zeit (µs)')).encoding).toBe('utf-8');
});

test('Utf16ToUtf8 gives the same bytes wherever the chunks are cut', () => {
  fc.assert(
    fc.property(
      fc.string({ unit: 'binary' }),
      fc.boolean(),
      fc.array(fc.nat(60)),
      (text, littleEndian, cuts) => {
        const bytes = utf16(text, littleEndian);
        const stream = new Utf16ToUtf8(littleEndian);
        const places = [0, ...cuts.map((c) => Math.min(c, bytes.length)).sort((a, b) => a - b), bytes.length];
        const parts = places.slice(1).map((to, i) => stream.push(bytes.subarray(places[i], to)));
        const all = parts.concat(stream.end()).flatMap((part) => [...part]);
        expect(all).toEqual([...new TextEncoder().encode(text)]);
        expect(decodeText(Uint8Array.from(all), 0, all.length, 'utf-8')).toBe(text);
      },
    ),
  );
});

test('decodeText() follows the index of Windows-1252 (WHATWG Encoding standard)', () => {
  const bytes = Uint8Array.of(0x80, 0x96, 0x99, 0x9f, 0xb5, 0xb0, 0xe9, 0x41);
  expect(decodeText(bytes, 0, bytes.length, 'windows-1252')).toBe('€–™Ÿµ°éA');
});

test('decodeText() marks malformed UTF-8 and goes on', () => {
  const bytes = Uint8Array.of(0x41, 0xff, 0x42, 0xc3, 0x43, 0xed, 0xa0, 0x80, 0xe2, 0x82);
  expect(decodeText(bytes, 0, bytes.length, 'utf-8')).toBe('A\ufffdB\ufffdC\ufffd\ufffd');
});
