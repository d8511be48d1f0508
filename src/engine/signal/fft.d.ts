/** The part of fft.js that is used here; the package brings no types. Typed arrays are faster than its own plain ones. */
declare module 'fft.js' {
  export default class FFT {
    constructor(size: number);
    readonly size: number;
    /** Fills the first half (size / 2 + 1 complex numbers, real and imaginary in turn) of `out`, of 2 × size numbers. */
    realTransform(out: Float64Array, data: Float64Array): void;
  }
}
