/** Units that an answer may be typed in, by what they measure; the number makes the first of its row out of one. */
export const DIMENSIONS = {
  time: { s: 1, ms: 1e-3, µs: 1e-6 },
  voltage: { V: 1, mV: 1e-3, kV: 1e3 },
  current: { A: 1, mA: 1e-3 },
  // 1 Hz is 60 turns a minute (ISO 80000-3), but a frequency is not offered for a speed: which event counts is not said.
  speed: { rpm: 1 },
  frequency: { Hz: 1, kHz: 1e3 },
  angle: { '°': 1 },
  resistance: { Ω: 1, kΩ: 1e3 },
  pressure: { bar: 1, kPa: 0.01, MPa: 10 },
  share: { '%': 1 },
  count: { '1': 1 },
} as const;

export const UNITS = [
  's',
  'ms',
  'µs',
  'V',
  'mV',
  'kV',
  'A',
  'mA',
  'rpm',
  'Hz',
  'kHz',
  '°',
  'Ω',
  'kΩ',
  'bar',
  'kPa',
  'MPa',
  '%',
  '1',
] as const;
export type Unit = (typeof UNITS)[number];
