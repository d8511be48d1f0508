import type { TimeAxis } from '../capture.ts';
import type { TimeColumn } from './times.ts';

/** Where rows may lie off the even grid and still be even: a hundredth of a step. */
const STEP_SHARE = 0.01;

export interface FoundEven {
  readonly startS: number;
  readonly stepS: number;
  /** The coarseness of the printed times where it alone explains that they are not exactly even; else null. */
  readonly printedToS: number | null;
}

/**
 * Whether times lie on an even grid. `null`: they do not. Rows without a time (NaN) are passed over but keep their
 * place. The step is that from first to last time, which is the least touched by rounding. Times may lie off the grid
 * by a hundredth of a step, or by no more than the resolution in which they are printed: a fixed number of decimals,
 * or a fixed number of significant digits, so that the resolution coarsens with each power of ten.
 */
export function findEven(times: TimeColumn): FoundEven | null {
  const perfect = times.perfectlyEven();
  if (perfect !== null) return { ...perfect, printedToS: null };
  const line = firstToLast(times);
  if (line === null) return null;
  const { first, last, startS, stepS } = line;
  if (!(stepS > 0)) return null;
  const origin = startS - first * stepS;
  if (
    within(
      times,
      (i) => origin + i * stepS,
      () => STEP_SHARE * stepS,
    )
  ) {
    const nice = niceStep(stepS, (STEP_SHARE * stepS) / 10 / Math.max(1, last - first));
    return { startS: origin, stepS: nice, printedToS: null };
  }
  const printed = printing(times);
  if (printed === null || steadyButFew(times, stepS)) return null;
  const q = (timeS: number) => Math.max(10 ** -printed.decimals, 10 ** (magnitude(timeS) - printed.digits));
  const span = Math.max(1, last - first);
  const [atStart, atEnd] = [q(startS), q(line.endS)];
  const allowed = (i: number, timeS: number) => {
    const share = (i - first) / span;
    return 1.0001 * Math.max(q(timeS), atStart * (1 - share) + atEnd * share);
  };
  if (!within(times, (i) => origin + i * stepS, allowed)) return null;
  const nice = niceStep(stepS, (atStart + atEnd) / 2 / span);
  return { startS: origin, stepS: nice, printedToS: Math.max(atStart, atEnd) };
}

function firstToLast(times: TimeColumn) {
  let first = -1;
  let last = -1;
  let startS = 0;
  let endS = 0;
  eachTime(times, (i, timeS) => {
    if (first < 0) [first, startS] = [i, timeS];
    [last, endS] = [i, timeS];
    return true;
  });
  return last > first ? { first, last, startS, endS, stepS: (endS - startS) / (last - first) } : null;
}

function within(
  times: TimeColumn,
  at: (i: number) => number,
  allowed: (i: number, timeS: number) => number,
): boolean {
  return eachTime(times, (i, timeS) => Math.abs(timeS - at(i)) <= allowed(i, timeS));
}

/** Calls `visit` for each row with a time until it says false; gives whether it never did. */
function eachTime(times: TimeColumn, visit: (i: number, timeS: number) => boolean): boolean {
  const block = new Float64Array(times.longestBlock);
  let at = 0;
  for (let b = 0; b < times.blockCount; b++) {
    const count = times.block(b, block);
    for (let i = 0; i < count; i++) {
      if (!Number.isNaN(block[i]!) && !visit(at + i, block[i]!)) return false;
    }
    at += count;
  }
  return true;
}

/** Most decimals and most significant digits of any time in its shortest form; null beyond 15 digits: not rounded. */
function printing(times: TimeColumn): { decimals: number; digits: number } | null {
  let decimals = 0;
  let digits = 0;
  let seen = 0;
  const isRounded = eachTime(times, (_, timeS) => {
    // Some thousands of rows tell: the digits of the first and of every 97th row after them.
    if (seen++ > 5000 && seen % 97 !== 0) return true;
    if (timeS === 0) return true;
    const [mantissa, exponent] = timeS.toExponential().replace('-', '').split('e') as [string, string];
    const count = mantissa.replace('.', '').length;
    digits = Math.max(digits, count);
    decimals = Math.max(decimals, count - 1 - Number(timeS.toExponential().split('e')[1] ?? exponent));
    return digits <= 15;
  });
  return isRounded && digits > 0 ? { decimals, digits } : null;
}

/** 1 for 1 to 9.99 s, 0 for 0.1 to 0.999 s and so on: the number of digits before the point. */
const magnitude = (timeS: number) => (timeS === 0 ? -99 : Math.floor(Math.log10(Math.abs(timeS))) + 1);

/**
 * All steps the same but for one or two, as when a sample is missing: rounding would spread such steps over the file,
 * so this is no even axis.
 */
function steadyButFew(times: TimeColumn, stepS: number): boolean {
  let last = Number.NaN;
  const counts = new Map<number, number>();
  eachTime(times, (_, timeS) => {
    if (!Number.isNaN(last)) {
      const key = Math.round((timeS - last) * (64 / stepS));
      counts.set(key, (counts.get(key) ?? 0) + 1);
    }
    last = timeS;
    return counts.size < 1000;
  });
  const sizes = [...counts.values()];
  const all = sizes.reduce((a, b) => a + b, 0);
  const most = Math.max(...sizes);
  return all > 4 && all - most <= 2;
}

/** The step, or the step of a round rate, with at most three digits that lies within `slack` of it. */
export function niceStep(stepS: number, slack: number): number {
  for (const digits of [1, 2, 3]) {
    const step = Number(stepS.toPrecision(digits));
    if (Math.abs(step - stepS) <= slack) return step;
    const byRate = 1 / Number((1 / stepS).toPrecision(digits));
    if (Math.abs(byRate - stepS) <= slack) return byRate;
  }
  return stepS;
}

export function unevenAxis(timesS: Float64Array, holds: boolean): TimeAxis {
  return { kind: 'uneven', timesS, holds };
}
