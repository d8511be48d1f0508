import { sweep } from './run.ts';
import { TRIALS } from './trials.ts';

/** Prints what is not wholly right, circuit by circuit, and the sums. */
const seeds = Number(process.env.SEEDS ?? 40);
const wanted = process.argv.slice(2);
const total = { right: 0, silent: 0, wrong: 0 };
for (const circuit of Object.keys(TRIALS)) {
  if (wanted.length > 0 && !wanted.includes(circuit)) continue;
  const rows = await sweep(circuit, seeds);
  const sum = { right: 0, silent: 0, wrong: 0 };
  for (const row of rows) {
    for (const verdict of ['right', 'silent', 'wrong'] as const) sum[verdict] += row[verdict];
    if (row.wrong + row.silent === 0) continue;
    console.log(
      `${circuit.padEnd(22)} ${row.condition.padEnd(13)} ${row.key.padEnd(26)} right ${row.right} silent ${row.silent} wrong ${row.wrong}`,
    );
    for (const fault of row.faults.slice(0, 4))
      console.log(`      seed ${fault.seed}: said ${fault.said}, truth ${fault.truth}`);
  }
  console.log(`${circuit}: right ${sum.right}, silent ${sum.silent}, wrong ${sum.wrong}`);
  for (const verdict of ['right', 'silent', 'wrong'] as const) total[verdict] += sum[verdict];
}
console.log(`all: right ${total.right}, silent ${total.silent}, wrong ${total.wrong}`);
