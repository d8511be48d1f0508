import { expect, it } from 'vitest';
import { confusion } from './confusion.ts';

const words = new Map([
  ['a', 'Bent tooth'],
  ['b', 'Wide gap'],
]);

it('confusion() counts what was (rows) against what was chosen (columns)', () => {
  const answers = [
    { was: 'a', chosen: 'b', words },
    { was: 'a', chosen: 'b', words },
    { was: 'a', chosen: 'a', words },
    { was: 'b', chosen: 'b', words },
  ];
  const table = confusion(answers);
  expect(table.causes.map(({ text }) => text)).toEqual(['Bent tooth', 'Wide gap']);
  expect(table.counts).toEqual([
    [1, 2],
    [0, 1],
  ]);
  expect(table.n).toBe(4);
});

it('confusion() of nothing is empty', () => {
  expect(confusion([])).toEqual({ causes: [], counts: [], n: 0 });
});
