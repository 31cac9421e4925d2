import { describe, expect, it } from 'vitest';
import { nyquistWavenumber, oppositeIndex, waveIndex, wavenumberStep } from '../../../src/waves/lattice.ts';

describe('lattice', () => {
  it('indices run 0 .. N/2 - 1, -N/2 .. -1', () => {
    const indices = Array.from({ length: 8 }, (_, i) => waveIndex(i, 8));
    expect(indices).toEqual([0, 1, 2, 3, -4, -3, -2, -1]);
  });

  it('opposite indices hold opposite waves; zero and Nyquist are their own', () => {
    for (let i = 0; i < 16; i++) {
      const opposite = waveIndex(oppositeIndex(i, 16), 16);
      expect(opposite).toBe(i === 8 ? -8 : i === 0 ? 0 : -waveIndex(i, 16));
    }
  });

  it('one wave across is the step, two texels a wave is Nyquist', () => {
    const lattice = { patchLengthM: 50, resolution: 32 };
    expect(wavenumberStep(lattice)).toBe((2 * Math.PI) / 50);
    expect(nyquistWavenumber(lattice)).toBeCloseTo((2 * Math.PI) / (2 * (50 / 32)), 14);
  });
});
