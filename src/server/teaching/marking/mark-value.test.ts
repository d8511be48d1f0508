import { expect, it } from 'vitest';
import { markValue } from './mark-value.ts';

const ask = { label: 'Supply', answer: 12.5, unit: 'V', tolerance: 0.1 } as const;
const given = (number: number, unit: 'V' | 'mV' | 'ms' = 'V') =>
  markValue({ text: '', number, unit }, ask).mark;

it('markValue() counts both ends of the tolerance as inside, whatever binary fractions do', () => {
  // 12.6 - 12.5 is 0.0999…, 12.4 - 12.5 is -0.0999…; 0.3 - 0.2 style sums may be a hair over.
  expect(given(12.6)).toBe('right');
  expect(given(12.4)).toBe('right');
  expect(markValue({ text: '', number: 0.3, unit: 'V' }, { ...ask, answer: 0.2 }).mark).toBe('right');
  expect(given(12.6001)).toBe('wrong');
});

it('markValue() converts the unit before it compares', () => {
  expect(given(12_550, 'mV')).toBe('right');
  expect(given(12.55, 'mV')).toBe('wrong');
});

it('markValue() says on which side a wrong value lies, and that another quantity is wrong', () => {
  expect(markValue({ text: '', number: 13, unit: 'V' }, ask).why).toBe('too high');
  expect(markValue({ text: '', number: 12, unit: 'V' }, ask).why).toBe('too low');
  expect(given(12.5, 'ms')).toBe('wrong');
});

it('markValue() with a tolerance of nothing takes the very number only', () => {
  const exact = { ...ask, answer: 3, unit: '1', tolerance: 0 } as const;
  expect(markValue({ text: '', number: 3, unit: '1' }, exact).mark).toBe('right');
  expect(markValue({ text: '', number: 3.001, unit: '1' }, exact).mark).toBe('wrong');
});
