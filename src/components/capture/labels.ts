/** What each measured key is called on the page, in words of the trade. Keys: the table of measurements. */
export const LABELS: Readonly<Record<string, string>> = {
  wheel_pattern: 'Wheel, found',
  teeth_present: 'Teeth present, a turn',
  teeth_missing: 'Teeth missing, a turn',
  gap_ratio: 'Gap to tooth period',
  rev_count: 'Complete turns',
  rpm_mean: 'Speed, mean',
  rpm_instant: 'Speed, tooth to tooth',
  speed_ripple: 'Speed ripple in 720°',
  polarity: 'Polarity between the leads',
  irregular_teeth: 'Irregular teeth',
  compression_balance: 'Compression balance',
  peak_to_peak: 'Swing height, mean',
  level_low: 'Level, low',
  level_high: 'Level, high',
  duty: 'Duty',
  cam_rising_angles: 'Rising edge',
  cam_falling_angles: 'Falling edge',
  edges_per_cycle: 'Edges in 720°',
  firing_count: 'Firings',
  firing_interval: 'Interval',
  dwell: 'Dwell',
  dwell_angle: 'Dwell angle',
  supply_level: 'Supply',
  on_level: 'On level',
  on_level_slope: 'On level, climb',
  kick_peak: 'Kick, highest sample',
  burn_time: 'Burn time',
  burn_level: 'Burn level, median',
  ring_count: 'Ring, half-swings',
  missed_firings: 'Missed firings',
  peak_current: 'Peak current',
  current_limited: 'Current held flat',
  time_constant: 'Time constant of the rise',
  pulse_count: 'Pulses',
  pulse_width: 'Pulse width',
  active_state: 'Active level',
  clamp_peak: 'Spike at switch-off',
  hump_time: 'Needle hump after switch-off',
  inrush_peak: 'Inrush, highest sample',
  cranking_mean: 'While cranking, mean',
  compression_rate: 'Compressions',
  rest_level: 'At rest',
  lowest: 'Lowest',
  highest: 'Highest',
  mean: 'Mean',
  rms: 'RMS',
  period: 'Period',
  frequency: 'Frequency',
  ripple_rate: 'Ripple',
  pump_speed: 'Pump speed',
};

/** A key that this page does not know yet is shown in its own words rather than left out. */
export const labelOf = (key: string): string => {
  const known = LABELS[key];
  if (known !== undefined) return known;
  const words = key.replaceAll('_', ' ');
  return words.charAt(0).toUpperCase() + words.slice(1);
};

/** Label of one part of a list, counted from 1. */
export const partLabel = (key: string, part: number): string => `${labelOf(key)} ${part}`;
