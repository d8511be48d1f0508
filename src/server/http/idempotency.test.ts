import { describe, expect, it } from 'vitest';
import { canonicalJson, hashMultipart } from './idempotency.ts';

describe('canonicalJson()', () => {
  it('gives the same text for the same content in any order, at any depth', () => {
    const a = { b: [1, { y: null, x: 'ü' }], a: true };
    const b = { a: true, b: [1, { x: 'ü', y: null }] };
    expect(canonicalJson(a)).toBe(canonicalJson(b));
    expect(JSON.parse(canonicalJson(a))).toEqual(a);
  });

  it('keeps the order of lists and tells numbers from texts', () => {
    expect(canonicalJson([1, 2])).not.toBe(canonicalJson([2, 1]));
    expect(canonicalJson({ a: 1 })).not.toBe(canonicalJson({ a: '1' }));
  });
});

describe('hashMultipart()', () => {
  it('does not depend on the order in which fields arrived, and does on each file', () => {
    const one = hashMultipart({ title: 't', jobId: 'j' }, { file: 'aa' });
    expect(hashMultipart({ jobId: 'j', title: 't' }, { file: 'aa' })).toBe(one);
    expect(hashMultipart({ title: 't', jobId: 'j' }, { file: 'ab' })).not.toBe(one);
  });
});
