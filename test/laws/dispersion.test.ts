import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  absoluteAngularFrequency,
  angularFrequency,
  cothKh,
  groupVelocity,
  LEAST_RELATIVE_DEPTH,
  phaseSpeed,
  wavelengthM,
  wavelengthWavenumber,
  wavenumber,
} from '../../src/physics/dispersion.ts';
import type { Water } from '../../src/physics/water.ts';
import { anyWater, spread } from '../support/form-arbitraries.ts';
import { expectRelative, FEW_ULP } from '../support/tolerances.ts';

/** Wavenumbers for a water, kh from 1e-6 to 1e6. */
function wavenumbers(water: Water): fc.Arbitrary<number> {
  const h = water.depthM === Infinity ? 1 : water.depthM;
  return spread(1e-6 / h, 1e6 / h);
}

const waterAndWavenumber = anyWater.chain((water) => fc.tuple(fc.constant(water), wavenumbers(water)));

/** Every random check below draws this many cases. */
const RUNS = { numRuns: 1000 };

describe('dispersion', () => {
  it('k -> omega -> k within 4 ulp', () => {
    fc.assert(
      fc.property(waterAndWavenumber, ([water, k]) => {
        expectRelative(wavenumber(angularFrequency(k, water), water), k, FEW_ULP, 'k');
      }),
      RUNS,
    );
  });

  it('frequency and wavenumber rise together', () => {
    fc.assert(
      fc.property(waterAndWavenumber, ([water, k]) => {
        const next = k * (1 + 1e-9);
        expect(angularFrequency(next, water)).toBeGreaterThan(angularFrequency(k, water));
        const omega = angularFrequency(k, water);
        expect(wavenumber(omega * (1 + 1e-9), water)).toBeGreaterThan(wavenumber(omega, water));
      }),
      RUNS,
    );
  });

  it('group velocity is d omega / dk', () => {
    fc.assert(
      fc.property(waterAndWavenumber, ([water, k]) => {
        // Fourth-order central difference; its rounding error is some 1e-16 / 1e-3.
        const dk = 2e-3 * k;
        const near = angularFrequency(k + dk, water) - angularFrequency(k - dk, water);
        const far = angularFrequency(k + 2 * dk, water) - angularFrequency(k - 2 * dk, water);
        expectRelative(groupVelocity(k, water), (8 * near - far) / (12 * dk), 1e-9, 'cg');
      }),
      RUNS,
    );
  });

  it('n = cg / c lies between 1/2 and 3/2', () => {
    fc.assert(
      fc.property(waterAndWavenumber, ([water, k]) => {
        const n = groupVelocity(k, water) / phaseSpeed(k, water);
        expect(n).toBeGreaterThanOrEqual(0.5);
        // Shallow capillary waves reach 2; pure gravity never exceeds 1.
        expect(n).toBeLessThanOrEqual(2);
        if (water.surfaceTensionNpm === 0) expect(n).toBeLessThanOrEqual(1 + FEW_ULP);
      }),
      RUNS,
    );
  });

  it('is finite and zero where there is no wave', () => {
    fc.assert(
      fc.property(anyWater, (water) => {
        expect(angularFrequency(0, water)).toBe(0);
        expect(wavenumber(0, water)).toBe(0);
        for (const omega of [1e-200, 1e-9, 1e4]) expect(wavenumber(omega, water)).toBeGreaterThanOrEqual(0);
        const long = Math.sqrt(water.gravityMps2 * water.depthM);
        expect(phaseSpeed(0, water)).toBe(long);
        expect(groupVelocity(0, water)).toBe(long);
        if (water.depthM < Infinity) {
          expectRelative(groupVelocity(1e-6 / water.depthM, water), long, 1e-9, 'cg of a very long wave');
        }
      }),
      { numRuns: 200 },
    );
  });

  it('refuses what is not a frequency', () => {
    fc.assert(
      fc.property(anyWater, (water) => {
        expect(() => wavenumber(-1, water)).toThrow(RangeError);
        expect(() => wavenumber(Number.NaN, water)).toThrow(RangeError);
        expect(wavenumber(Infinity, water)).toBe(Infinity);
      }),
      { numRuns: 20 },
    );
  });

  it('a current adds k . U: nothing for waves across it, opposite signs for opposite waves', () => {
    fc.assert(
      fc.property(waterAndWavenumber, spread(0.01, 5), ([water, k], speed) => {
        const sigma = angularFrequency(k, water);
        const current = { eastMps: speed, northMps: 0 };
        expect(absoluteAngularFrequency(0, k, water, current)).toBe(sigma);
        const along = absoluteAngularFrequency(k, 0, water, current);
        const against = absoluteAngularFrequency(-k, 0, water, current);
        expectRelative(along + against, 2 * sigma, 1e-9, 'sum');
        expectRelative(along - against, 2 * k * speed, 1e-7, 'difference');
      }),
      RUNS,
    );
  });
});

describe('coth kh', () => {
  it('falls from its bound to 1', () => {
    const bound = 1 / Math.tanh(LEAST_RELATIVE_DEPTH);
    expect(cothKh(0, 10)).toBe(bound);
    expect(cothKh(0, Infinity)).toBe(1);
    expect(cothKh(3, Infinity)).toBe(1);
    fc.assert(
      fc.property(spread(1e-6, 1e6), spread(0.1, 1e4), (kh, h) => {
        const value = cothKh(kh / h, h);
        expect(value).toBeGreaterThanOrEqual(1);
        expect(value).toBeLessThanOrEqual(bound);
        expect(cothKh((1.01 * kh) / h, h)).toBeLessThanOrEqual(value);
      }),
      RUNS,
    );
  });
});

describe('wavelength', () => {
  it('there and back', () => {
    fc.assert(
      fc.property(spread(1e-4, 1e4), (length) => {
        expectRelative(wavelengthM(wavelengthWavenumber(length)), length, FEW_ULP, 'length');
      }),
      RUNS,
    );
  });
});
