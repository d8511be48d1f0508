import {
  HARDSHIPS,
  judged,
  measureSwept,
  SENSORS,
  SWEPT_WHEELS,
  sweptSignal,
  type Verdict,
} from '../src/engine/testing/crank-cases.ts';

/**
 * How often a crank wheel is found right (R), right but with a turn left out (t), not at all (-) or wrong (W), for every
 * wheel, sensor and hardship. SEEDS=12 for more of each; WHEEL, SENSOR, HARDSHIP for a part; WHY=1 lists what is not right.
 */
const seeds = Number(process.env.SEEDS ?? 4);
const first = Number(process.env.FIRST ?? 1);
const only = (list: readonly string[], wanted: string | undefined) =>
  wanted === undefined ? list : list.filter((name) => wanted.split(',').includes(name));
const totals: Record<Verdict['outcome'], number> = { right: 0, short: 0, silent: 0, wrong: 0 };
const say = (line: string) => process.stdout.write(`${line}\n`);

for (const sensor of SENSORS) {
  if (process.env.SENSOR && process.env.SENSOR !== sensor) continue;
  say(`\n${sensor}: right/short/silent/wrong`);
  const wheels = only(Object.keys(SWEPT_WHEELS), process.env.WHEEL);
  for (const hardship of only(Object.keys(HARDSHIPS), process.env.HARDSHIP)) {
    if (sensor === 'crank-hall' && HARDSHIPS[hardship]!.pickupOnly) continue;
    const cells: string[] = [];
    const row = { right: 0, short: 0, silent: 0, wrong: 0 };
    for (const wheel of wheels) {
      const cell = { right: 0, short: 0, silent: 0, wrong: 0 };
      for (let seed = first; seed < first + seeds; seed += 1) {
        const swept = { wheel, sensor, hardship, seed };
        const signal = sweptSignal(swept);
        const { outcome, why } = judged(swept, signal, measureSwept(swept, signal));
        cell[outcome] += 1;
        row[outcome] += 1;
        totals[outcome] += 1;
        if (process.env.WHY && (outcome === 'wrong' || process.env.WHY === '2') && outcome !== 'right')
          say(`   ${outcome} ${sensor} ${wheel} ${hardship} seed ${seed}: ${why}`);
      }
      const letters =
        'R'.repeat(cell.right) + 't'.repeat(cell.short) + '-'.repeat(cell.silent) + 'W'.repeat(cell.wrong);
      cells.push(letters.padEnd(Math.max(wheel.length, seeds)));
    }
    say(`${hardship.padEnd(17)} ${cells.join(' ')}  ${row.right}/${row.short}/${row.silent}/${row.wrong}`);
  }
  say(`${' '.repeat(17)} ${wheels.map((wheel) => wheel.padEnd(seeds)).join(' ')}`);
}
say(`\nall: ${totals.right} right, ${totals.short} short, ${totals.silent} silent, ${totals.wrong} wrong`);
