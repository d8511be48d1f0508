import { describe, expect, it } from 'vitest';
import { Fresh } from './fresh.ts';

describe('Fresh.get()', () => {
  it('never answers from a look-up that began before it was asked', async () => {
    const fresh = new Fresh<number>();
    let now = 0;
    let release: () => void = () => {};
    const slow = fresh.get('a', () => {
      const seen = now;
      return new Promise((resolve) => {
        release = () => resolve(seen);
      });
    });
    now = 1;
    const later = Promise.all([1, 2, 3].map(() => fresh.get('a', async () => now)));
    release();
    expect(await slow).toBe(0);
    expect(await later).toEqual([1, 1, 1]);
  });

  it('asks once for all who came while another look-up ran', async () => {
    const fresh = new Fresh<number>();
    let looks = 0;
    const look = async () => {
      looks += 1;
      await new Promise((resolve) => setTimeout(resolve, 5));
      return looks;
    };
    await Promise.all(Array.from({ length: 50 }, () => fresh.get('a', look)));
    expect(looks).toBe(2);
  });

  it('looks again after a failure', async () => {
    const fresh = new Fresh<number>();
    await expect(fresh.get('a', () => Promise.reject(new Error('away')))).rejects.toThrow('away');
    expect(await fresh.get('a', async () => 5)).toBe(5);
  });
});
