declare module 'fft.js' {
  /** Radix-4 complex transform of a power-of-two size; arrays are interleaved re, im. Not re-entrant. */
  export default class FFT {
    constructor(size: number);
    /** e^{+i...}, divided by the size; `out` and `data` must differ. */
    inverseTransform(out: Float64Array, data: Float64Array): void;
  }
}
