import FFT from 'fft.js';
import { oppositeIndex } from '../waves/lattice.ts';

/**
 * Fourier coefficients of tile-periodic fields, and back. Verification's own: it shares no code with the engines that
 * make frames.
 *
 *     f(x) = sum over k of F(k) e^{i k.x},   x = (ix, iy) L / N
 *
 * Arrays are Float64Arrays of 2*N*N, interleaved re, im, row-major [iy][ix]; coefficients in lattice order.
 */
export interface PlaneTransform {
  readonly resolution: number;
  /** Fills F of the complex field re + i im (each Float64Array N*N; `im` null is 0). */
  readonly fillCoefficients: (F: Float64Array, re: Float64Array, im: Float64Array | null) => void;
  /** Turns F into f, in place. */
  readonly synthesise: (F: Float64Array) => void;
}

/** Columns gathered at once: a line of the cache holds four complex numbers, and rows lie a power of two apart. */
const COLUMNS_AT_ONCE = 8;

/** @param resolution N, a power of two of at least 2 */
export function planeTransform(resolution: number): PlaneTransform {
  const N = resolution;
  const fft = new FFT(N);
  const line = new Float64Array(2 * N);
  const group = Math.min(COLUMNS_AT_ONCE, N);
  const lines = Array.from({ length: group }, () => new Float64Array(2 * N));
  const results = Array.from({ length: group }, () => new Float64Array(2 * N));

  // fft.js's inverse has e^{+i...} and divides by N.
  const alongRows = (data: Float64Array): void => {
    for (let row = 0; row < N; row++) {
      const part = data.subarray(2 * N * row, 2 * N * (row + 1));
      line.set(part);
      fft.inverseTransform(part, line);
    }
  };
  const alongColumns = (data: Float64Array): void => {
    for (let x = 0; x < N; x += group) {
      for (let y = 0; y < N; y++) {
        for (let g = 0, i = 2 * (y * N + x); g < group; g++, i += 2) {
          lines[g][2 * y] = data[i];
          lines[g][2 * y + 1] = data[i + 1];
        }
      }
      for (let g = 0; g < group; g++) fft.inverseTransform(results[g], lines[g]);
      for (let y = 0; y < N; y++) {
        for (let g = 0, i = 2 * (y * N + x); g < group; g++, i += 2) {
          data[i] = results[g][2 * y];
          data[i + 1] = results[g][2 * y + 1];
        }
      }
    }
  };

  return {
    resolution,
    fillCoefficients(F, re, im) {
      // (1/N^2) sum f e^{+ik.x} is the coefficient of -k: laid out the other way round it is F.
      for (let iy = 0; iy < N; iy++) {
        const row = oppositeIndex(iy, N) * N;
        for (let ix = 0, i = iy * N; ix < N; ix++, i++) {
          const o = 2 * (row + oppositeIndex(ix, N));
          F[o] = re[i];
          F[o + 1] = im === null ? 0 : im[i];
        }
      }
      alongRows(F);
      alongColumns(F);
    },
    synthesise(F) {
      alongRows(F);
      alongColumns(F);
      for (let i = 0; i < F.length; i++) F[i] *= N * N;
    },
  };
}
