/**
 * Weights of the samples before a spectrum: sums of cosines, w(i) = a0 - a1 cos(2 pi i/n) + a2 cos(4 pi i/n) - …, periodic as a
 * transform needs them. Coefficients: none, Hann and Blackman from F. J. Harris, "On the use of windows for harmonic analysis
 * with the discrete Fourier transform", Proc. IEEE 66 (1978) 51-83; flat top from scipy.signal.windows.flattop (after
 * D'Antona and Ferrero, "Digital Signal Processing for Measurement Systems", 2006).
 */
export const WINDOW_FUNCTIONS = {
  none: [1],
  hann: [0.5, 0.5],
  blackman: [0.42, 0.5, 0.08],
  flattop: [0.21557895, 0.41663158, 0.277263158, 0.083578947, 0.006947368],
} as const satisfies Record<string, readonly number[]>;

export type WindowFunction = keyof typeof WINDOW_FUNCTIONS;

/** Weight of sample `i` of `n`. */
export function weightOf(window: WindowFunction, i: number, n: number): number {
  const terms = WINDOW_FUNCTIONS[window];
  let weight = 0;
  for (let k = 0; k < terms.length; k += 1) {
    weight += (k % 2 === 0 ? 1 : -1) * terms[k]! * Math.cos((2 * Math.PI * k * i) / n);
  }
  return weight;
}

/** Half the width of the main lobe in steps of 1/length: two lines closer than this are one. */
export const lobeBins = (window: WindowFunction): number => WINDOW_FUNCTIONS[window].length;

/**
 * Highest that a line of amplitude 1 may show `bins` steps of 1/length beside itself, outside of its main lobe: the envelope of
 * the transform of a sum of cosines, sin(pi d)/pi * sum of b_k d/(d^2 - k^2) over b_0, with the sine taken as 1.
 */
export function leakage(window: WindowFunction, bins: number): number {
  const d = Math.abs(bins);
  if (d <= lobeBins(window)) return 1;
  const terms = WINDOW_FUNCTIONS[window];
  let sum = 0;
  for (let k = 0; k < terms.length; k += 1) sum += ((k % 2 === 0 ? 1 : -1) * terms[k]!) / (d * d - k * k);
  return Math.min(Math.abs((d / Math.PI) * sum) / terms[0]!, 1);
}
