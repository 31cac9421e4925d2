import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Water } from '../../src/physics/water.ts';
import { defaultLimits, significantHeight, spectralMoment } from '../../src/spectrum/moments.ts';
import {
  frequencySpectrum,
  SPECTRUM_FORMS,
  type SpectrumForm,
  type SpectrumParameters,
} from '../../src/spectrum/registry.ts';
import { withSignificantHeight } from '../../src/spectrum/stated-height.ts';
import { anyWater, between, SPECTRUM_ARBITRARIES, spread } from '../support/form-arbitraries.ts';
import { expectRelative, MOMENT } from '../support/tolerances.ts';

/** Any parameters of a form, with any water. */
function cases(form: SpectrumForm): fc.Arbitrary<[SpectrumParameters, Water]> {
  const parameters = (SPECTRUM_ARBITRARIES[form] as fc.Arbitrary<SpectrumParameters>).map(
    (own): SpectrumParameters => ({ ...own, energyFactor: 1 }),
  );
  return fc.tuple(parameters, anyWater);
}

it('every registered spectrum has parameters to be tested with', () => {
  expect(Object.keys(SPECTRUM_ARBITRARIES).sort()).toEqual([...SPECTRUM_FORMS].sort());
});

describe.each(SPECTRUM_FORMS)('%s', (form) => {
  it('is finite and not negative anywhere, zero at zero', () => {
    fc.assert(
      fc.property(cases(form), spread(1e-9, 1e4), ([parameters, water], omega) => {
        const { density } = frequencySpectrum(parameters, water);
        expect(density(0)).toBe(0);
        for (const at of [Number.MIN_VALUE, 1e-100, 1e-80, 1e-70, 1e-66, 1e-50, 1e-9, omega, 1e4]) {
          const S = density(at);
          expect(S >= 0 && S < Infinity, `S(${at}) = ${S}`).toBe(true);
        }
      }),
      { numRuns: 200 },
    );
  });

  it('names its form and its peak', () => {
    fc.assert(
      fc.property(cases(form), between(0.02, 8), ([parameters, water], ratio) => {
        const spectrum = frequencySpectrum(parameters, water);
        expect(spectrum.form).toBe(form);
        // The peak is found to 1e-8 in frequency, where S is flat to its square.
        const highest = spectrum.density(spectrum.omegaPeak) * (1 + 1e-9);
        expect(spectrum.density(ratio * spectrum.omegaPeak)).toBeLessThanOrEqual(highest);
        for (const near of [0.9, 0.97, 1.03, 1.1]) {
          expect(spectrum.density(near * spectrum.omegaPeak)).toBeLessThanOrEqual(highest);
        }
      }),
      { numRuns: 200 },
    );
  });

  it('survives being written down as JSON', () => {
    fc.assert(
      fc.property(cases(form), ([parameters, water]) => {
        const read: SpectrumParameters = JSON.parse(JSON.stringify(parameters));
        const [one, other] = [frequencySpectrum(parameters, water), frequencySpectrum(read, water)];
        for (const ratio of [0.7, 1, 1.5]) {
          const omega = ratio * one.omegaPeak;
          expect(other.density(omega)).toBe(one.density(omega));
        }
      }),
      { numRuns: 40 },
    );
  });

  it('meets a stated height', () => {
    fc.assert(
      fc.property(cases(form), between(0.01, 20), ([parameters, water], height) => {
        // The last digits of the smallest doubles are no energy.
        fc.pre(spectralMoment(frequencySpectrum(parameters, water), 0) > 1e-250);
        const stated = withSignificantHeight(parameters, water, height);
        expectRelative(significantHeight(frequencySpectrum(stated, water)), height, MOMENT, 'Hs');
      }),
      { numRuns: 40 },
    );
  });

  it('moments add up over adjoining bands', () => {
    fc.assert(
      fc.property(
        cases(form),
        between(0.3, 5),
        fc.integer({ min: -1, max: 2 }),
        ([parameters, water], ratio, n) => {
          const spectrum = frequencySpectrum(parameters, water);
          const { fromRadPerS, toRadPerS } = defaultLimits(spectrum);
          const middle = ratio * spectrum.omegaPeak;
          const low = spectralMoment(spectrum, n, { fromRadPerS, toRadPerS: middle });
          const high = spectralMoment(spectrum, n, { fromRadPerS: middle, toRadPerS });
          expectRelative(low + high, spectralMoment(spectrum, n), MOMENT, `m${n}`);
        },
      ),
      { numRuns: 40 },
    );
  });
});
