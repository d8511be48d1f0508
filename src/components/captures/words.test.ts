import { describe, expect, it } from 'vitest';
import { asSentence, firstSentence, isUnderWay, rowVerdict, sureness } from './words.ts';

const none = { watch: 0, bad: 0, first: null };

describe('rowVerdict()', () => {
  it('says nothing of a ready capture without notices: no notice is not a pass', () => {
    expect(rowVerdict({ status: 'ready', notices: none })).toBeNull();
  });
  it('takes the gravest notice for its shape and counts the others', () => {
    const notices = { watch: 2, bad: 1, first: 'Low kick' };
    expect(rowVerdict({ status: 'ready', notices })).toEqual({
      verdict: 'bad',
      word: 'Low kick, and 2 more',
    });
  });
  it('says the state while there are no numbers', () => {
    expect(rowVerdict({ status: 'measuring', notices: none })).toEqual({
      verdict: 'undecided',
      word: 'measuring',
    });
    expect(rowVerdict({ status: 'failed', notices: none })?.verdict).toBe('bad');
  });
});

describe('firstSentence()', () => {
  it('stops at the first full stop before a capital, not inside a number or an abbreviation', () => {
    expect(firstSentence('Tooth 23 is at 0.31 of its neighbours, e.g. chipped. Look at the wheel.')).toBe(
      'Tooth 23 is at 0.31 of its neighbours, e.g. chipped.',
    );
    expect(firstSentence('One')).toBe('One');
  });
});

describe('asSentence()', () => {
  it('begins with a capital and ends with one full stop', () => {
    expect(asSentence('the name says crank')).toBe('The name says crank.');
    expect(asSentence('Done.')).toBe('Done.');
    expect(asSentence('')).toBe('');
  });
});

describe('sureness()', () => {
  it('asks for a confirmation below 0.8 and for a choice below 0.5', () => {
    expect(sureness(0.94).word).toBe('quite sure');
    expect(sureness(0.58).word).toBe('please confirm');
    expect(sureness(0.2).verdict).toBe('undecided');
  });
});

describe('isUnderWay()', () => {
  it('holds from the queue to the last value', () => {
    expect(
      ['queued', 'reading', 'measuring', 'ready', 'failed', 'cancelled'].filter((s) =>
        isUnderWay(s as 'ready'),
      ),
    ).toEqual(['queued', 'reading', 'measuring']);
  });
});
