import { spread } from '../../signal/statistics.ts';
import { absent, type Evidence, type Value } from '../../value.ts';
import type { FoundWheel } from './train.ts';

const NO_MARK = 'no reference mark';

/** Complete turns in time order: `turns` is 1 except where a mark itself could not be seen. */
export interface Turn {
  readonly from: number;
  readonly to: number;
  readonly turns: number;
}

export function completeTurns(wheel: FoundWheel): Turn[] {
  const { turns, marks, stretches } = wheel.pattern;
  const out: Turn[] = [];
  for (let m = 1; m < marks.length; m += 1) {
    if (stretches.some((start) => start > marks[m - 1]! && start <= marks[m]!)) continue;
    out.push({ from: wheel.marksS[m - 1]!, to: wheel.marksS[m]!, turns: turns[m]! - turns[m - 1]! });
  }
  return out;
}

/** First to last mark of every stretch. */
export function markSpans(turns: readonly Turn[]): Evidence[] {
  const out: Evidence[] = [];
  for (const turn of turns) {
    const last = out.at(-1);
    if (last && last.to === turn.from) out[out.length - 1] = { from: last.from, to: turn.to };
    else out.push({ from: turn.from, to: turn.to });
  }
  return out.slice(0, 50);
}

/** `rev_count` and `rpm_mean` (60 × turns / time between the outer reference marks). */
export function turnValues(wheel: FoundWheel): Value[] {
  if (wheel.pattern.marks.length === 0)
    return [absent('rev_count', '1', NO_MARK), absent('rpm_mean', 'rpm', NO_MARK)];
  const turns = completeTurns(wheel);
  const count = turns.reduce((sum, turn) => sum + turn.turns, 0);
  const evidence = markSpans(turns);
  const revCount: Value = { key: 'rev_count', value: count, unit: '1', evidence };
  if (count === 0) return [revCount, absent('rpm_mean', 'rpm', 'no complete turn')];
  const time = turns.reduce((sum, turn) => sum + turn.to - turn.from, 0);
  const single = spread(turns.filter((turn) => turn.turns === 1).map((turn) => 60 / (turn.to - turn.from)));
  return [
    revCount,
    {
      key: 'rpm_mean',
      value: (60 * count) / time,
      unit: 'rpm',
      n: count,
      ...(single ? { min: single.min, max: single.max, sd: single.sd } : {}),
      evidence,
    },
  ];
}
