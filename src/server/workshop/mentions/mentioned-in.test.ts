import { describe, expect, it } from 'vitest';
import { mentionedIn } from './mentioned-in.ts';

const people = [
  { id: '1', name: 'Ada' },
  { id: '2', name: 'Ada Holt' },
  { id: '3', name: 'Jörg Ω' },
  { id: '4', name: 'Kit' },
  { id: '5', name: 'kit' },
];

describe('mentionedIn()', () => {
  it('finds whole names after an at sign, whatever their case', () => {
    expect(mentionedIn('See tooth 23, @ada. And @JÖRG Ω!', people)).toEqual(['1', '3']);
  });

  it('takes the longest of names that begin alike, and stops at the end of the word', () => {
    expect(mentionedIn('@Ada Holt', people)).toEqual(['2']);
    expect(mentionedIn('@Adalbert', people)).toEqual([]);
  });

  it('does not take an e-mail address or a name without the sign for a mention', () => {
    expect(mentionedIn('ask bench@ada.example or Ada', people)).toEqual([]);
    expect(mentionedIn('', people)).toEqual([]);
    expect(mentionedIn('@', people)).toEqual([]);
  });

  it('means both of two people of one name, each once', () => {
    expect(mentionedIn('@kit @Kit', people)).toEqual(['4', '5']);
  });
});
