import { describe, expect, it } from 'vitest';
import { discHalfPlane, forEachWave, occupiedHalfPlane } from '../../../src/field/half-plane.ts';
import type { WaveAmplitudes } from '../../../src/waves/wave-amplitudes.ts';
import { randomWaves } from '../../support/random-waves.ts';

/** Waves at single lattice indices. */
function wavesAt(N: number, places: readonly (readonly [nx: number, ny: number])[]): WaveAmplitudes {
  const amplitude = new Float64Array(2 * N * N);
  for (const [nx, ny] of places) amplitude[2 * (((ny + N) % N) * N + ((nx + N) % N))] = 1;
  const turns = new Int32Array(N * N).fill(1);
  return { lattice: { patchLengthM: 1, resolution: N }, frameCount: 8, periodS: 1, amplitude, turns };
}

describe('the occupied half plane', () => {
  it('holds every wave or its opposite', () => {
    const N = 64;
    const waves = randomWaves({ resolution: N, reach: 20 });
    const seen = new Set<number>();
    forEachWave(occupiedHalfPlane(waves), N, (_w, _ix, iy, i, j) => {
      expect(iy).toBeLessThan(N / 2);
      seen.add(i).add(j);
    });
    for (let i = 0; i < N * N; i++) {
      if (waves.amplitude[2 * i] !== 0) expect(seen.has(i)).toBe(true);
    }
  });

  it('numbers waves without a gap, opposites against each other', () => {
    const N = 32;
    const plane = occupiedHalfPlane(randomWaves({ resolution: N, reach: 9 }));
    let next = 0;
    forEachWave(plane, N, (w, ix, iy, i, j) => {
      expect(w).toBe(next++);
      expect(i).toBe(iy * N + ix);
      expect(j).toBe(((N - iy) % N) * N + ((N - ix) % N));
    });
    expect(next).toBe(4 * plane.vectors);
  });

  it('is one empty row where there is no wave', () => {
    expect(occupiedHalfPlane(wavesAt(16, []))).toEqual({
      rows: 1,
      spans: Uint32Array.of(0, 0),
      vectors: 0,
      inner: true,
    });
  });

  it.each([
    // The opposite of (3, -2) is (-3, 2): one vector westward in rows 0 .. 2.
    ['a wave south', [[3, -2]], [0, 1, 0, 1, 0, 1], true],
    [
      'rows that never grow',
      [
        [5, 3],
        [0, 1],
      ],
      [2, 0, 2, 0, 2, 0, 2, 0],
      true,
    ],
    ['a wave straight south', [[0, -2]], [1, 0, 1, 0, 1, 0], true],
    ['waves along the row of 0', [[-6, 0]], [2, 2], true],
    ['the last wave below N/4', [[7, 0]], [2, 2], true],
    ['the first wave at N/4', [[8, 0]], [3, 2], false],
    ['a wave at N/4 eastward alone', [[8, 1]], [3, 0, 3, 0], false],
    ['a wave at N/4 westward alone', [[-8, 1]], [0, 2, 0, 2], false],
    ['a row at N/4', [[0, 8]], new Array(9).fill([1, 0]).flat(), false],
  ] as const)('of %s', (_what, places, spans, inner) => {
    const plane = occupiedHalfPlane(wavesAt(32, places));
    expect([...plane.spans]).toEqual(spans);
    expect(plane.inner).toBe(inner);
  });

  it('of a disc is that of waves in a disc', () => {
    const N = 64;
    const waves = randomWaves({ resolution: N, reach: 15 });
    expect(discHalfPlane(N, 15)).toEqual(occupiedHalfPlane(waves));
  });
});
