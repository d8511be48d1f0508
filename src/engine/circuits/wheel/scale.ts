/**
 * Means over blocks of 2^j samples, made when they are asked for: block k of level j is the mean of samples k·2^j to
 * (k + 1)·2^j − 1. Few levels are ever needed, and the fine ones are as large as the signal.
 */
export class BlockMeans {
  readonly count: number;
  /** Coarsest level, of at least 12 blocks. */
  readonly top: number;
  private readonly made: Array<Float32Array | undefined>;

  constructor(values: Float32Array) {
    this.count = values.length;
    this.top = Math.max(0, Math.floor(Math.log2(values.length / 12)));
    this.made = [values];
  }

  level(octave: number): Float32Array {
    const known = this.made[octave];
    if (known) return known;
    let from = octave - 1;
    while (!this.made[from]) from -= 1;
    const made = reduced(this.made[from]!, 2 ** (octave - from));
    this.made[octave] = made;
    return made;
  }
}

function reduced(source: Float32Array, size: number): Float32Array {
  const out = new Float32Array(Math.floor(source.length / size));
  const scale = 1 / size;
  for (let k = 0, i = 0; k < out.length; k += 1) {
    let sum = 0;
    for (const end = i + size; i < end; i += 1) sum += source[i]!;
    out[k] = sum * scale;
  }
  return out;
}

/** Which half-width of the tooth filter fits where: `octave[s]` for samples s·length to (s + 1)·length. */
export interface ScaleTrack {
  readonly segmentLength: number;
  readonly octave: Int8Array;
}

const OCTAVES_EITHER_WAY = 3;
/** Cost of changing the filter by one octave from one segment to the next, against the logarithm of energy. */
const CHANGE_COST = 1.2;

/**
 * Follows the width of a tooth's swing through the capture. The mean square difference of neighbouring block means
 * (the Haar, or Allan, variance) is largest where a block is 0.37 of the swing's period, whatever the wheel: drift and
 * offset stand in wider blocks, white noise falls by half with every octave. The widths of neighbouring segments are
 * joined by the cheapest path, so that noise in a quiet stretch does not pull the filter away.
 *
 * @param noise standard deviation of the samples' white noise, taken off the energies.
 * @returns null when no width stands out (a flat line, a bare drift).
 */
export function trackScale(means: BlockMeans, noise: number): ScaleTrack | null {
  const { top } = means;
  const whole = new Float64Array(top + 1);
  for (let j = Math.min(SAMPLED_BELOW, top); j <= top; j += 1) whole[j] = energyOf(means.level(j));
  for (let j = 0; j < Math.min(SAMPLED_BELOW, top); j += 1) whole[j] = sampledEnergy(means, j);
  const dominant = dominantOctave(whole, noise);
  if (dominant === null) return null;

  const lowest = Math.max(0, dominant - OCTAVES_EITHER_WAY);
  const highest = Math.min(top - 1, dominant + OCTAVES_EITHER_WAY);
  let segmentLength = 2 ** (dominant + 4);
  while (segmentLength < means.count / 4096) segmentLength *= 2;
  const segments = Math.max(1, Math.floor(means.count / segmentLength));
  const states = highest - lowest + 1;

  const cost = new Float64Array(segments * states);
  const from = new Int8Array(segments * states);
  for (let s = 0; s < segments; s += 1) {
    for (let state = 0; state < states; state += 1) {
      const j = lowest + state;
      const level = means.level(j);
      const begin = Math.floor((s * segmentLength) / 2 ** j);
      const end = Math.min(level.length, Math.max(begin + 2, Math.floor(((s + 1) * segmentLength) / 2 ** j)));
      const energy = lessNoise(meanSquareDifference(level, begin, end), noise, j);
      let best = 0;
      if (s > 0) {
        let bestCost = Infinity;
        for (let p = 0; p < states; p += 1) {
          const through = cost[(s - 1) * states + p]! + CHANGE_COST * Math.abs(p - state);
          if (through < bestCost) {
            bestCost = through;
            best = p;
          }
        }
        cost[s * states + state] = bestCost;
      }
      from[s * states + state] = best;
      cost[s * states + state]! -= Math.log(energy + 1e-30);
    }
  }

  let state = 0;
  for (let p = 1; p < states; p += 1) {
    if (cost[(segments - 1) * states + p]! < cost[(segments - 1) * states + state]!) state = p;
  }
  const octave = new Int8Array(segments);
  for (let s = segments - 1; s >= 0; s -= 1) {
    octave[s] = lowest + state;
    state = from[s * states + state]!;
  }
  return { segmentLength, octave };
}

/** Below this octave a long capture's energy is taken from parts of it, for its levels are large. */
const SAMPLED_BELOW = 4;
const PART = 4096;
const MOST_PARTS = 64;

const energyOf = (level: Float32Array) => meanSquareDifference(level, 0, level.length);

/** Mean energy at a fine octave over parts spread evenly over the capture; the whole of a short one. */
function sampledEnergy(means: BlockMeans, octave: number): number {
  const values = means.level(0);
  if (values.length <= 2 * MOST_PARTS * PART) return energyOf(means.level(octave));
  let sum = 0;
  for (let part = 0; part < MOST_PARTS; part += 1) {
    const from = Math.floor((part * (values.length - PART)) / (MOST_PARTS - 1));
    sum += energyOf(
      octave === 0
        ? values.subarray(from, from + PART)
        : reduced(values.subarray(from, from + PART), 2 ** octave),
    );
  }
  return sum / MOST_PARTS;
}

function meanSquareDifference(level: Float32Array, begin: number, end: number): number {
  let sum = 0;
  let count = 0;
  for (let k = begin + 1; k < end; k += 2) {
    const difference = level[k]! - level[k - 1]!;
    sum += difference * difference;
    count += 1;
  }
  return count > 0 ? sum / count : 0;
}

/** A mean of 2^j samples carries noise² / 2^j; at most nine tenths are taken off, for the estimate may be too high. */
const lessNoise = (energy: number, noise: number, j: number) =>
  Math.max(energy - (2 * noise * noise) / 2 ** j, energy * 0.1);

/** The octave with the largest energy among those above both neighbours: a drift only rises towards wide blocks. */
function dominantOctave(energy: Float64Array, noise: number): number | null {
  let best: number | null = null;
  let most = 0;
  for (let j = 0; j + 1 < energy.length; j += 1) {
    const here = lessNoise(energy[j]!, noise, j);
    const below = j > 0 ? lessNoise(energy[j - 1]!, noise, j - 1) : 0;
    const above = lessNoise(energy[j + 1]!, noise, j + 1);
    if (here > most && here >= below && here >= above) {
      most = here;
      best = j;
    }
  }
  return best;
}
