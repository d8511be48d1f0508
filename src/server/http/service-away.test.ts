import { describe, expect, it } from 'vitest';
import { isServiceAway } from './service-away.ts';

const coded = (code: string, message = 'x') => Object.assign(new Error(message), { code });

describe('isServiceAway()', () => {
  it('sees a lost connection however deep it is wrapped', () => {
    expect(isServiceAway(new Error('query failed', { cause: coded('ECONNREFUSED') }))).toBe(true);
    expect(isServiceAway(new AggregateError([coded('ECONNREFUSED')]))).toBe(true);
    expect(isServiceAway(coded('57P01'))).toBe(true);
    expect(isServiceAway(coded('08006'))).toBe(true);
    expect(isServiceAway(new Error('Connection terminated unexpectedly'))).toBe(true);
  });

  it('does not take a fault of ours for one', () => {
    expect(isServiceAway(coded('23505'))).toBe(false);
    expect(isServiceAway(new TypeError('x is undefined'))).toBe(false);
    expect(isServiceAway('away')).toBe(false);
  });
});
