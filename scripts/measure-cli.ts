import { createReadStream } from 'node:fs';
import { parseArgs } from 'node:util';
import type { CaptureFindings, CaptureInput } from '../src/engine/capture.ts';
import { proposeCircuit } from '../src/engine/circuits/propose.ts';
import { measureCapture } from '../src/engine/measure.ts';
import { readTable } from '../src/engine/reading/read.ts';
import type { ReadTable } from '../src/engine/reading/types.ts';
import type { Notice, Value } from '../src/engine/value.ts';

/**
 * Reads one CSV capture, takes the circuits that the program itself proposes, and prints what was measured: for people,
 * or with --json for programs.
 */
const { values: options, positionals } = parseArgs({
  allowPositionals: true,
  options: { json: { type: 'boolean', default: false }, cylinders: { type: 'string' } },
});

const [file] = positionals;
if (file === undefined || positionals.length > 1) {
  console.error('npm run measure -- FILE [--json] [--cylinders N]');
  process.exit(2);
}
process.exitCode = await run(file);

async function run(path: string): Promise<number> {
  const table = await readTable(createReadStream(path));
  if (!table.ok) {
    console.error(`${path}: ${table.message} ${table.hint}`);
    return 1;
  }
  const proposals = table.columns.map((column) => proposeCircuit({ ...column, axis: table.axis }));
  const input: CaptureInput = {
    axis: table.axis,
    cylinders: options.cylinders === undefined ? null : Number(options.cylinders),
    signals: table.columns.map(({ name, factor, samples, rail }, index) => ({
      index,
      name,
      circuit: proposals[index]!.circuit,
      unit: proposals[index]!.unit,
      factor,
      offset: 0,
      samples,
      ...(rail && { rail }),
    })),
  };
  const findings = measureCapture(input);
  if (options.json) {
    const signals = input.signals.map(({ samples: _, rail: __, ...signal }, i) => ({
      ...signal,
      confidence: proposals[i]!.confidence,
    }));
    console.log(JSON.stringify({ reading: table.reading, signals, findings }, null, 2));
  } else {
    print(
      table,
      input,
      proposals.map(({ because }) => because),
      findings,
    );
  }
  return 0;
}

function print(table: ReadTable, input: CaptureInput, because: string[], findings: CaptureFindings): void {
  const { rows, rejectedCount, remarks } = table.reading;
  console.log(`${rows} rows, ${rejectedCount} of them rejected; engine ${findings.engine}`);
  for (const remark of remarks) console.log(`  ${remark}`);
  for (const { index, values, notices } of findings.signals) {
    const { name, circuit, unit } = input.signals[index]!;
    console.log(`\n${name}: ${circuit} in ${unit} (${because[index]})`);
    printFindings(values, notices);
  }
  for (const { signals, values, notices } of findings.relations) {
    console.log(`\n${signals.map((index) => input.signals[index]!.name).join(' with ')}`);
    printFindings(values, notices);
  }
}

function printFindings(values: readonly Value[], notices: readonly Notice[]): void {
  const width = Math.max(0, ...values.map(({ key }) => key.length));
  for (const { key, value, unit, reason, n } of values) {
    const shown = value === null ? `– ${reason ?? ''}` : `${shorten(value)} ${unit === '1' ? '' : unit}`;
    console.log(`  ${key.padEnd(width)}  ${shown.trimEnd()}${n === undefined ? '' : `  (n = ${n})`}`);
  }
  for (const { severity, text } of notices) console.log(`  ! ${severity}: ${text}`);
}

/** Six significant digits: more would not be read, and --json has them all. */
function shorten(value: Exclude<Value['value'], null>): string {
  if (typeof value === 'number') return String(Number(value.toPrecision(6)));
  if (Array.isArray(value)) return value.map(shorten).join(' ');
  return typeof value === 'object' ? JSON.stringify(value) : String(value);
}
