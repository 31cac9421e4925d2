import { bandLimits, bandWeight } from '../waves/band.ts';
import type { CascadeRequest, SeaWavesRequest } from '../waves/cascade-waves.ts';
import { systemTables } from '../waves/cascade-waves.ts';
import { waveIndex, wavenumberStep } from '../waves/lattice.ts';
import { type RadialTable, wavevectorDensity } from '../waves/radial-table.ts';
import { shownShare } from '../waves/turns.ts';

/** What the asked-for sea gives each discrete wave of a cascade before any random draw. */
export interface TargetWaves {
  /** Variance, m^2: Float64Array N*N, lattice order, owned by the caller. */
  readonly variance: Float64Array;
  readonly m0: number;
}

/** Points across a cell, by the larger of |nx| and |ny|; beyond the last entry one. */
const POINTS: readonly (readonly [reach: number, points: number])[] = [
  [2, 48],
  [5, 24],
  [10, 10],
  [24, 4],
  [48, 2],
];

/**
 * Cell integrals of the directional spectrum by the midpoint rule on a fixed grid in every cell: a plainer and slower
 * rule than the one that drew the waves. Within 0.5 % of it in every band that holds a twentieth of the energy
 * (test/unit/verify/target-waves.test.ts).
 *
 * @param request what the waves are drawn from
 * @param cascade one of its cascades
 * @param turns whole turns of each wave, Int32Array N*N: those too fast for the frames are faded as the waves are
 */
export function targetWaves(
  request: SeaWavesRequest,
  cascade: CascadeRequest,
  turns: Int32Array,
): TargetWaves {
  const N = cascade.resolution;
  const dk = wavenumberStep(cascade);
  const tables = systemTables(request, [cascade]);
  const { kMinRadPerM, kMaxRadPerM } = bandLimits(cascade.band);
  const variance = new Float64Array(N * N);
  let m0 = 0;
  for (let iy = 0; iy < N; iy++) {
    const ny = waveIndex(iy, N);
    for (let ix = 0; ix < N; ix++) {
      const nx = waveIndex(ix, N);
      if (nx === -N / 2 || ny === -N / 2 || (nx === 0 && ny === 0)) continue;
      const k = dk * Math.hypot(nx, ny);
      const reach = dk * Math.SQRT1_2;
      if (k + reach < kMinRadPerM || k - reach > kMaxRadPerM) continue;
      const i = iy * N + ix;
      const P = cellIntegral(tables, cascade, nx, ny, dk) * shownShare(turns[i], cascade.frameCount);
      variance[i] = P;
      m0 += P;
    }
  }
  return { variance, m0 };
}

function cellIntegral(
  tables: readonly RadialTable[],
  { band }: CascadeRequest,
  nx: number,
  ny: number,
  dk: number,
): number {
  const size = Math.max(Math.abs(nx), Math.abs(ny));
  const points = POINTS.find(([reach]) => size <= reach)?.[1] ?? 1;
  const h = dk / points;
  let sum = 0;
  for (let b = 0; b < points; b++) {
    const ky = (ny - 0.5) * dk + (b + 0.5) * h;
    for (let a = 0; a < points; a++) {
      const kx = (nx - 0.5) * dk + (a + 0.5) * h;
      const weight = bandWeight(Math.sqrt(kx * kx + ky * ky), band);
      if (weight === 0) continue;
      for (const table of tables) sum += weight * wavevectorDensity(table, kx, ky);
    }
  }
  return sum * h * h;
}
