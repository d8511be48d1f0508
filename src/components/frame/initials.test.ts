import { describe, expect, it } from 'vitest';
import { initials } from './initials.ts';

describe('initials', () => {
  it('initials() takes the first letter of the first and of the last word', () => {
    expect(initials('Ina Thorsby')).toBe('IT');
    expect(initials('R. van der Pellow')).toBe('RP');
  });
  it('initials() gives one letter for one word and none for no letters', () => {
    expect(initials('Odd')).toBe('O');
    expect(initials('42 !')).toBe('');
  });
  it('initials() keeps letters beyond ASCII', () => {
    expect(initials('ødegård åse')).toBe('ØÅ');
  });
});
