import { expect, it } from 'vitest';
import { outcomeWords } from './outcome-words.ts';

const mark = (name: 'right' | 'wrong' | 'partly' | 'waiting') => ({ mark: name, why: '' });

it('outcomeWords() says which of two parts was right', () => {
  expect(outcomeWords({ outcome: 'right', marks: { stretch: mark('right'), cause: mark('right') } })).toBe(
    'both right',
  );
  expect(outcomeWords({ outcome: 'partly', marks: { stretch: mark('right'), cause: mark('wrong') } })).toBe(
    'stretch right, cause not',
  );
  expect(outcomeWords({ outcome: 'wrong', marks: { stretch: mark('wrong'), cause: mark('wrong') } })).toBe(
    'neither right',
  );
});

it('outcomeWords() says that a text waits, and what is known already', () => {
  expect(outcomeWords({ outcome: 'waiting', marks: { text: mark('waiting') } })).toBe(
    'text waits for judging',
  );
  expect(outcomeWords({ outcome: 'waiting', marks: { cause: mark('right'), text: mark('waiting') } })).toBe(
    'cause right, text waits for judging',
  );
});

it('outcomeWords() needs no names where one thing was asked', () => {
  expect(outcomeWords({ outcome: 'right', marks: { value: mark('right') } })).toBe('right');
  expect(outcomeWords({ outcome: 'partly', marks: { text: mark('partly') } })).toBe('partly right');
});
