import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { integral } from '../../src/math/quadrature.ts';
import {
  directionalSpreading,
  SPREADING_FORMS,
  type SpreadingForm,
  type SpreadingParameters,
} from '../../src/spectrum/registry.ts';
import { between, SPREADING_ARBITRARIES, spread } from '../support/form-arbitraries.ts';
import { expectRelative } from '../support/tolerances.ts';

/** Any parameters of a form. */
function cases(form: SpreadingForm): fc.Arbitrary<SpreadingParameters> {
  return SPREADING_ARBITRARIES[form];
}

it('every registered spreading has parameters to be tested with', () => {
  expect(Object.keys(SPREADING_ARBITRARIES).sort()).toEqual([...SPREADING_FORMS].sort());
});

describe.each(SPREADING_FORMS)('%s', (form) => {
  it('integrates to 1 over the circle at every frequency', () => {
    fc.assert(
      fc.property(cases(form), spread(0.01, 1e3), (parameters, omega) => {
        const spreading = directionalSpreading(parameters);
        const p = spreading.parameter(omega);
        const N = spreading.normaliser(p);
        const D = (theta: number): number => N * spreading.shape(theta, p);
        // Even in theta; the breakpoints find lobes down to a degree wide.
        const half = integral(D, 0, Math.PI, { relativeTolerance: 1e-12, breakpoints: [0.02, 0.1, 0.5, 2] });
        expectRelative(2 * half, 1, 1e-10, `integral for p = ${p}`);
      }),
      { numRuns: 300 },
    );
  });

  it('is 1 at its maximum, at the mean direction, even, finite and not negative', () => {
    fc.assert(
      fc.property(cases(form), between(-Math.PI, Math.PI), spread(1e-9, 1e4), (parameters, theta, omega) => {
        const spreading = directionalSpreading(parameters);
        for (const at of [0, omega]) {
          const p = spreading.parameter(at);
          expect(Number.isFinite(p)).toBe(true);
          expect(Number.isFinite(spreading.normaliser(p))).toBe(true);
          expect(spreading.shape(0, p)).toBe(1);
          const shape = spreading.shape(theta, p);
          expect(shape >= 0 && shape <= 1, `shape(${theta}, ${p}) = ${shape}`).toBe(true);
          expect(spreading.shape(-theta, p)).toBe(shape);
        }
      }),
      { numRuns: 200 },
    );
  });

  it('names its form and survives being written down as JSON', () => {
    fc.assert(
      fc.property(cases(form), spread(0.1, 10), (parameters, omega) => {
        const spreading = directionalSpreading(parameters);
        expect(spreading.form).toBe(form);
        const read: SpreadingParameters = JSON.parse(JSON.stringify(parameters));
        expect(directionalSpreading(read).parameter(omega)).toBe(spreading.parameter(omega));
      }),
      { numRuns: 50 },
    );
  });
});
