const PREFIXES: readonly (readonly [factor: number, prefix: string])[] = [
  [1, ''],
  [1e-3, 'm'],
  [1e-6, 'u'],
  [1e-9, 'n'],
  [1e3, 'k'],
  [1e6, 'M'],
];

/**
 * The unit of the numbers as recorded, where factor and offset only change a prefix: volts with factor 0.001 were recorded
 * in mV. Null when a probe or clamp lies between: then the recorded numbers have no unit that could be named.
 */
export function recordedUnit(signal: { unit: string; factor: number; offset: number }): string | null {
  if (signal.offset !== 0 || signal.unit === '') return null;
  const prefix = PREFIXES.find(([factor]) => factor === signal.factor);
  return prefix === undefined ? null : prefix[1] + signal.unit;
}
