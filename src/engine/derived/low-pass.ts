import { runsOf } from './runs.ts';

/**
 * Second-order Butterworth low-pass run forwards and backwards, so that nothing is shifted in time; at `cutoffHz` half the
 * amplitude is left (-3 dB each way). Bilinear transform with the cut-off prewarped (Oppenheim and Schafer, Discrete-Time Signal
 * Processing, 7.1); ends as scipy.signal.filtfilt does by default: nine samples turned over about the end, steady state before the
 * first. Runs of fewer than ten samples are left out. Cut-off at or above half the sample rate: the values as they are.
 */
export function lowPass(values: Float32Array, sampleRateHz: number, cutoffHz: number): Float32Array {
  if (!(cutoffHz < sampleRateHz / 2)) return values.slice();
  const made = new Float32Array(values.length).fill(Number.NaN);
  const k = Math.tan((Math.PI * cutoffHz) / sampleRateHz);
  const norm = 1 / (1 + Math.SQRT2 * k + k * k);
  const b0 = k * k * norm;
  const b = [b0, 2 * b0, b0] as const;
  const a = [1, 2 * (k * k - 1) * norm, (1 - Math.SQRT2 * k + k * k) * norm] as const;
  for (const [from, to] of runsOf(values)) {
    const n = to - from;
    if (n <= PAD) continue;
    const data = new Float64Array(n + 2 * PAD);
    const first = values[from]!;
    const last = values[to - 1]!;
    for (let i = 0; i < PAD; i += 1) {
      data[i] = 2 * first - values[from + PAD - i]!;
      data[n + PAD + i] = 2 * last - values[to - 2 - i]!;
    }
    data.set(values.subarray(from, to), PAD);
    pass(data, b, a);
    data.reverse();
    pass(data, b, a);
    data.reverse();
    made.set(data.subarray(PAD, PAD + n), from);
  }
  return made;
}

/** Three times the number of coefficients, as scipy.signal.filtfilt pads. */
const PAD = 9;

type Three = readonly [number, number, number];

/** One pass in place, beginning in the steady state of its first sample (transposed direct form II). */
function pass(data: Float64Array, [b0, b1, b2]: Three, [, a1, a2]: Three): void {
  const x0 = data[0]!;
  // Steady state of a filter whose gain at rest is 1: y = x, so z2 = (b2 - a2) x and z1 = (1 - b0) x.
  let z1 = (1 - b0) * x0;
  let z2 = (b2 - a2) * x0;
  for (let i = 0; i < data.length; i += 1) {
    const x = data[i]!;
    const y = b0 * x + z1;
    z1 = b1 * x - a1 * y + z2;
    z2 = b2 * x - a2 * y;
    data[i] = y;
  }
}
