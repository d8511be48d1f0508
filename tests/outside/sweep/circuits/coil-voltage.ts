import { measureCoilPrimaryVoltage } from '../../../../src/engine/circuits/coil-primary-voltage.ts';
import { uniform } from '../../fixtures/random.ts';
import { type Condition, eventTimes, recorded } from '../conditions.ts';
import type { Trial, Truth } from '../trial.ts';

/**
 * Supply, driver on with a rising level, kick (rise, clamp or breakdown, exponential fall), burn line with a slope, ring, supply.
 * Values are invented within common practice: dwell 2 to 6 ms, kick 100 to 400 V, burn 0.8 to 2 ms.
 */
export function coil(seed: number, condition: Condition) {
  const next = uniform(seed);
  const between = (low: number, high: number) => low + (high - low) * next();
  const supply = between(9.5, 14);
  const dwellS = between(2, 6) * 1e-3;
  const on = between(0.3, 1.3);
  const onRise = between(0.2, 1.2);
  const kick = between(120, 390);
  const riseS = between(4, 14) * 1e-6;
  const topS = between(4, 12) * 1e-6;
  const fallS = between(5, 14) * 1e-6;
  const burnS = between(0.8, 2) * 1e-3;
  const burn = between(28, 0.3 * kick);
  const slope = between(0, 0.15);
  const ringHz = between(1800, 4500);
  const ringTauS = between(0.25, 0.7) * 1e-3;
  const ringHeight = between(0.4, 1) * (burn * (1 + slope) - supply);
  const offs = eventTimes(condition, between(0.02, 0.08), next);
  const afterOff = (t: number) => {
    if (t < riseS) return on + onRise + (kick - on - onRise) * Math.sin((Math.PI / 2) * (t / riseS));
    if (t < riseS + topS) return kick;
    const since = t - riseS - topS;
    if (since < burnS) return burn * (1 + slope * (since / burnS)) + (kick - burn) * Math.exp(-since / fallS);
    const ring = since - burnS;
    return supply + ringHeight * Math.exp(-ring / ringTauS) * Math.cos(2 * Math.PI * ringHz * ring);
  };
  const at = (t: number) => {
    for (let k = offs.length - 1; k >= 0; k -= 1) {
      const off = offs[k]!;
      if (t >= off) return afterOff(t - off);
      if (t >= off - dwellS) return on + onRise * ((t - off + dwellS) / dwellS);
    }
    return supply;
  };
  return {
    next,
    supply,
    dwellS,
    on,
    onRise,
    kick,
    riseS,
    topS,
    fallS,
    burnS,
    burn,
    slope,
    ringHz,
    ringTauS,
    ringHeight,
    offs,
    afterOff,
    at,
  };
}

export function coilVoltageTrial(condition: Condition, seed: number): Trial {
  const c = coil(seed, condition);
  const span = c.kick - c.on;
  const rateHz = condition === 'undersampled' ? 40_000 : c.next() < 0.5 ? 250_000 : 500_000;
  const last = c.offs[c.offs.length - 1]!;
  const first = c.offs[0]!;
  const cut = condition === 'cut ends';
  const fromS = cut ? first - 0.4 * c.dwellS : Math.max(0, first - c.dwellS - 0.008);
  const toS = cut ? last + 0.5 * c.burnS : last + c.burnS + 0.012;
  const noise = condition === 'noise' ? 0.004 * span : 0.1;
  const eightBit = condition === '8-bit' ? ([-50, 450] as const) : undefined;
  const base = { circuit: 'coil-primary-voltage', unit: 'V', rateHz, fromS, toS, seed, noise } as const;
  if (condition === 'dead' || condition === 'floating') {
    const signal = recorded({ ...base, toS: 0.3, fromS: 0, hum: condition === 'floating' ? 0.4 : 0 }, () =>
      condition === 'dead' ? (seed % 2 ? c.supply : 0.03) : 0.2,
    );
    const findings = measureCoilPrimaryVoltage(signal);
    return {
      signal,
      findings,
      truths: [
        { key: 'firing_count', value: 0 },
        ...[
          'dwell',
          'kick_peak',
          'burn_time',
          'burn_level',
          'ring_count',
          'missed_firings',
          'on_level',
          'firing_interval',
        ].map((key) => ({ key, value: null })),
      ],
      notices: [condition === 'floating' ? 'mains-hum' : 'flat-line'],
    };
  }
  const clipAt = condition === 'clipped' ? 0.6 * c.kick : undefined;
  const signal = recorded(
    {
      ...base,
      hum: condition === 'hum' ? 0.3 : 0,
      offset: condition === 'offset' ? 0.6 : 0,
      sign: condition === 'inverted' ? -1 : 1,
      eightBit,
      clipAt,
      railNamed: seed % 2 === 0,
    },
    c.at,
  );
  const findings = measureCoilPrimaryVoltage(signal);
  if (condition === 'inverted') {
    return {
      signal,
      findings,
      truths: ['firing_count', 'dwell', 'kick_peak', 'burn_time', 'supply_level'].map((key) => ({
        key,
        value: null,
      })),
      notices: ['upside-down'],
    };
  }
  const rough =
    condition === 'noise' || condition === 'hum' || condition === '8-bit' || condition === 'undersampled';
  const inTime = (ms: number) => (1000 / rateHz) * (rough ? 2 : 1) + (rough ? 0.01 : 0.002) * ms;
  const shift = condition === 'offset' ? 0.6 : 0;
  const step = eightBit ? 500 / 255 : 0;
  const inLevel = 0.01 * span + step / 2;
  const sampleOf = (t: number) => Math.ceil((t - fromS) * rateHz - 1e-6);
  const highest = (off: number) =>
    Math.max(...signal.values.subarray(sampleOf(off), sampleOf(off + c.riseS + c.topS + 30e-6) + 1));
  const kicks = c.offs.map(highest);
  const complete = (cut ? c.offs.slice(0, -1) : c.offs).length;
  const intervals = c.offs.slice(1).map((at, k) => at - c.offs[k]!);
  const mean = (values: readonly number[]) => values.reduce((sum, one) => sum + one, 0) / values.length;
  const peak = Math.min(mean(kicks), clipAt ?? Number.POSITIVE_INFINITY);
  const truths: Truth[] = [
    { key: 'firing_count', value: c.offs.length },
    {
      key: 'firing_interval',
      value: intervals.length ? 1000 * mean(intervals) : null,
      within: inTime(1000 * mean(intervals)),
    },
    {
      key: 'dwell',
      value: cut && c.offs.length < 2 ? null : 1000 * c.dwellS,
      within: inTime(1000 * c.dwellS),
    },
    { key: 'supply_level', value: c.supply + shift, within: eightBit ? inLevel : Math.min(inLevel, 0.6) },
    {
      key: 'on_level',
      value: c.on + c.onRise / 2 + shift,
      within: (eightBit ? inLevel : Math.min(inLevel, 0.6)) + 0.02,
    },
    { key: 'kick_peak', value: peak, within: 1e-3 * span },
    { key: 'burn_level', value: burnMedian(c) + shift, within: inLevel },
    { key: 'missed_firings', value: intervals.length < 3 ? null : 0 },
  ];
  if (complete > 0) {
    // Clipped below, the fall begins later than its half.
    const late = condition === 'clipped' ? 2000 * c.fallS : 0;
    truths.push({ key: 'burn_time', value: burnTimeMs(c), within: inTime(burnTimeMs(c)) + late });
    const sigma = Math.hypot(noise, step / Math.sqrt(12));
    // An extreme within 4 % of the limit is on either side of it for all that samples can tell of the noise.
    const [most, least] = [ringCount(c, 0.96 * 4 * sigma), ringCount(c, 1.04 * 4 * sigma)];
    truths.push({ key: 'ring_count', value: (most + least) / 2, within: 0.5 + (most - least) / 2 });
  }
  return {
    signal,
    findings,
    truths,
    ...(condition === 'clipped' && { notices: [seed % 2 === 0 ? 'kick-lower-bound' : 'kick-flat-top'] }),
    ...(condition === 'undersampled' && { notices: ['kick-undersampled'] }),
    ...(condition === 'clean' && {
      noNotices: [
        'kick-lower-bound',
        'no-burn-line',
        'missed-firings',
        'probe-factor',
        'ac-coupled',
        'low-kick',
        'no-kick',
      ],
    }),
  };
}

type Coil = ReturnType<typeof coil>;

/** From midway between the kick's peak and the burn line it falls to, to the last passage of halfway from burn to supply, on a grid of 20 ns. */
function burnTimeMs(c: Coil): number {
  let from = c.riseS + c.topS;
  while (c.afterOff(from) > (c.kick + c.burn) / 2) from += 2e-8;
  let to = c.riseS + c.topS + c.burnS;
  while (c.afterOff(to) > (burnMedian(c) + c.supply) / 2) to += 2e-8;
  return 1000 * (to - from);
}

export function burnMedian(c: Coil): number {
  return c.burn * (1 + c.slope / 2);
}

/** Local extremes of the decaying cosine further than `reach` from the supply: where tan(ωt) = −1/(ωτ). */
export function ringCount(c: Coil, reach: number): number {
  const omega = 2 * Math.PI * c.ringHz;
  const first = (Math.PI - Math.atan(1 / (omega * c.ringTauS))) / omega;
  let count = 0;
  for (let k = 0; k < 200; k += 1) {
    const t = first + (k * Math.PI) / omega;
    if (c.ringHeight * Math.exp(-t / c.ringTauS) * Math.abs(Math.cos(omega * t)) > reach) count += 1;
    else break;
  }
  return count;
}
