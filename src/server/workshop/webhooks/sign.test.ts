import { describe, expect, it } from 'vitest';
import { hmacSha256, signature } from './sign.ts';

describe('hmacSha256()', () => {
  // RFC 4231, sections 4.2, 4.3, 4.4 and 4.7: key, data, HMAC-SHA-256.
  it.each([
    [
      '0b'.repeat(20),
      Buffer.from('Hi There').toString('hex'),
      'b0344c61d8db38535ca8afceaf0bf12b881dc200c9833da726e9376c2e32cff7',
    ],
    [
      Buffer.from('Jefe').toString('hex'),
      Buffer.from('what do ya want for nothing?').toString('hex'),
      '5bdcc146bf60754e6a042426089575c75a003f089d2739839dec58b964ec3843',
    ],
    ['aa'.repeat(20), 'dd'.repeat(50), '773ea91e36800e46854db8ebd09181a72959098b3ef8c122d9635514ced565fe'],
    [
      'aa'.repeat(131),
      Buffer.from('Test Using Larger Than Block-Size Key - Hash Key First').toString('hex'),
      '60e431591ee0b67f0d8a26aacbf5b77f8e0bc6213728c5140546040f0ee37f54',
    ],
  ])('agrees with RFC 4231 for the key %s', (key, data, expected) => {
    expect(hmacSha256(Buffer.from(key, 'hex'), Buffer.from(data, 'hex'))).toBe(expected);
  });
});

describe('signature()', () => {
  it('covers the time as well as the body', () => {
    const now = signature('key', 1_700_000_000, '{}');
    expect(now).toBe(`sha256=${hmacSha256('key', '1700000000.{}')}`);
    expect(signature('key', 1_700_000_001, '{}')).not.toBe(now);
    expect(signature('key', 1_700_000_000, '{ }')).not.toBe(now);
  });
});
