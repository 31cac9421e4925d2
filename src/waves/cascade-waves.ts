import type { Current, Water } from '../physics/water.ts';
import { type Band, bandWeight } from './band.ts';
import { directionalSpectrum } from './directional-spectrum.ts';
import { type Lattice, nyquistWavenumber } from './lattice.ts';
import { type RadialTable, radialIntegral, radialTable } from './radial-table.ts';
import { type CascadeWaves, waveAmplitudes } from './wave-amplitudes.ts';
import type { WavelengthGain, WaveSystem } from './wave-system.ts';

/** What the waves of a whole sea are made from; a plan holds all of it. */
export interface SeaWavesRequest {
  readonly water: Water;
  readonly current: Current;
  readonly systems: readonly WaveSystem[];
  readonly gains: readonly WavelengthGain[];
  readonly cascades: readonly CascadeRequest[];
  readonly seed: number;
  readonly amplitudes: 'gaussian' | 'deterministic';
  readonly matchHeight: boolean;
}

export interface CascadeRequest extends Lattice {
  readonly band: Band;
  readonly frameCount: number;
  readonly periodS: number;
}

/** Shortest wave the tables reach, m, whatever the cascades do: reports speak of all waves longer than this. */
export const SHORTEST_REPORTED_M = 0.1;

/** Below this share of the peak frequency a system's energy counts as none. */
const LONGEST_PERIOD_SHARE = 0.05;

/** Radial tables of all systems, wide enough for every cascade. */
export function systemTables(
  request: Pick<SeaWavesRequest, 'water' | 'systems' | 'gains'>,
  lattices: readonly Lattice[],
): readonly RadialTable[] {
  const cornerK = Math.max(0, ...lattices.map((lattice) => Math.SQRT2 * 1.01 * nyquistWavenumber(lattice)));
  const kMax = Math.max((2 * Math.PI) / SHORTEST_REPORTED_M, cornerK);
  return request.systems.map((system) => {
    const spectrum = directionalSpectrum(system, request.water, request.gains);
    return radialTable(
      spectrum,
      LONGEST_PERIOD_SHARE * LONGEST_PERIOD_SHARE * spectrum.peakWavenumberRadPerM,
      kMax,
    );
  });
}

/** m0 of each system within a band, m^2. */
export function bandVariances(tables: readonly RadialTable[], band: Band): readonly number[] {
  return tables.map((table) => radialIntegral(table, (k) => bandWeight(k, band)));
}

/** Draws the waves of every cascade. Depends on its argument alone, to the bit on one kind of runtime. */
export function seaWaves(request: SeaWavesRequest): readonly CascadeWaves[] {
  const tables = systemTables(request, request.cascades);
  const { water, current, seed, amplitudes, matchHeight } = request;
  return request.cascades.map((cascade) => {
    const { patchLengthM, resolution, band, frameCount, periodS } = cascade;
    return waveAmplitudes({
      tables,
      bandVariances: bandVariances(tables, band),
      lattice: { patchLengthM, resolution },
      band,
      water,
      current,
      frameCount,
      periodS,
      seed,
      amplitudes,
      matchHeight,
    });
  });
}
