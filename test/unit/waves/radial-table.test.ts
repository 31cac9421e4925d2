import { describe, expect, it } from 'vitest';
import { integral } from '../../../src/math/quadrature.ts';
import { angularFrequency, wavenumber } from '../../../src/physics/dispersion.ts';
import { SEA_WATER_DEFAULTS, type Water } from '../../../src/physics/water.ts';
import { spectralMoment } from '../../../src/spectrum/moments.ts';
import { frequencySpectrum } from '../../../src/spectrum/registry.ts';
import { directionalSpectrum } from '../../../src/waves/directional-spectrum.ts';
import { radialIntegral, radialTable, wavevectorDensity } from '../../../src/waves/radial-table.ts';
import type { WaveSystem } from '../../../src/waves/wave-system.ts';
import { scattered } from '../../support/image-scenes.ts';
import { jonswapSystem } from '../../support/tiny-waves.ts';
import { expectRelative, RADIAL_TABLE } from '../../support/tolerances.ts';

const SHALLOW: Water = { ...SEA_WATER_DEFAULTS, depthM: 8 };

function tableOf(system: WaveSystem, water: Water) {
  const spectrum = directionalSpectrum(system, water, []);
  return radialTable(spectrum, 0.0025 * spectrum.peakWavenumberRadPerM, 60);
}

const windSea = jonswapSystem('wind sea', 2, 6, { towardRad: 2.5 });
const hasselmannSea: WaveSystem = {
  ...windSea,
  spreading: { form: 'hasselmann', omegaPeakRadPerS: Math.PI / 3, inverseWaveAge: 1.2, swellNarrowing: 0 },
};
const swell = jonswapSystem('swell', 2, 14, { towardRad: -3, gamma: 10, s: 200 });

const cases: [string, WaveSystem, Water][] = [
  ['a wind sea in deep water', windSea, SEA_WATER_DEFAULTS],
  ['a wind sea on 8 m', windSea, SHALLOW],
  ['spreading that varies with frequency', hasselmannSea, SEA_WATER_DEFAULTS],
  ['a narrow swell', swell, SEA_WATER_DEFAULTS],
];

describe.each(cases)('radial table: %s', (_, system, water) => {
  const table = tableOf(system, water);
  const { spectrum } = table;

  it('interpolates Psi to the named share of its peak', () => {
    const jump = wavenumber(1.05 * spectrum.omegaPeakRadPerS, water);
    let peak = 0;
    let worst = 0;
    for (let i = 0; i < 20_000; i++) {
      const k = spectrum.peakWavenumberRadPerM * Math.exp(4 * (scattered(2 * i) - 0.4));
      // Hasselmann's exponent jumps at 1.05 omega_p; one interval of the table smears it.
      if (Math.abs(Math.log(k / jump)) < 1 / 512) continue;
      const theta = system.towardRad + (scattered(2 * i + 1) - 0.5) * 2 * Math.PI;
      const p = spectrum.spreadingParameter(k);
      const off = Math.atan2(Math.sin(theta - system.towardRad), Math.cos(theta - system.towardRad));
      const D = spectrum.spreadingNormaliser(p) * spectrum.spreadingShape(off, p);
      const Psi = (spectrum.wavenumberDensity(k) / k) * D;
      peak = Math.max(peak, Psi);
      worst = Math.max(
        worst,
        Math.abs(wavevectorDensity(table, k * Math.cos(theta), k * Math.sin(theta)) - Psi),
      );
    }
    expect(worst / peak).toBeLessThan(RADIAL_TABLE);
  });

  it('integrates to the moments of S', () => {
    const S = frequencySpectrum(system.spectrum, water);
    const limits = { fromRadPerS: 0, toRadPerS: angularFrequency(60, water) };
    expectRelative(
      radialIntegral(table, () => 1),
      spectralMoment(S, 0, limits),
      1e-5,
      'm0',
    );
    const m1 = radialIntegral(table, spectrum.intrinsicFrequency);
    expectRelative(m1, spectralMoment(S, 1, limits), 1e-5, 'm1');
  });

  it('integrates over the plane to m0', () => {
    const ring = (k: number): number => {
      const f = (theta: number): number => wavevectorDensity(table, k * Math.cos(theta), k * Math.sin(theta));
      const { towardRad } = system;
      const breakpoints = [towardRad - 0.3, towardRad, towardRad + 0.3];
      return (
        k * integral(f, towardRad - Math.PI, towardRad + Math.PI, { breakpoints, relativeTolerance: 1e-9 })
      );
    };
    for (const factor of [0.9, 1, 1.3, 3]) {
      const k = factor * spectrum.peakWavenumberRadPerM;
      expectRelative(ring(k), spectrum.wavenumberDensity(k), 1e-3, `E(k) at ${factor} k_p`);
    }
  });
});

describe('beyond the table', () => {
  it('there is no energy, and none at k = 0', () => {
    const table = tableOf(windSea, SEA_WATER_DEFAULTS);
    expect(wavevectorDensity(table, 0, 0)).toBe(0);
    expect(wavevectorDensity(table, 100, 0)).toBe(0);
    expect(wavevectorDensity(table, 1e-6, 0)).toBe(0);
  });
});
