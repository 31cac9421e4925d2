import { describe, expect, it } from 'vitest';
import { planeTransform } from '../../../src/verify/plane-transform.ts';
import { directInverse } from '../../support/direct-dft.ts';
import { scattered } from '../../support/image-scenes.ts';
import { TRANSFORM } from '../../support/tolerances.ts';

function scatteredPlane(count: number, seed: number): Float64Array {
  return Float64Array.from({ length: count }, (_, i) => scattered(seed + i) - 0.5);
}

function largestDifference(a: Float64Array, b: Float64Array): number {
  return a.reduce((most, value, i) => Math.max(most, Math.abs(value - b[i])), 0);
}

describe.each([2, 4, 8, 16, 32])('the transform of %i x %i texels', (N) => {
  const transform = planeTransform(N);

  it('synthesises what a sum term by term does', () => {
    const F = scatteredPlane(2 * N * N, 1);
    const direct = directInverse(F, N);
    transform.synthesise(F);
    expect(largestDifference(F, direct)).toBeLessThan(TRANSFORM * 30 * N);
  });

  it('finds the coefficients that a field was made from', () => {
    const [re, im] = [scatteredPlane(N * N, 2), scatteredPlane(N * N, 9000)];
    const F = new Float64Array(2 * N * N);
    transform.fillCoefficients(F, re, im);
    const f = directInverse(F, N);
    expect(
      largestDifference(
        f.filter((_, i) => i % 2 === 0),
        re,
      ),
    ).toBeLessThan(TRANSFORM * 30);
    expect(
      largestDifference(
        f.filter((_, i) => i % 2 === 1),
        im,
      ),
    ).toBeLessThan(TRANSFORM * 30);
  });
});

it('puts cos(k.x) at k and -k, sin(k.x) at minus and plus i', () => {
  const N = 16;
  const [nx, ny] = [3, -2];
  const theta = (i: number): number => (2 * Math.PI * (nx * (i % N) + ny * Math.floor(i / N))) / N;
  const field = Float64Array.from(
    { length: N * N },
    (_, i) => 2 * Math.cos(theta(i)) + 4 * Math.sin(theta(i)),
  );
  const F = new Float64Array(2 * N * N);
  planeTransform(N).fillCoefficients(F, field, null);
  const at = (x: number, y: number): number => 2 * (((y + N) % N) * N + ((x + N) % N));
  expect(F[at(nx, ny)]).toBeCloseTo(1, 13);
  expect(F[at(nx, ny) + 1]).toBeCloseTo(-2, 13);
  expect(F[at(-nx, -ny)]).toBeCloseTo(1, 13);
  expect(F[at(-nx, -ny) + 1]).toBeCloseTo(2, 13);
});
