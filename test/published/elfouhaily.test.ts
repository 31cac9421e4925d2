import { describe, expect, it } from 'vitest';
import { integral } from '../../src/math/quadrature.ts';
import { angularFrequency, groupVelocity } from '../../src/physics/dispersion.ts';
import type { Water } from '../../src/physics/water.ts';
import {
  elfouhaily,
  elfouhailyInverseWaveAge,
  elfouhailySpreading,
  elfouhailyWavenumberSpectrum,
} from '../../src/spectrum/elfouhaily.ts';
import { significantHeight } from '../../src/spectrum/moments.ts';
import { expectPrinted, expectRelative, FEW_ULP } from '../support/tolerances.ts';

// All values computed elsewhere from the formulas as found in public codes; the paper itself was not read.
const g = 9.81;

/** The water of the paper: slowest ripples at 370 rad/m. */
const water: Water = {
  depthM: Infinity,
  gravityMps2: g,
  densityKgpm3: 1000,
  surfaceTensionNpm: (1000 * g) / 370 ** 2,
};

function wind(windSpeedMps: number) {
  return { windSpeedMps, inverseWaveAge: 0.84, frictionVelocityMps: Math.sqrt(0.00144) * windSpeedMps };
}

/** Delta of the spreading at a wavenumber. */
function asymmetry(windSpeedMps: number, k: number): number {
  const spreading = elfouhailySpreading({ form: 'elfouhaily', ...wind(windSpeedMps), gravityMps2: g });
  return spreading.parameter(angularFrequency(k, water));
}

describe('Elfouhaily et al. 1997', () => {
  it.each([
    [0.05, '3.137096', '.999991'],
    [0.1, '3.027242', '.990986'],
    [1, '5.60601e-3', '.305541'],
    [10, '4.045584e-6', '.184704'],
    [100, '7.768655e-9', '.258527'],
    [370, '2.466899e-10', '.369063'],
    [1000, '4.883542e-12', '.290089'],
  ])('10 m/s at %f rad/m', (k, S, Delta) => {
    expectPrinted(elfouhailyWavenumberSpectrum(wind(10), g)(k), S, 'S(k)');
    expectPrinted(asymmetry(10, k), Delta, 'Delta');
  });

  it.each([
    [5, '.276877', '.6474', '.03341', '.01994', '.01347'],
    [10, '.069219', '2.6226', '.06012', '.03539', '.02473'],
    [15, '.030764', '5.8989', '.07937', '.04712', '.03225'],
    [20, '.017305', '10.459', '.09305', '.05595', '.03711'],
  ])('%d m/s: height and slopes', (U10, peak, height, all, up, cross) => {
    const kp = (g * 0.84 ** 2) / U10 ** 2;
    expectPrinted(kp, peak, 'k_p');
    const S = elfouhailyWavenumberSpectrum(wind(U10), g);
    const moment = (f: (k: number) => number): number =>
      integral(
        (lnK) => {
          const k = Math.exp(lnK);
          return S(k) * f(k) * k;
        },
        Math.log(0.1 * kp),
        Math.log(1e5),
        { breakpoints: [0.5 * kp, kp, 2 * kp, 100 * kp, 370, 2000].map(Math.log) },
      );
    expectPrinted(4 * Math.sqrt(moment(() => 1)), height, 'Hs');
    expectPrinted(
      moment((k) => k * k),
      all,
      'mss',
    );
    // The share of cos^2 in [1 + Delta cos 2 theta] / 2 pi is 1/2 + Delta / 4.
    expectPrinted(
      moment((k) => k * k * (0.5 + asymmetry(U10, k) / 4)),
      up,
      'mss up',
    );
    expectPrinted(
      moment((k) => k * k * (0.5 - asymmetry(U10, k) / 4)),
      cross,
      'mss cross',
    );
  });

  it('is the same sea over frequency: S(omega) cg = S(k), the same height', () => {
    const sea = elfouhaily({ form: 'elfouhaily', ...wind(10) }, water);
    const S = elfouhailyWavenumberSpectrum(wind(10), g);
    for (const k of [0.05, 0.1, 1, 100, 370, 1000]) {
      const overK = sea.density(angularFrequency(k, water)) * groupVelocity(k, water);
      expectRelative(overK, S(k), 1e-12, `S(${k})`);
    }
    expectPrinted(significantHeight(sea), '2.6226', 'Hs');
    const shallow = elfouhaily({ form: 'elfouhaily', ...wind(10) }, { ...water, depthM: 5 });
    expect(shallow.density(1.3)).toBe(sea.density(1.3));
  });

  it('has no ripples, rather than negative ones, in a breath of wind', () => {
    const breath = { windSpeedMps: 1, inverseWaveAge: 0.84, frictionVelocityMps: 0.03 };
    const still = { ...breath, frictionVelocityMps: 0.001 };
    expect(elfouhailyWavenumberSpectrum(breath, g)(370)).toBe(elfouhailyWavenumberSpectrum(still, g)(370));
    expect(elfouhailyWavenumberSpectrum({ ...breath, frictionVelocityMps: 0.09 }, g)(370)).toBeGreaterThan(
      elfouhailyWavenumberSpectrum(breath, g)(370),
    );
  });

  it('wave age of a fetch ends at .84 and rises as the fetch shortens', () => {
    expectRelative(elfouhailyInverseWaveAge(10, Infinity, 9.81), 0.84, FEW_ULP, 'open sea');
    const x = 2.2e4;
    expectRelative(
      elfouhailyInverseWaveAge(10, (x * 100) / 9.81, 9.81),
      0.84 * Math.tanh(1) ** -0.75,
      FEW_ULP,
      'x = 22000',
    );
    expect(elfouhailyInverseWaveAge(10, 3000, 9.81)).toBeGreaterThan(2);
    expect(elfouhailyInverseWaveAge(10, 3000, 9.81)).toBeLessThan(3.2);
  });
});
