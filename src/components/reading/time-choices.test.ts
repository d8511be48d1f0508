import { describe, expect, it } from 'vitest';
import { timeChoices } from './time-choices.ts';

describe('timeChoices()', () => {
  it('says what the other unit would mean for length and rate', () => {
    const [taken, other] = timeChoices({ durationS: 50, sampleRateHz: 40_000 }, 'ms');
    expect(taken).toEqual({ unit: 'ms', durationS: 50, rateHz: 40_000 });
    expect(other).toEqual({ unit: 's', durationS: 50_000, rateHz: 40 });
  });
  it('gives no rate where there is none, and nothing for a time of day or no length', () => {
    expect(timeChoices({ durationS: 1, sampleRateHz: null }, 's')[1]!.rateHz).toBeNull();
    expect(timeChoices({ durationS: 1, sampleRateHz: 1 }, 'clock')).toEqual([]);
    expect(timeChoices({ durationS: 0, sampleRateHz: 1 }, 's')).toEqual([]);
  });
});
