import { CONDITIONS, type Condition } from './conditions.ts';
import { type Fault, judge, type Tally } from './judge.ts';
import { TRIALS } from './trials.ts';

export interface Row extends Tally {
  readonly circuit: string;
  readonly condition: Condition;
  readonly key: string;
  readonly faults: (Fault & { seed: number })[];
}

/** Every condition of one circuit with seeds 1 to `seeds`. */
export async function sweep(circuit: string, seeds: number): Promise<Row[]> {
  const rows = new Map<string, Row>();
  for (const condition of CONDITIONS) {
    // Whoever runs this hears of it in between.
    await new Promise((done) => setImmediate(done));
    for (let seed = 1; seed <= seeds; seed += 1) {
      const trial = TRIALS[circuit]!(condition, seed);
      if (!trial) continue;
      const { verdicts, faults } = judge(trial);
      for (const [key, verdict] of verdicts) {
        const name = `${condition} ${key}`;
        const row = rows.get(name) ?? { circuit, condition, key, right: 0, silent: 0, wrong: 0, faults: [] };
        row[verdict] += 1;
        row.faults.push(...faults.filter((fault) => fault.key === key).map((fault) => ({ ...fault, seed })));
        rows.set(name, row);
      }
    }
  }
  return [...rows.values()];
}
