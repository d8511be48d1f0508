import { describe, expect, it } from 'vitest';
import { sweep } from './run.ts';
import { TRIALS } from './trials.ts';

/** More with GAPMARK_SWEEP=40; `print.ts` shows the table. */
const SEEDS = Number(process.env.GAPMARK_SWEEP ?? 3);
/** Right instead of silent in at least this share of all that is there to say, taking all conditions together. */
const LEAST_RIGHT = 0.93;

describe('measuring under every condition', () => {
  it.each(Object.keys(TRIALS))(
    '%s says nothing wrong, and little less than there is to say',
    async (circuit) => {
      const rows = await sweep(circuit, SEEDS);
      const faults = rows.flatMap(({ condition, faults }) =>
        faults.map(
          ({ key, seed, said, truth }) => `${condition}, seed ${seed}: ${key} is ${said}, truth ${truth}`,
        ),
      );
      expect(faults).toEqual([]);
      const right = rows.reduce((sum, row) => sum + row.right, 0);
      const silent = rows.reduce((sum, row) => sum + row.silent, 0);
      expect(right / (right + silent)).toBeGreaterThan(LEAST_RIGHT);
    },
  );
});
