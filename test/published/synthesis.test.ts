import { describe, expect, it } from 'vitest';
import { cothKh } from '../../src/physics/dispersion.ts';
import { SEA_WATER_DEFAULTS } from '../../src/physics/water.ts';
import { directionalSpectrum } from '../../src/waves/directional-spectrum.ts';
import { radialTable, wavevectorDensity } from '../../src/waves/radial-table.ts';
import { jonswapSystem } from '../support/tiny-waves.ts';
import { expectPrinted, expectRelative, RADIAL_TABLE } from '../support/tolerances.ts';

/*
 * Values computed from published formulas by an independent program (another language, without surface tension).
 * Status: computed elsewhere.
 */

const WITHOUT_TENSION = { ...SEA_WATER_DEFAULTS, surfaceTensionNpm: 0 };
/** JONSWAP of 2 m, 6 s, gamma 3.3; cos^20 of half the angle; going east. */
const SYSTEM = jonswapSystem('sea', 2, 6);

/** Psi(k) straight from the spectrum. */
function Psi(kEast: number, kNorth: number, depthM: number): number {
  const spectrum = directionalSpectrum(SYSTEM, { ...WITHOUT_TENSION, depthM }, []);
  const k = Math.hypot(kEast, kNorth);
  const p = spectrum.spreadingParameter(k);
  const D = spectrum.spreadingNormaliser(p) * spectrum.spreadingShape(Math.atan2(kNorth, kEast), p);
  return (spectrum.wavenumberDensity(k) / k) * D;
}

describe('variance per wavevector, m^4', () => {
  it.each([
    [0.1, 0, Infinity, '23.456900'],
    [0.15, 0.05, Infinity, '3.4854212'],
    [0.3, 0.3, Infinity, '.026888588'],
    [0.05, -0.1, Infinity, '1.1019635'],
    [0.1, 0, 10, '8.8195003'],
    [0.15, 0.05, 10, '5.8488045'],
  ])('at (%f, %f) on %f m', (kEast, kNorth, depthM, printed) => {
    expectPrinted(Psi(kEast, kNorth, depthM), printed, 'Psi');
    const spectrum = directionalSpectrum(SYSTEM, { ...WITHOUT_TENSION, depthM }, []);
    const tabulated = wavevectorDensity(radialTable(spectrum, 1e-4, 10), kEast, kNorth);
    expect(Math.abs(tabulated - Number(printed))).toBeLessThan(RADIAL_TABLE * 23.5);
  });

  // Sums of Psi dk^2 at the wavevectors themselves: what a point sample would give, no cell integral.
  it.each<[number, number, string, string]>([
    [256, 256, '1.99797', '.016606'],
    [512, 512, '1.99908', '.016622'],
  ])('summed over the wavevectors of %i texels on %f m', (N, L, height, slope) => {
    const spectrum = directionalSpectrum(SYSTEM, WITHOUT_TENSION, []);
    const table = radialTable(spectrum, 1e-4, 10);
    const dk = (2 * Math.PI) / L;
    let [m0, slopeVariance] = [0, 0];
    for (let ny = -N / 2; ny < N / 2; ny++) {
      for (let nx = -N / 2; nx < N / 2; nx++) {
        const P = wavevectorDensity(table, nx * dk, ny * dk) * dk * dk;
        m0 += P;
        slopeVariance += P * (nx * nx + ny * ny) * dk * dk;
      }
    }
    expectPrinted(4 * Math.sqrt(m0), height, 'Hs');
    expectPrinted(slopeVariance, slope, 'slope variance');
  });
});

describe('stretch of the horizontal orbit over water of finite depth', () => {
  it.each([
    [0.1, '10.033311'],
    [0.5, '2.1639534'],
    [1, '1.3130353'],
    [2, '1.0373147'],
    [3, '1.0049698'],
  ])('coth(%f)', (kh, printed) => {
    expectPrinted(cothKh(kh, 1), printed, 'coth kh');
    expectRelative(cothKh(kh / 7, 7), Number(printed), 1e-7, 'coth kh');
  });
});
