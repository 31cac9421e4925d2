import { describe, expect, it } from 'vitest';
import { float64Engine } from '../../../src/field/float64-engine.ts';
import { directInverse } from '../../support/direct-dft.ts';
import { scattered } from '../../support/image-scenes.ts';
import { largestDifference, rms } from '../../support/tiny-waves.ts';
import { TRANSFORM } from '../../support/tolerances.ts';

function scatteredSpectrum(N: number): Float64Array {
  return Float64Array.from({ length: 2 * N * N }, (_, i) => scattered(i) - 0.5);
}

function transformed(data: Float64Array, N: number): Float64Array {
  const out = data.slice();
  float64Engine(N).inverse(out);
  return out;
}

describe('float64Engine', () => {
  it.each([2, 4, 8, 16, 32, 64])('%i texels a side: equals the direct sum', (N) => {
    const data = scatteredSpectrum(N);
    const direct = directInverse(data, N);
    expect(largestDifference(transformed(data, N), direct)).toBeLessThan(TRANSFORM * rms(direct));
  });

  it('turns one wavevector into e^{+i k.x}, unscaled, x fastest', () => {
    const N = 16;
    const data = new Float64Array(2 * N * N);
    const [nx, ny] = [3, N - 2];
    data[2 * (ny * N + nx)] = 1;
    const wave = transformed(data, N);
    for (const [ix, iy] of [
      [0, 0],
      [1, 0],
      [0, 1],
      [5, 11],
    ]) {
      const angle = (2 * Math.PI * (3 * ix - 2 * iy)) / N;
      expect(wave[2 * (iy * N + ix)]).toBeCloseTo(Math.cos(angle), 14);
      expect(wave[2 * (iy * N + ix) + 1]).toBeCloseTo(Math.sin(angle), 14);
    }
  });

  it('turns a constant into a point of N^2 at the origin', () => {
    const N = 8;
    const data = new Float64Array(2 * N * N);
    for (let i = 0; i < N * N; i++) data[2 * i] = 1;
    const point = transformed(data, N);
    expect(point[0]).toBe(N * N);
    expect(rms(point.subarray(1))).toBe(0);
  });

  it('keeps nothing of one call for the next', () => {
    const N = 16;
    const engine = float64Engine(N);
    const first = scatteredSpectrum(N);
    engine.inverse(first);
    engine.inverse(new Float64Array(2 * N * N).fill(1e9));
    const again = scatteredSpectrum(N);
    engine.inverse(again);
    expect(again).toEqual(first);
  });
});
