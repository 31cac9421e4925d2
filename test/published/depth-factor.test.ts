import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { STANDARD_GRAVITY_MPS2, type Water } from '../../src/physics/water.ts';
import { kitaigorodskiiFactor } from '../../src/spectrum/depth-factor.ts';
import { jonswapAlpha, jonswapDensity } from '../../src/spectrum/jonswap.ts';
import { significantHeight } from '../../src/spectrum/moments.ts';
import { tma, tmaAlpha, tmaLevel } from '../../src/spectrum/tma.ts';
import { expectPrinted, expectRelative, MOMENT, POWERS } from '../support/tolerances.ts';

const checkValues: { phi: { x: number; phi: number; tv: number }[] } = JSON.parse(
  readFileSync(new URL('data/check-spectra.json', import.meta.url), 'utf8'),
);

function water(depthM: number, gravityMps2: number): Water {
  return { depthM, gravityMps2, densityKgpm3: 1025, surfaceTensionNpm: 0.0742 };
}

describe('depth factor of Kitaigorodskii et al. 1975', () => {
  // Computed elsewhere, see data/README.md.
  it.each(checkValues.phi)('omega sqrt(h / g) = $x', ({ x, phi }) => {
    const h = 7;
    const factor = kitaigorodskiiFactor(water(h, STANDARD_GRAVITY_MPS2));
    expectRelative(factor(x * Math.sqrt(STANDARD_GRAVITY_MPS2 / h)), phi, POWERS, 'phi');
  });

  // Thompson & Vincent 1983, the fit in common use (verified): x^2/2 up to 1, 1 - (2 - x)^2/2 up to 2, then 1. Its
  // largest error, .0228 at x = 1.102, was measured elsewhere.
  it('published fit', () => {
    const factor = kitaigorodskiiFactor(water(STANDARD_GRAVITY_MPS2, STANDARD_GRAVITY_MPS2));
    let [worst, at] = [0, 0];
    for (let x = 0.01; x < 4; x += 0.001) {
      const fitted = x <= 1 ? x ** 2 / 2 : x < 2 ? 1 - (2 - x) ** 2 / 2 : 1;
      const error = Math.abs(fitted - factor(x));
      if (error > worst) [worst, at] = [error, x];
    }
    expectPrinted(worst, '.0228', 'largest error');
    expect(at).toBeCloseTo(1.102, 2);
  });

  it('goes to omega^2 h / 2g and to 1', () => {
    const factor = kitaigorodskiiFactor(water(10, 9.81));
    expect(factor(0)).toBe(0);
    expectRelative(factor(1e-5), (1e-10 * 10) / (2 * 9.81), 1e-9, 'phi of long waves');
    expect(factor(1e3)).toBe(1);
    expect(kitaigorodskiiFactor(water(Infinity, 9.81))(1e-9)).toBe(1);
  });
});

describe('TMA, Bouws et al. 1985', () => {
  // pywafo at c831ec8e, doctests of its TMA spectrum: gamma 1, parent Hm0 7 m, Tp 11 s, 10 m of water, g = 9.81.
  // Status: verified.
  it.each([
    [1, '.70106233'],
    [2, '.05022433'],
    [3, '.00669692'],
  ])('gamma 1 at %d rad/s, as printed', (omega, printed) => {
    const omegaPeakRadPerS = (2 * Math.PI) / 11;
    const alpha = jonswapAlpha(7, omegaPeakRadPerS, 1, 9.81);
    const sea = tma({ form: 'tma', alpha, omegaPeakRadPerS, peakEnhancement: 1 }, water(10, 9.81));
    expectPrinted(sea.density(omega), printed, 'S');
  });

  // Same source: JONSWAP 7 m, 11 s, gamma 2.38529836797459, 30 m. Status: verified; the level there is normalised
  // over 0 .. 6 omega_p, which leaves out 1e-3 of the energy.
  it.each([
    [1, 1.0358056],
    [2, 0.03796281],
  ])('gamma 2.385 at %d rad/s, as printed', (omega, printed) => {
    const omegaPeakRadPerS = (2 * Math.PI) / 11;
    const peakEnhancement = 2.38529836797459;
    const alpha = jonswapAlpha(7, omegaPeakRadPerS, peakEnhancement, 9.81);
    const sea = tma({ form: 'tma', alpha, omegaPeakRadPerS, peakEnhancement }, water(30, 9.81));
    expectRelative(sea.density(omega), printed, 1.1e-3, 'S');
  });

  // Height left of a deep sea of 1 m, 8 s, gamma 3.3; g = 9.81. Computed elsewhere.
  it.each([
    [5, '.484061'],
    [10, '.649936'],
    [20, '.830291'],
    [50, '.983672'],
  ])('height in %d m', (depth, printed) => {
    const omegaPeakRadPerS = (2 * Math.PI) / 8;
    const alpha = jonswapAlpha(1, omegaPeakRadPerS, 3.3, 9.81);
    const shape = { form: 'tma', alpha, omegaPeakRadPerS, peakEnhancement: 3.3 } as const;
    expectPrinted(significantHeight(tma(shape, water(depth, 9.81))), printed, 'Hs');
    const inDepth = tmaAlpha(1, omegaPeakRadPerS, 3.3, water(depth, 9.81));
    const sea = tma({ ...shape, alpha: inDepth }, water(depth, 9.81));
    expectRelative(significantHeight(sea), 1, MOMENT, 'Hs stated in this depth');
  });

  // Laws of level and enhancement verified in ScientiMate at baa75db3; values computed elsewhere.
  it.each([
    [10, 50, '.00880770', '2.720794'],
    [15, 100, '.00933098', '2.848690'],
  ])('level in a wind of %d m/s with waves of %d m', (wind, length, alpha, gamma) => {
    const level = tmaLevel(wind, length, STANDARD_GRAVITY_MPS2);
    expectPrinted(level.alpha, alpha, 'alpha');
    expectPrinted(level.peakEnhancement, gamma, 'gamma');
  });

  it('is its parent in deep water', () => {
    const shape = { alpha: 0.01, omegaPeakRadPerS: 0.7, peakEnhancement: 3.3 };
    const parent = jonswapDensity(shape, 9.81);
    const sea = tma({ form: 'tma', ...shape }, water(Infinity, 9.81));
    for (const omega of [0.5, 0.7, 1, 3]) expect(sea.density(omega)).toBe(parent(omega));
    expectRelative(sea.omegaPeak, 0.7, 1e-7, 'peak');
  });

  it('has its largest value where it says', () => {
    const sea = tma({ form: 'tma', alpha: 0.01, omegaPeakRadPerS: 0.6, peakEnhancement: 1 }, water(2, 9.81));
    // phi -> omega^2 h / 2g makes the shape omega^-3 exp(...), with its top at (5/3)^(1/4) omega_p.
    expectRelative(sea.omegaPeak, 0.6 * (5 / 3) ** 0.25, 0.02, 'peak in very shallow water');
    expect(sea.density(sea.omegaPeak)).toBeGreaterThan(sea.density(0.999 * sea.omegaPeak));
    expect(sea.density(sea.omegaPeak)).toBeGreaterThan(sea.density(1.001 * sea.omegaPeak));
  });
});
