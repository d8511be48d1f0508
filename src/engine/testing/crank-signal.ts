import { random } from './random.ts';

/**
 * A crank signal made from the physics, for tests: a wheel turns at a speed that rises from rest and swings with
 * compression; the pick-up gives e = dΦ/dt of the flux of teeth under it (positive as a tooth arrives), the three-wire
 * sensor two levels. Angles in degrees, 0 where the first reference tooth's centre (or leading edge) passes.
 */
export interface CrankSignalOptions {
  readonly seed: number;
  readonly sampleRateHz: number;
  readonly durationS: number;
  readonly rpm: number;
  /** Angle at the first sample. */
  readonly startDeg: number;
  /** Tooth angles within the turn, tooth 1 at 0. */
  readonly teethDeg: readonly number[];
  /** Width of one tooth's flux, degrees. */
  readonly widthDeg: number;
  /** Part of the speed lost at each compression, 0 to 1. */
  readonly dip: number;
  readonly cylinders: number;
  /** How much of `dip` each compression takes, in turn, from the first at `compressionDeg` on; empty: all the whole of it. */
  readonly compressions: readonly number[];
  /** Crank angle of the lowest speed of the first compression; null: anywhere, by the seed. */
  readonly compressionDeg: number | null;
  /** Time constant of the rise from rest, seconds; 0: turning at speed from the start. */
  readonly spinUpS: number;
  /** Moment at which the shaft begins to stop, seconds (it stands 0.3 s later); null: it does not. */
  readonly stallS: number | null;
  /** Peak voltage of one tooth at `rpm`. */
  readonly peak: number;
  readonly inverted: boolean;
  /** Deviation of white noise, as a part of the tooth's peak. */
  readonly noise: number;
  /** Height of mains hum, as a part of the tooth's peak, and its frequency. */
  readonly hum: number;
  readonly humHz: number;
  /** Swing of tooth height over one turn, 0 to 1. */
  readonly runOut: number;
  readonly offset: number;
  /** Slow wander of the baseline, in volts. */
  readonly drift: number;
  /** Steps of the converter over ± 1.3 × the largest value; null: none. */
  readonly bits: number | null;
  /** Spikes a second, each three peaks high and at most 40 µs long. */
  readonly spikes: number;
  /** Clip at ± this value; null: none. */
  readonly clip: number | null;
  /** Height of tooth number (from 1) as a part of its usual height. */
  readonly weak: { readonly tooth: number; readonly height: number } | null;
  /** One tooth's swing: one period of a sine, or the slope of a bell-shaped flux. */
  readonly shape: 'sine' | 'bell';
  readonly kind: 'pickup' | 'two-level';
}

export interface CrankSignal {
  readonly samples: Float32Array;
  readonly stepS: number;
  /** Times of all tooth centres (pick-up) or leading edges within the capture. */
  readonly teethS: readonly number[];
  /** Times of the reference teeth; complete turns lie between them. */
  readonly marksS: readonly number[];
  readonly angleAt: (timeS: number) => number;
}

export const steady: CrankSignalOptions = {
  seed: 1,
  sampleRateHz: 20_000,
  durationS: 1.5,
  rpm: 200,
  startDeg: -100,
  teethDeg: Array.from({ length: 58 }, (_, k) => k * 6),
  widthDeg: 6,
  dip: 0.08,
  cylinders: 4,
  compressions: [],
  compressionDeg: null,
  spinUpS: 0,
  stallS: null,
  peak: 2,
  inverted: false,
  noise: 0,
  hum: 0,
  humHz: 50,
  runOut: 0,
  offset: 0,
  drift: 0,
  bits: null,
  spikes: 0,
  clip: null,
  weak: null,
  shape: 'sine',
  kind: 'pickup',
};

/** Tooth angles of an evenly divided wheel: `missing` places (counted from the mark at 0) have no tooth. */
export function dividedWheel(places: number, missing: readonly number[]): number[] {
  return Array.from({ length: places }, (_, place) => place)
    .filter((place) => !missing.includes(place))
    .map((place) => (place * 360) / places);
}

/** Part by which the speed differs from its mean: a compression that takes less stays near the highest speed. */
function swingOf(o: CrankSignalOptions, cycles: number, compression: number): number {
  const half = o.dip / (2 - o.dip);
  if (o.compressions.length === 0) return half * compression;
  const count = o.compressions.length;
  const taken = o.compressions[((Math.floor(cycles) % count) + count) % count]!;
  return half * (1 - taken * (1 - compression));
}

/** One tooth's swing, highest 1, at `x` widths after its centre. */
function sine(x: number): number {
  return Math.sin(2 * Math.PI * x);
}

function bell(x: number): number {
  const u = x / 0.15;
  return u * Math.exp((1 - u * u) / 2);
}

export function crankSignal(options: CrankSignalOptions): CrankSignal {
  const o = options;
  const rng = random(o.seed);
  const count = Math.round(o.durationS * o.sampleRateHz);
  const stepS = 1 / o.sampleRateHz;
  const angles = new Float64Array(count + 1);
  const speeds = new Float64Array(count + 1);
  const anywhere = rng.between(0, 720);
  const phase = o.compressionDeg === null ? anywhere : o.compressionDeg - 360 / o.cylinders;
  let angle = o.startDeg;
  for (let i = 0; i <= count; i += 1) {
    // The lowest speed is (1 - dip) of the highest.
    const cycles = ((angle - phase) * o.cylinders) / 720;
    const compression = Math.cos(2 * Math.PI * cycles);
    const rise = o.spinUpS > 0 ? 1 - Math.exp(-(i * stepS) / o.spinUpS) : 1;
    const stop = o.stallS === null ? 1 : Math.min(1, Math.max(0, 1 - (i * stepS - o.stallS) / 0.3));
    const speed = o.rpm * 6 * rise * stop * (1 + swingOf(o, cycles, compression));
    angles[i] = angle;
    speeds[i] = speed;
    angle += speed * stepS;
  }

  const samples = new Float64Array(count);
  const { teethDeg, widthDeg } = o;
  const swingAt = o.shape === 'sine' ? sine : bell;
  const runOutPhase = rng.between(0, 360);
  let near = 0;
  for (let i = 0; i < count; i += 1) {
    const within = (((angles[i]! + widthDeg) % 360) + 360) % 360;
    while (near > 0 && teethDeg[near]! + widthDeg / 2 > within) near -= 1;
    while (near + 1 < teethDeg.length && teethDeg[near + 1]! + widthDeg / 2 <= within) near += 1;
    let value = 0;
    if (o.kind === 'pickup') {
      for (let t = near - 1; t <= near + 2; t += 1) {
        const tooth = (t + teethDeg.length) % teethDeg.length;
        let off = angles[i]! - teethDeg[tooth]!;
        off -= 360 * Math.round(off / 360);
        if (Math.abs(off) >= widthDeg / 2 || (teethDeg.length < 4 && t !== near && tooth === near)) continue;
        const height = o.weak?.tooth === tooth + 1 ? o.weak.height : 1;
        value -= height * swingAt(off / widthDeg);
      }
      value *= (o.peak * speeds[i]!) / (o.rpm * 6);
      value *= 1 + o.runOut * Math.cos(((angles[i]! - runOutPhase) * Math.PI) / 180);
    } else {
      // High from the leading edge on, for the width of the tooth.
      let high = false;
      for (const tooth of [near - 1, near, near + 1]) {
        const wrapped = (tooth + teethDeg.length) % teethDeg.length;
        let off = angles[i]! - teethDeg[wrapped]!;
        off -= 360 * Math.floor(off / 360 + 1e-12);
        if (off < widthDeg) high = true;
      }
      value = (high ? 1 : 0) * o.peak;
    }
    if (o.inverted) value = o.kind === 'pickup' ? -value : o.peak - value;
    samples[i] = value;
  }
  const humPhase = rng.between(0, 2 * Math.PI);
  const driftPhase = rng.between(0, 2 * Math.PI);
  for (let i = 0; i < count; i += 1) {
    const time = i * stepS;
    samples[i]! +=
      o.offset +
      o.noise * o.peak * (o.noise > 0 ? rng.normal() : 0) +
      o.hum * o.peak * Math.sin(2 * Math.PI * o.humHz * time + humPhase) +
      o.drift * Math.sin(2 * Math.PI * 0.7 * time + driftPhase);
  }
  for (let n = 0; n < o.spikes * o.durationS; n += 1) {
    const at = Math.floor(rng.next() * count);
    const length = Math.max(1, Math.round(rng.next() * 40e-6 * o.sampleRateHz));
    const height = (rng.next() < 0.5 ? -3 : 3) * o.peak;
    for (let k = at; k < Math.min(count, at + length); k += 1) samples[k]! += height;
  }
  if (o.bits !== null) {
    let largest = 0;
    for (const value of samples) largest = Math.max(largest, Math.abs(value));
    const step = (2 * largest * 1.3) / 2 ** o.bits;
    for (let i = 0; i < count; i += 1) samples[i] = Math.round(samples[i]! / step) * step;
  }
  if (o.clip !== null)
    for (let i = 0; i < count; i += 1) samples[i] = Math.min(o.clip, Math.max(-o.clip, samples[i]!));

  const timeAtAngle = (wanted: number) => {
    let low = 0;
    let high = count;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (angles[middle]! <= wanted) low = middle;
      else high = middle;
    }
    return (low + (wanted - angles[low]!) / (angles[low + 1]! - angles[low]!)) * stepS;
  };
  const end = angles[count - 1]!;
  const teethS: number[] = [];
  const marksS: number[] = [];
  for (let turn = Math.floor(o.startDeg / 360); turn * 360 <= end; turn += 1) {
    teethDeg.forEach((tooth, t) => {
      const at = turn * 360 + tooth;
      if (at <= o.startDeg || at >= end) return;
      const time = timeAtAngle(at);
      teethS.push(time);
      const before = t > 0 ? turn * 360 + teethDeg[t - 1]! : (turn - 1) * 360 + teethDeg.at(-1)!;
      if (t === 0 && before > o.startDeg) marksS.push(time);
    });
  }
  return {
    samples: Float32Array.from(samples),
    stepS,
    teethS,
    marksS,
    angleAt: (timeS) => {
      const place = Math.min(count - 1, Math.max(0, timeS / stepS));
      const below = Math.floor(place);
      return angles[below]! + (angles[below + 1]! - angles[below]!) * (place - below);
    },
  };
}
