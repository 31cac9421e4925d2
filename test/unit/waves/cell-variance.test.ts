import { describe, expect, it } from 'vitest';
import { integral } from '../../../src/math/quadrature.ts';
import { SEA_WATER_DEFAULTS, type Water } from '../../../src/physics/water.ts';
import { type Band, bandWeight } from '../../../src/waves/band.ts';
import { type CellVariances, cellVariances } from '../../../src/waves/cell-variance.ts';
import { directionalSpectrum } from '../../../src/waves/directional-spectrum.ts';
import type { Lattice } from '../../../src/waves/lattice.ts';
import {
  type RadialTable,
  radialIntegral,
  radialTable,
  wavevectorDensity,
} from '../../../src/waves/radial-table.ts';
import type { WaveSystem } from '../../../src/waves/wave-system.ts';
import { jonswapSystem, loneBand } from '../../support/tiny-waves.ts';
import { CELL_SUM, expectRelative } from '../../support/tolerances.ts';

interface Cells extends CellVariances {
  /** m0 of the band by one-dimensional integration. */
  readonly bandVariance: number;
}

/** Radial tables by system and water: they do not depend on direction. */
const tables = new Map<string, RadialTable>();

function tableOf(system: WaveSystem, water: Water): RadialTable {
  const key = JSON.stringify([system.spectrum, system.spreading, String(water.depthM)]);
  const spectrum = directionalSpectrum(system, water, []);
  const table = tables.get(key) ?? radialTable(spectrum, 0.0025 * spectrum.peakWavenumberRadPerM, 10);
  tables.set(key, table);
  return { ...table, spectrum };
}

function cellsOf(
  system: WaveSystem,
  lattice: Lattice,
  band = loneBand(lattice),
  water = SEA_WATER_DEFAULTS,
): Cells {
  const table = tableOf(system, water);
  const bandVariance = radialIntegral(table, (k) => bandWeight(k, band));
  return { ...cellVariances(table, lattice, band, bandVariance), bandVariance };
}

/** Along an axis, between, along a diagonal, and in the opposite quadrant. */
const DIRECTIONS_DEG = [0, 22, 45, -141];

const swell14s = (gamma: number, s: number, degrees: number): WaveSystem =>
  jonswapSystem('swell', 2, 14, { gamma, s, towardRad: (degrees * Math.PI) / 180 });

describe('cells of a 14 s swell and the cell round k = 0 sum to the band', () => {
  const cases = [250, 500, 1000, 2000].flatMap((L) => [
    [5, 25, L],
    [5, 75, L],
    [10, 200, L],
  ]);
  it.each(cases)('gamma %i, s %i, patch of %i m', (gamma, s, patchLengthM) => {
    for (const degrees of DIRECTIONS_DEG) {
      const { m0, zeroCell, bandVariance } = cellsOf(swell14s(gamma, s, degrees), {
        patchLengthM,
        resolution: 64,
      });
      expectRelative(m0 + zeroCell, bandVariance, CELL_SUM, `toward ${degrees}`);
    }
  });

  it('all but one way: gamma 9, s 10 000, patch of 5200 m', () => {
    const { m0, zeroCell, bandVariance } = cellsOf(swell14s(9, 10_000, 3), {
      patchLengthM: 5200,
      resolution: 128,
    });
    expectRelative(m0 + zeroCell, bandVariance, CELL_SUM, 'sum');
  });

  // Ranges over directions, computed elsewhere by another quadrature.
  it.each([
    [5, 25, 2.6, 6.5],
    [5, 75, 2.1, 8.2],
    [10, 200, 1.3, 7.3],
  ])('gamma %i, s %i, 250 m: the cell round k = 0 takes %f to %f percent', (gamma, s, least, most) => {
    const shares = [0, 7.5, 15, 22.5, 30, 37.5, 45].map((degrees) => {
      const { zeroCell, bandVariance } = cellsOf(swell14s(gamma, s, degrees), {
        patchLengthM: 250,
        resolution: 64,
      });
      return (100 * zeroCell) / bandVariance;
    });
    expect(Math.abs(Math.min(...shares) - least)).toBeLessThan(0.06);
    expect(Math.abs(Math.max(...shares) - most)).toBeLessThan(0.06);
  });
});

describe('cells of wind seas sum to the band', () => {
  const shallow: Water = { ...SEA_WATER_DEFAULTS, depthM: 5 };
  const fine: Band = { low: { kRadPerM: 0.55, fade: 1.25 }, high: { kRadPerM: 4, fade: 1.25 } };
  const cases: [string, Lattice, Band, Water][] = [
    [
      'on their own patch',
      { patchLengthM: 375, resolution: 128 },
      loneBand({ patchLengthM: 375, resolution: 128 }),
      SEA_WATER_DEFAULTS,
    ],
    ['in a band of a finer patch', { patchLengthM: 81, resolution: 128 }, fine, SEA_WATER_DEFAULTS],
    [
      'on 5 m of water',
      { patchLengthM: 200, resolution: 64 },
      loneBand({ patchLengthM: 200, resolution: 64 }),
      shallow,
    ],
    [
      'in a narrow band',
      { patchLengthM: 100, resolution: 64 },
      { low: { kRadPerM: 0.5, fade: 1.05 }, high: { kRadPerM: 0.6, fade: 1.05 } },
      SEA_WATER_DEFAULTS,
    ],
  ];
  it.each(cases)('%s', (_, lattice, band, water) => {
    for (const degrees of DIRECTIONS_DEG) {
      const system = jonswapSystem('sea', 2.1, 6.2, { towardRad: (degrees * Math.PI) / 180 });
      const { m0, zeroCell, bandVariance } = cellsOf(system, lattice, band, water);
      expectRelative(m0 + zeroCell, bandVariance, CELL_SUM, `toward ${degrees}`);
    }
  });
});

describe('a single cell', () => {
  const lattice = { patchLengthM: 500, resolution: 64 };
  const system = swell14s(10, 200, 22);

  it('holds the integral of Psi over it', () => {
    const table = tableOf(system, SEA_WATER_DEFAULTS);
    const { variance, bandVariance } = cellsOf(system, lattice);
    const dk = (2 * Math.PI) / lattice.patchLengthM;
    for (const [nx, ny] of [
      [1, 1],
      [2, 1],
      [1, 0],
      [3, 1],
    ]) {
      const row = (y: number): number =>
        integral((x) => wavevectorDensity(table, x, y), (nx - 0.5) * dk, (nx + 0.5) * dk, {
          relativeTolerance: 1e-6,
          absoluteTolerance: 1e-9,
        });
      const cell = integral(row, (ny - 0.5) * dk, (ny + 0.5) * dk, {
        relativeTolerance: 1e-6,
        absoluteTolerance: 1e-8,
      });
      expect(Math.abs(variance[ny * 64 + nx] - cell)).toBeLessThan(2e-4 * bandVariance);
    }
  });

  it('is nothing at k = 0, on the Nyquist row and column, and outside the band', () => {
    const N = 32;
    const wide: Band = { low: { kRadPerM: 0.05, fade: 1.1 }, high: { kRadPerM: 1, fade: 1.1 } };
    const { variance } = cellsOf(system, { patchLengthM: 500, resolution: N }, wide);
    const dk = (2 * Math.PI) / 500;
    expect(variance[0]).toBe(0);
    for (let i = 0; i < N; i++) {
      expect(variance[(N / 2) * N + i] + variance[i * N + N / 2]).toBe(0);
      if (i > 0 && (i + 0.5) * dk < 0.05 / 1.1 / Math.SQRT2) expect(variance[i]).toBe(0);
    }
    expect(variance[5 * N + 5]).toBeGreaterThan(0);
  });
});
