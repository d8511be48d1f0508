/**
 * Least-squares fit of v(t) = offset + slope · (1 − e^(−rate·t)) / rate: the charge of an L/R (or RC) circuit written so
 * that rate → 0 is the straight line. For a given rate the other two are linear, so only the rate is searched
 * (variable projection): a coarse scan, then golden section. A rise that bends upwards has a negative rate.
 */
export interface ExponentialFit {
  /** 1 / time constant, in 1/s; negative when the curve bends upwards. */
  readonly rate: number;
  /** Standard error of the rate from the samples' scatter; Infinity when the curve does not tell the rate. */
  readonly rateError: number;
  /** Value at t = 0 and slope there, units and units a second. */
  readonly offset: number;
  readonly slope: number;
  /** Root mean square of what the curve leaves. */
  readonly residual: number;
  readonly at: (timeS: number) => number;
  /** Time at which the curve passes zero; null where it never does. */
  readonly zeroS: number | null;
  /** Value it approaches; null when it bends upwards or is straight. */
  readonly final: number | null;
}

const LOWEST = -3;
const HIGHEST = 80;
const SCAN = 60;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

/** Times in seconds, rising; times and values of one length, all finite. Fewer than four points or no duration: null. */
export function fitExponential(timesS: Float64Array, values: Float64Array): ExponentialFit | null {
  const n = Math.min(timesS.length, values.length);
  const durationS = n > 0 ? timesS[n - 1]! - timesS[0]! : 0;
  if (n < 4 || !(durationS > 0)) return null;
  const cost = (scaled: number) => project(timesS, values, n, scaled / durationS).squares;

  const grid = (k: number) => LOWEST + (HIGHEST - LOWEST) * (k / SCAN) ** 2;
  let best = 0;
  let lowest = Number.POSITIVE_INFINITY;
  for (let k = 0; k <= SCAN; k += 1) {
    const squares = cost(grid(k));
    if (squares < lowest) {
      lowest = squares;
      best = k;
    }
  }
  const scaled = goldenSection(cost, grid(Math.max(0, best - 1)), grid(Math.min(SCAN, best + 1)));
  const rate = scaled / durationS;
  const { offset, slope, squares } = project(timesS, values, n, rate);
  return {
    rate,
    rateError: errorOf(cost, scaled, squares, n) / durationS,
    offset,
    slope,
    residual: Math.sqrt(squares / n),
    at: (timeS) => offset + slope * basis(rate, timeS),
    zeroS: zeroOf(rate, offset, slope),
    final: rate > 0 ? offset + slope / rate : null,
  };
}

/** (1 − e^(−rate·t)) / rate, without loss of digits near rate = 0. */
function basis(rate: number, timeS: number): number {
  return Math.abs(rate * timeS) < 1e-12 ? timeS : -Math.expm1(-rate * timeS) / rate;
}

function zeroOf(rate: number, offset: number, slope: number): number | null {
  if (slope === 0) return null;
  const argument = (rate * offset) / slope;
  if (Math.abs(argument) < 1e-9) return -offset / slope;
  return argument > -1 ? -Math.log1p(argument) / rate : null;
}

function project(timesS: Float64Array, values: Float64Array, n: number, rate: number) {
  let meanF = 0;
  let meanV = 0;
  let ff = 0;
  let fv = 0;
  let vv = 0;
  for (let i = 0; i < n; i += 1) {
    const f = basis(rate, timesS[i]!);
    const v = values[i]!;
    const df = f - meanF;
    const dv = v - meanV;
    meanF += df / (i + 1);
    meanV += dv / (i + 1);
    ff += df * (f - meanF);
    fv += df * (v - meanV);
    vv += dv * (v - meanV);
  }
  const slope = ff > 0 ? fv / ff : 0;
  return { slope, offset: meanV - slope * meanF, squares: Math.max(0, vv - slope * fv) };
}

function goldenSection(cost: (x: number) => number, from: number, to: number): number {
  let low = from;
  let high = to;
  let a = high - GOLDEN * (high - low);
  let b = low + GOLDEN * (high - low);
  let costA = cost(a);
  let costB = cost(b);
  for (let round = 0; round < 45; round += 1) {
    if (costA < costB) {
      high = b;
      b = a;
      costB = costA;
      a = high - GOLDEN * (high - low);
      costA = cost(a);
    } else {
      low = a;
      a = b;
      costA = costB;
      b = low + GOLDEN * (high - low);
      costB = cost(b);
    }
  }
  return (low + high) / 2;
}

/** Standard error from the curvature of the sum of squares: variance = 2 s² / S″, s² = S / (n − 3). */
function errorOf(cost: (x: number) => number, at: number, squares: number, n: number): number {
  const step = Math.max(0.05, 0.05 * Math.abs(at));
  const curvature = (cost(at + step) - 2 * squares + cost(at - step)) / (step * step);
  const scatter = squares / Math.max(1, n - 3);
  return curvature > 0 ? Math.sqrt((2 * scatter) / curvature) : Number.POSITIVE_INFINITY;
}
