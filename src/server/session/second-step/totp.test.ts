import { describe, expect, it } from 'vitest';
import { newTotpKey, stepOfCode, totpAddress, totpCode } from './totp.ts';

/** RFC 4648 base32 of an ASCII text, written for the test. */
function base32(text: string): string {
  const bits = [...Buffer.from(text, 'ascii')].map((byte) => byte.toString(2).padStart(8, '0')).join('');
  const groups = bits.match(/.{1,5}/g) ?? [];
  return groups
    .map((group) => 'ABCDEFGHIJKLMNOPQRSTUVWXYZ234567'[Number.parseInt(group.padEnd(5, '0'), 2)])
    .join('');
}

const SEED = '1234567890';
const KEYS = {
  SHA1: base32(SEED.repeat(2)),
  SHA256: base32(`${SEED.repeat(3)}12`),
  SHA512: base32(`${SEED.repeat(6)}1234`),
};

/** RFC 6238, appendix B: time in seconds, then the eight digits for SHA-1, SHA-256, SHA-512. Source: the RFC's table. */
const VECTORS = [
  [59, '94287082', '46119246', '90693936'],
  [1111111109, '07081804', '68084774', '25091201'],
  [1111111111, '14050471', '67062674', '99943326'],
  [1234567890, '89005924', '91819424', '93441116'],
  [2000000000, '69279037', '90698825', '38618901'],
  [20000000000, '65353130', '77737706', '47863826'],
] as const;

describe('totpCode()', () => {
  it.each(VECTORS)('gives the codes of RFC 6238 at %i s', (seconds, sha1, sha256, sha512) => {
    const at = (algorithm: keyof typeof KEYS) =>
      totpCode(KEYS[algorithm], seconds * 1000, { algorithm, digits: 8 });
    expect([at('SHA1'), at('SHA256'), at('SHA512')]).toEqual([sha1, sha256, sha512]);
  });

  it('gives the last six of those digits as the code that people type', () => {
    expect(totpCode(KEYS.SHA1, 59_000)).toBe('287082');
  });
});

describe('stepOfCode()', () => {
  it('knows the code of this step, the one before and the one after, and no others', () => {
    const at = 1_111_111_111_000;
    const step = Math.floor(at / 30_000);
    for (const off of [-1, 0, 1])
      expect(stepOfCode(KEYS.SHA1, totpCode(KEYS.SHA1, at + off * 30_000), at)).toBe(step + off);
    for (const off of [-2, 2, 40])
      expect(stepOfCode(KEYS.SHA1, totpCode(KEYS.SHA1, at + off * 30_000), at)).toBeNull();
  });

  it('takes six digits only', () => {
    for (const code of ['', '28708', '2870820', '28708a', '٢٨٧٠٨٢'])
      expect(stepOfCode(KEYS.SHA1, code, 59_000)).toBeNull();
  });
});

describe('newTotpKey()', () => {
  it('is 160 bits in base32, another one each time', () => {
    expect(newTotpKey()).toMatch(/^[A-Z2-7]{32}$/);
    expect(newTotpKey()).not.toBe(newTotpKey());
  });
});

describe('totpAddress()', () => {
  it('names the product, the account and the key', () => {
    const address = new URL(totpAddress(KEYS.SHA1, 'ada@people.example'));
    expect(address.protocol).toBe('otpauth:');
    expect(address.searchParams.get('secret')).toBe(KEYS.SHA1);
    expect(address.searchParams.get('issuer')).toBe('Gapmark');
    expect(decodeURIComponent(address.pathname)).toContain('ada@people.example');
  });
});
