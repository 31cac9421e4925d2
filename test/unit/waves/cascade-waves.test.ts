import { describe, expect, it } from 'vitest';
import { spectralMoment } from '../../../src/spectrum/moments.ts';
import { frequencySpectrum } from '../../../src/spectrum/registry.ts';
import {
  bandVariances,
  SHORTEST_REPORTED_M,
  seaWaves,
  systemTables,
} from '../../../src/waves/cascade-waves.ts';
import { nyquistWavenumber } from '../../../src/waves/lattice.ts';
import { jonswapSystem, loneCascade, seaRequest } from '../../support/tiny-waves.ts';
import { expectRelative } from '../../support/tolerances.ts';

describe('systemTables', () => {
  const reach = (patchLengthM: number): number => {
    const [{ wavenumber }] = systemTables(seaRequest(), [{ patchLengthM, resolution: 64 }]);
    return wavenumber[wavenumber.length - 1];
  };

  it('reach the shortest waves reported, and the corners of finer lattices', () => {
    expect(reach(100)).toBeGreaterThanOrEqual((2 * Math.PI) / SHORTEST_REPORTED_M);
    expect(reach(100)).toBeLessThan((1.01 * 2 * Math.PI) / SHORTEST_REPORTED_M);
    expect(reach(1)).toBeGreaterThan(Math.SQRT2 * nyquistWavenumber({ patchLengthM: 1, resolution: 64 }));
  });
});

describe('bandVariances', () => {
  it('are the energies of each system between two frequencies', () => {
    const systems = [jonswapSystem('a', 1, 5), jonswapSystem('b', 2, 9)];
    const { water } = seaRequest();
    const tables = systemTables({ water, systems, gains: [] }, []);
    const [low, high] = [0.1, 0.4];
    const band = { low: { kRadPerM: low, fade: 1 }, high: { kRadPerM: high, fade: 1 } };
    const omega = (k: number): number => tables[0].spectrum.intrinsicFrequency(k);
    bandVariances(tables, band).forEach((variance, s) => {
      const spectrum = frequencySpectrum(systems[s].spectrum, water);
      const limits = { fromRadPerS: omega(low), toRadPerS: omega(high) };
      // A hard edge falls between two nodes of the table, 1/512 apart in ln k.
      expectRelative(variance, spectralMoment(spectrum, 0, limits), 3e-3, systems[s].name);
    });
  });
});

describe('seaWaves', () => {
  it('draws every cascade in its own loop', () => {
    const cascades = [
      loneCascade(),
      loneCascade({ patchLengthM: 23, resolution: 32, frameCount: 12, periodS: 1.5 }),
    ];
    const [first, second] = seaWaves(seaRequest({ cascades }));
    expect(first.amplitudes).toMatchObject({ frameCount: 48, periodS: 6 });
    expect(second.amplitudes).toMatchObject({ frameCount: 12, periodS: 1.5 });
    expect(second.amplitudes.lattice).toEqual({ patchLengthM: 23, resolution: 32 });
    expect(second.amplitudes.amplitude).toHaveLength(2 * 32 * 32);
    expect(second.amplitudes.turns.buffer).toBeInstanceOf(SharedArrayBuffer);
  });
});
