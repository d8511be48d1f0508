import { describe, expect, it } from 'vitest';
import { reduceUploads } from './reduce-uploads.ts';

const file = (size: number) => new File(['x'.repeat(size)], 'kw.csv');
const added = (size = 10) => reduceUploads([], { type: 'add', files: [{ key: 'a', file: file(size) }] });

describe('reduceUploads()', () => {
  it('refuses an empty file at once, in words, without sending it', () => {
    expect(added(0)[0]).toMatchObject({ phase: 'refused', happened: 'The file is empty.' });
  });
  it('leaves a file waiting until it is started', () => {
    expect(added()[0]!.phase).toBe('waiting');
    expect(reduceUploads(added(), { type: 'start', key: 'a' })[0]!.phase).toBe('sending');
  });
  it('keeps what was sent when the line is lost, and forgets the reason when it goes on', () => {
    let items = reduceUploads(reduceUploads(added(), { type: 'start', key: 'a' }), {
      type: 'sent',
      key: 'a',
      bytes: 6,
    });
    items = reduceUploads(items, {
      type: 'paused',
      key: 'a',
      happened: 'No connection.',
      since: '2026-05-14T10:02:00Z',
    });
    expect(items[0]).toMatchObject({ phase: 'paused', sentBytes: 6, happened: 'No connection.' });
    expect(reduceUploads(items, { type: 'start', key: 'a' })[0]).toMatchObject({
      happened: null,
      since: null,
    });
  });
  it('never counts past the file', () => {
    expect(reduceUploads(added(), { type: 'sent', key: 'a', bytes: 99 })[0]!.sentBytes).toBe(10);
  });
  it('touches no other file', () => {
    const two = reduceUploads(added(), { type: 'add', files: [{ key: 'b', file: file(3) }] });
    const after = reduceUploads(two, { type: 'received', key: 'b', captureId: 'c1' });
    expect(after[0]).toBe(two[0]);
    expect(reduceUploads(after, { type: 'remove', key: 'b' })).toEqual([two[0]]);
  });
});
