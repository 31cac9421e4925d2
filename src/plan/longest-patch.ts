import { peakHalfWidth } from '../waves/directional-spectrum.ts';
import { type RadialTable, radialIntegral, wavevectorDensity } from '../waves/radial-table.ts';

/** Effective number of waves wanted on the longest patch: below 40 single crests are recognised when they return. */
export const EFFECTIVE_WAVES = 100;
/** Waves of the peak across the longest patch, at least. */
const PEAK_WAVES_ACROSS = 5;
/** Angles on the circle, times the half-width of the spreading in radians, that integrate D^2 to 1e-4. */
const ANGLES_PER_HALF_WIDTH = 10;
/** A patch is not lengthened beyond this for the sake of effective waves alone, m. */
const LONGEST_FOR_WAVES_M = 4000;

/**
 * Effective number of waves of a system on a patch, m0^2 / sum P^2, from the continuous spectrum:
 *
 *     Neff = m0^2 L^2 / (4 pi^2 integral of Psi^2 dk)
 */
export function effectiveWaveCount(table: RadialTable, patchLengthM: number): number {
  const m0 = radialIntegral(table, () => 1);
  return (m0 * patchLengthM) ** 2 / (4 * Math.PI ** 2 * squaredDensityIntegral(table));
}

/** The patch length, m, that one system wants: five peak waves across and 100 effective waves, whichever is longer. */
export function patchLengthFor(table: RadialTable): number {
  const m0 = radialIntegral(table, () => 1);
  const forPeak = (PEAK_WAVES_ACROSS * 2 * Math.PI) / table.spectrum.peakWavenumberRadPerM;
  const forWaves = (2 * Math.PI * Math.sqrt(EFFECTIVE_WAVES * squaredDensityIntegral(table))) / m0;
  return Math.min(Math.max(forPeak, forWaves), Math.max(LONGEST_FOR_WAVES_M, forPeak));
}

/** Share of the systems' m0 within the cell round k = 0 of a patch of this length. */
export function zeroCellShare(tables: readonly RadialTable[], patchLengthM: number): number {
  const halfStep = Math.PI / patchLengthM;
  let total = 0;
  let inside = 0;
  for (const table of tables) {
    total += radialIntegral(table, () => 1);
    // The share of a circle of radius k that lies inside the square cell, averaged over all directions.
    inside += radialIntegral(table, (k) => {
      if (k <= halfStep) return 1;
      if (k >= halfStep * Math.SQRT2) return 0;
      return 1 - (4 / Math.PI) * Math.acos(halfStep / k);
    });
  }
  return inside / total;
}

/** Integral of Psi^2 over the wavevector plane, m^6: rings of the table times a sum over angle. */
function squaredDensityIntegral(table: RadialTable): number {
  const angles = Math.max(180, Math.ceil(ANGLES_PER_HALF_WIDTH / peakHalfWidth(table.spectrum)));
  const every = 8;
  let sum = 0;
  for (let i = 0; i < table.wavenumber.length; i += every) {
    const k = table.wavenumber[i];
    if (table.density[i] === 0) continue;
    let ring = 0;
    for (let a = 0; a < angles; a++) {
      const theta = (2 * Math.PI * a) / angles;
      ring += wavevectorDensity(table, k * Math.cos(theta), k * Math.sin(theta)) ** 2;
    }
    sum += ring * k * k;
  }
  return sum * ((2 * Math.PI) / angles) * (every / table.nodesPerLn);
}
