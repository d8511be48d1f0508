import { describe, expect, it } from 'vitest';
import { hashPassword, inTurn, verifyPassword } from './password.ts';

describe('hashPassword()', () => {
  it('is argon2id with 19 MiB, two passes, one lane and a salt of its own', async () => {
    const [one, two] = await Promise.all([hashPassword('same'), hashPassword('same')]);
    expect(one).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    expect(one).not.toBe(two);
  });
});

describe('verifyPassword()', () => {
  it('is true for the right password only, and never for an account that is not there', async () => {
    const hash = await hashPassword('right');
    expect(await verifyPassword(hash, 'right')).toBe(true);
    expect(await verifyPassword(hash, 'wrong')).toBe(false);
    expect(await verifyPassword(null, 'right')).toBe(false);
    expect(await verifyPassword('none', 'right')).toBe(false);
  });
});

describe('inTurn()', () => {
  it('runs at most two at a time, in order of arrival, and goes on after a failure', async () => {
    let running = 0;
    let most = 0;
    const order: number[] = [];
    const work = (n: number) =>
      inTurn(async () => {
        running += 1;
        most = Math.max(most, running);
        order.push(n);
        await new Promise((resolve) => setTimeout(resolve, 2));
        running -= 1;
        if (n === 1) throw new Error('one fails');
        return n;
      });
    const results = await Promise.allSettled([0, 1, 2, 3, 4, 5].map(work));
    expect(most).toBe(2);
    expect(order).toEqual([0, 1, 2, 3, 4, 5]);
    expect(results.map(({ status }) => status === 'fulfilled')).toEqual([
      true,
      false,
      true,
      true,
      true,
      true,
    ]);
  });
});
