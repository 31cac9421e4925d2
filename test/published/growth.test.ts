import { describe, expect, it } from 'vitest';
import { wavelengthM, wavenumber } from '../../src/physics/dispersion.ts';
import { DEVELOPED_FETCH, inverseWaveAge, jonswapGrowth } from '../../src/physics/growth.ts';
import { SEA_WATER_DEFAULTS, STANDARD_GRAVITY_MPS2 } from '../../src/physics/water.ts';
import { jonswap } from '../../src/spectrum/jonswap.ts';
import { significantHeight } from '../../src/spectrum/moments.ts';
import { expectPrinted, expectRelative } from '../support/tolerances.ts';

const g = STANDARD_GRAVITY_MPS2;
const water = { ...SEA_WATER_DEFAULTS, surfaceTensionNpm: 0 };

function seaHeight(windSpeedMps: number, fetchM: number): number {
  return significantHeight(jonswap({ form: 'jonswap', ...jonswapGrowth(windSpeedMps, fetchM, g) }, water));
}

describe('JONSWAP growth with the fetch', () => {
  // Stewart 2008, eqs 16.35 to 16.37 (verified): alpha = .076 x^-.22, omega_p = 22 (g^2 / (U X))^(1/3); values
  // computed elsewhere.
  it.each([
    [10, 10e3, '.0166986', '2.89341'],
    [10, 100e3, '.0100619', '6.23366'],
    [15, 50e3, '.0140083', '5.66366'],
    [20, 100e3, '.0136500', '7.85392'],
    [20, 300e3, '.0107193', '11.3273'],
  ])('%d m/s over %d m', (wind, fetch, alpha, period) => {
    const growth = jonswapGrowth(wind, fetch, g);
    expectPrinted(growth.alpha, alpha, 'alpha');
    expectPrinted((2 * Math.PI) / growth.omegaPeakRadPerS, period, 'Tp');
    expect(growth.peakEnhancement).toBe(3.3);
    expect(growth.fullyDeveloped).toBe(false);
  });

  // Significant heights and peak lengths computed elsewhere with the same cap and fall of gamma.
  it.each([
    [10, 100e3, '2.14', '61'],
    [10, 500e3, '2.45', '92'],
    [15, 100e3, '3.06', '79'],
    [20, 500e3, '9.15', '282'],
    [5, 20e3, '.47', '13'],
  ])('height and length of %d m/s over %d m', (wind, fetch, height, length) => {
    expectPrinted(seaHeight(wind, fetch), height, 'Hs');
    const { omegaPeakRadPerS } = jonswapGrowth(wind, fetch, g);
    expectPrinted(wavelengthM(wavenumber(omegaPeakRadPerS, water)), length, 'Lp');
  });

  it('ends at the fully developed sea', () => {
    for (const wind of [5, 10, 20]) {
      const growth = jonswapGrowth(wind, Infinity, g);
      expect(growth.fullyDeveloped).toBe(true);
      expect(growth.peakEnhancement).toBe(1);
      expect(growth.dimensionlessFetch).toBe(DEVELOPED_FETCH);
      expectPrinted((growth.omegaPeakRadPerS * wind) / (2 * Math.PI * g), '.133', 'f_p U / g');
      expectPrinted((seaHeight(wind, Infinity) * g) / wind ** 2, '.240', 'g Hs / U^2');
      // Donelan, Hamilton & Hui 1985: some .83 (verified in use).
      expectRelative(inverseWaveAge(wind, growth.omegaPeakRadPerS, g), 0.83, 0.01, 'U / cp');
    }
    expectRelative(DEVELOPED_FETCH, 18245, 1e-4, 'dimensionless fetch of full development');
  });

  it('grows with the fetch without a jump', () => {
    let before = seaHeight(10, 1e3);
    for (let fetch = 1.1e3; fetch < 3e5; fetch *= 1.1) {
      const height = seaHeight(10, fetch);
      expect(height).toBeGreaterThanOrEqual(before * (1 - 1e-9));
      expect(height / before).toBeLessThan(1.06);
      before = height;
    }
  });

  it('refuses wind and fetch that are not positive', () => {
    expect(() => jonswapGrowth(0, 1e3, g)).toThrow(/wind speed/);
    expect(() => jonswapGrowth(10, 0, g)).toThrow(/fetch/);
    expect(() => jonswapGrowth(10, Number.NaN, g)).toThrow(RangeError);
  });
});
