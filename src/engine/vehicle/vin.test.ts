import { describe, expect, it } from 'vitest';
import { vinCheckDigit, vinWarning } from './vin.ts';

/** Worked examples as published: 49 CFR part 565 and NHTSA's outline of the check digit. */
const PUBLISHED = [
  ['1G4AH59H45G118341', '4'],
  ['1J9RP1A36A1644345', '6'],
  ['1FACP45EXLF192944', 'X'],
] as const;

describe('vinCheckDigit()', () => {
  it.each(PUBLISHED)('gives the published digit of %s', (vin, digit) => {
    expect(vinCheckDigit(vin)).toBe(digit);
    expect(vinCheckDigit(vin.toLowerCase())).toBe(digit);
  });

  it('does not look at place 9', () => {
    expect(vinCheckDigit('1G4AH59H?5G118341')).toBe('4');
  });

  it('is null for 16 or 18 places and for letters that no VIN has', () => {
    expect(vinCheckDigit('1G4AH59H45G11834')).toBeNull();
    expect(vinCheckDigit('1G4AH59H45G1183411')).toBeNull();
    expect(vinCheckDigit('1O4AH59H45G118341')).toBeNull();
    expect(vinCheckDigit('')).toBeNull();
  });
});

describe('vinWarning()', () => {
  it.each(PUBLISHED)('has nothing to say about %s', (vin) => {
    expect(vinWarning(vin)).toBeNull();
    expect(vinWarning('')).toBeNull();
  });

  it('notices every single place that was mistyped by one, where the digit can tell', () => {
    const vin = PUBLISHED[0][0];
    for (let place = 0; place < vin.length; place += 1) {
      const other = vin[place] === '3' ? '4' : '3';
      if (vin[place] === other) continue;
      const typed = vin.slice(0, place) + other + vin.slice(place + 1);
      // C and L, among others, count as 3 too: the digit cannot tell them apart.
      const told = vinCheckDigit(typed) !== typed[8];
      expect(vinWarning(typed) !== null, typed).toBe(told);
    }
  });

  it('says how many places are there, which one cannot be, and which digit would fit', () => {
    expect(vinWarning('1G4AH59H')).toContain('this has 8');
    expect(vinWarning('1G4AH59H45GI18341')).toContain('“I”');
    expect(vinWarning('1G4AH59H55G118341')).toContain('would be 4');
  });
});
