import { failure } from './failure.ts';
import { HEAD_SIZES, HeadBytes } from './head.ts';
import { LineFeeder } from './lineFeeder.ts';
import { makePreview } from './preview.ts';
import { Scanner } from './scanner.ts';
import { type Start, startReading } from './start.ts';
import { finishTable } from './table.ts';
import type { ReadFailure, ReadOptions, ReadOutcome } from './types.ts';

/**
 * Reads a table of samples from the bytes of a CSV file, in one pass and in memory little beyond the arrays it gives.
 *
 * Samples are `Math.fround(Number(cell))` in the unit of the column as recorded; NaN is a hole. Times are doubles in
 * seconds: the double nearest to the printed time. How the source cuts its chunks makes no difference. A file that
 * cannot be read gives a failure with a sentence; only an aborted signal or a failing source throws.
 */
export async function readTable(
  source: AsyncIterable<Uint8Array>,
  options: ReadOptions = {},
): Promise<ReadOutcome> {
  const hints = options.hints ?? {};
  const gathered = new HeadBytes();
  let size = 0;
  let started: Running | null = null;
  let bytes = 0;
  for await (const chunk of source) {
    options.signal?.throwIfAborted();
    bytes += chunk.length;
    if (started === null) {
      gathered.add(chunk);
      while (started === null && size < HEAD_SIZES.length && gathered.length >= HEAD_SIZES[size]!) {
        const { head, rest } = gathered.cut(HEAD_SIZES[size++]!);
        const start = startReading(head, false, hints);
        const isLast = size === HEAD_SIZES.length;
        if (start.ok && (start.layout.dialect.rows.length >= 4 || isLast)) {
          started = run(start);
          if (!started.push(rest)) return started.finish();
        } else if (!start.ok && (isLast || (start.code !== 'no_numbers' && start.code !== 'one_column')))
          return start;
      }
    } else if (!started.push(chunk)) return started.finish();
    options.onProgress?.(bytes, started?.rows() ?? 0);
  }
  options.signal?.throwIfAborted();
  if (started === null) {
    const start = startReading(gathered.cut(gathered.length).head, true, hints);
    if (!start.ok) return start;
    started = run(start);
  }
  started.end();
  return started.finish();
}

interface Running {
  push(chunk: Uint8Array): boolean;
  end(): void;
  rows(): number;
  finish(): ReadOutcome;
}

function run(start: Start): Running {
  const scanner = new Scanner(start.plan);
  const feeder = new LineFeeder(scanner);
  let goesOn = feeder.push(start.head.bytes.subarray(start.firstRowAt));
  return {
    push(chunk) {
      goesOn = goesOn && feeder.push(start.head.convert(chunk));
      return goesOn;
    },
    end() {
      if (goesOn) goesOn = feeder.push(start.head.end()) && feeder.end();
    },
    rows: () => scanner.stage.rows,
    finish: () => finish(start, scanner),
  };
}

function finish(start: Start, scanner: Scanner): ReadOutcome {
  scanner.keeper.finish();
  return timeFailure(start, scanner) ?? finishTable(start, scanner);
}

/** Times that start again, or that fall too often for single damaged rows. */
function timeFailure(start: Start, { keeper, stage }: Scanner): ReadFailure | null {
  const { stop, timeRejected, firstTimeRejected: first } = keeper;
  const hint = 'Export each recording into a file of its own. If another column holds the time, choose it.';
  const fail = (message: string, line: number | null) =>
    failure('time_backwards', message, hint, makePreview(start.layout), line);
  if (stop?.why === 'time backwards') {
    return fail(
      `The time goes backwards at line ${stop.line}: ${stop.found}, and goes on from there.`,
      stop.line,
    );
  }
  if (timeRejected <= 10 || timeRejected <= 0.1 * stage.rows) return null;
  return fail(
    `The time goes backwards in ${timeRejected} of ${stage.rows} rows, first at line ${first}.`,
    first,
  );
}
