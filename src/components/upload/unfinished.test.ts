import { describe, expect, it } from 'vitest';
import { unfinishedUploads } from './unfinished.ts';

const storageOf = (entries: Record<string, string>) => {
  const keys = Object.keys(entries);
  return {
    length: keys.length,
    key: (i: number) => keys[i] ?? null,
    getItem: (key: string) => entries[key] ?? null,
  };
};
const entry = (filename: string, creationTime: string, size: number | null) =>
  JSON.stringify({ metadata: { filename }, creationTime, size, uploadUrl: '/api/v1/uploads/x' });

describe('unfinishedUploads()', () => {
  it('lists what this browser began, newest first', () => {
    const storage = storageOf({
      'tus::a::1': entry('old.csv', 'Thu May 14 2026 10:00:00 GMT+0000', 10),
      'tus::b::2': entry('new.csv', 'Thu May 14 2026 11:00:00 GMT+0000', null),
      other: 'x',
    });
    expect(unfinishedUploads(storage).map((each) => [each.fileName, each.bytes])).toEqual([
      ['new.csv', null],
      ['old.csv', 10],
    ]);
  });
  it('passes over entries that cannot be read', () => {
    expect(unfinishedUploads(storageOf({ 'tus::a::1': '{', 'tus::b::2': '{"metadata":{}}' }))).toEqual([]);
    expect(unfinishedUploads(storageOf({ 'tus::c::3': entry('x.csv', 'not a time', 1) }))).toEqual([]);
  });
});
