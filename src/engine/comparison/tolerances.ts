/**
 * How far a value may lie from a single reference. Common practice, no source: our own judgement, kept wide.
 * Up to `inside` the two agree; from `outside` on they differ; between the two a single reference cannot decide.
 * With a band of three or more references these are not used.
 */
export type Tolerance =
  | { readonly kind: 'same'; readonly otherwise: string }
  | { readonly kind: 'degrees'; readonly inside: number; readonly outside: number }
  | { readonly kind: 'share'; readonly inside: number; readonly outside: number | null; readonly why: string }
  | { readonly kind: 'context'; readonly why: string };

const engine = 'It depends on battery, oil and temperature, not on the part alone.';
const controlUnit = 'The control unit chooses it by battery voltage and speed.';
const single = 'One reference cannot say how far good ones lie apart.';

const share = (inside: number, outside: number | null, why = single): Tolerance => ({
  kind: 'share',
  inside,
  outside,
  why,
});

export const TOLERANCES: Readonly<Record<string, Tolerance>> = {
  wheel_pattern: { kind: 'same', otherwise: 'Another wheel: probably not the same engine.' },
  teeth_present: { kind: 'same', otherwise: 'Another count of teeth.' },
  teeth_missing: { kind: 'same', otherwise: 'Another count of missing teeth.' },
  polarity: {
    kind: 'same',
    otherwise:
      'Turned over against the reference. The sensor’s wires or only the probe leads may be swapped: it is a fault only when the leads were in the same order.',
  },
  edges_per_cycle: {
    kind: 'same',
    otherwise: 'Another count of edges: another cam wheel, or edges are lost.',
  },
  current_limited: { kind: 'same', otherwise: 'One is held by a limiter, the other is not.' },
  // The common shift of one belt tooth is 15 to 20 crank degrees; a third of the smaller is surely more than fitting play.
  cam_rising_angles: { kind: 'degrees', inside: 2, outside: 5 },
  cam_falling_angles: { kind: 'degrees', inside: 2, outside: 5 },
  gap_ratio: share(0.1, 0.3),
  peak_to_peak: share(0.25, 0.5, 'The swing grows with speed and with a closer air gap.'),
  level_low: share(0.1, 0.25),
  level_high: share(0.1, 0.25),
  duty: share(0.1, 0.3),
  speed_ripple: share(0.4, null, engine),
  kick_peak: share(0.15, 0.35),
  burn_time: share(0.25, 0.5),
  burn_level: share(0.25, 0.5),
  on_level: share(0.3, 1),
  dwell: share(0.15, null, controlUnit),
  dwell_angle: share(0.15, null, controlUnit),
  pulse_width: share(0.15, null, controlUnit),
  peak_current: share(0.1, 0.3),
  time_constant: share(0.15, 0.4),
  clamp_peak: share(0.1, 0.3),
  inrush_peak: share(0.25, null, engine),
  rest_level: share(0.03, 0.12),
  rpm_mean: { kind: 'context', why: engine },
  rpm_instant: { kind: 'context', why: engine },
  compression_rate: { kind: 'context', why: engine },
  cranking_mean: { kind: 'context', why: engine },
  supply_level: { kind: 'context', why: engine },
  firing_interval: { kind: 'context', why: 'It follows the speed.' },
  ring_count: { kind: 'context', why: 'It depends on the sampling and on the plug.' },
  lowest: { kind: 'context', why: engine },
};

/** Keys that only count what happened to be in the capture. */
export const NOT_COMPARED: ReadonlySet<string> = new Set([
  'rev_count',
  'firing_count',
  'pulse_count',
  'missed_firings',
  'highest',
  'mean',
  'rms',
  'period',
  'frequency',
]);

export const ANY_OTHER: Tolerance = share(0.1, null);
