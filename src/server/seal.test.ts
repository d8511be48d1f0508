import { beforeAll, describe, expect, it, vi } from 'vitest';
import { seal, unseal } from './seal.ts';

beforeAll(() => {
  vi.stubEnv('DATABASE_URL', 'postgresql://u:p@127.0.0.1:1/d');
  vi.stubEnv('S3_ACCESS_KEY_ID', 'k');
  vi.stubEnv('S3_SECRET_ACCESS_KEY', 's');
  vi.stubEnv('GAPMARK_SECRET', 'x'.repeat(32));
});

describe('seal()', () => {
  it('gives something else each time, from which unseal() gives the text', () => {
    const [one, two] = [seal('mail', 'Grüße Ω'), seal('mail', 'Grüße Ω')];
    expect(one).not.toBe(two);
    expect([unseal('mail', one), unseal('mail', two)]).toEqual(['Grüße Ω', 'Grüße Ω']);
  });

  it('is noticed when it was changed, and opens for its own purpose only', () => {
    const sealed = seal('mail', 'text');
    const bytes = Buffer.from(sealed, 'base64url');
    bytes[bytes.length - 1] = (bytes.at(-1) ?? 0) ^ 1;
    expect(() => unseal('mail', bytes.toString('base64url'))).toThrow();
    expect(() => unseal('second step', sealed)).toThrow();
    expect(() => unseal('mail', sealed.slice(0, 20))).toThrow();
  });
});
