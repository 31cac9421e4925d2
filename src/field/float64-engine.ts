import FFT from 'fft.js';
import type { TransformEngine } from './transform-engine.ts';

/** Side of the squares in which a transpose moves data, complex numbers: two 16 x 16 squares fit the first cache. */
const BLOCK = 16;

/**
 * The reference engine: fft.js in double precision, rows, then columns by way of two transposes.
 *
 * Relative error of a field against a direct sum below 1e-13 (test/unit/field/float64-engine.test.ts).
 *
 * @param resolution N, a power of two of at least 2
 */
export function float64Engine(resolution: number): TransformEngine {
  const N = resolution;
  const fft = new FFT(N);
  const work = new Float64Array(2 * N * N);
  const workRows = rows(work, N);
  // fft.js divides by N; N is a power of two, so multiplying by it again is exact.
  const unscale = N * N;

  return {
    resolution,
    inverse(data) {
      const dataRows = rows(data, N);
      for (let r = 0; r < N; r++) fft.inverseTransform(workRows[r], dataRows[r]);
      transpose(data, work, N);
      for (let r = 0; r < N; r++) fft.inverseTransform(workRows[r], dataRows[r]);
      transpose(data, work, N);
      for (let i = 0; i < data.length; i++) data[i] *= unscale;
    },
  };
}

function rows(data: Float64Array, N: number): Float64Array[] {
  return Array.from({ length: N }, (_, r) => data.subarray(2 * N * r, 2 * N * (r + 1)));
}

/** out[x][y] = data[y][x] for N x N complex numbers. */
function transpose(out: Float64Array, data: Float64Array, N: number): void {
  const side = Math.min(BLOCK, N);
  for (let y0 = 0; y0 < N; y0 += side) {
    for (let x0 = 0; x0 < N; x0 += side) {
      for (let y = y0; y < y0 + side; y++) {
        for (let x = x0; x < x0 + side; x++) {
          const src = 2 * (y * N + x);
          const dst = 2 * (x * N + y);
          out[dst] = data[src];
          out[dst + 1] = data[src + 1];
        }
      }
    }
  }
}
