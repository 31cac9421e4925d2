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

/** Forms that are measured, not published: their directions turn with frequency, so that nothing is even. */
const MEASURED: ReadonlySet<SpreadingForm> = new Set<SpreadingForm>(['tabulated']);

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
        // The breakpoints find lobes down to a degree wide, at the mean; measured ones are wider and anywhere.
        const options = { relativeTolerance: 1e-12, breakpoints: [0.02, 0.1, 0.5, 2] };
        const left = integral(D, 0, Math.PI, options);
        const right = MEASURED.has(form) ? integral((theta) => D(-theta), 0, Math.PI, options) : left;
        expectRelative(left + right, 1, 1e-10, `integral for p = ${p}`);
      }),
      { numRuns: MEASURED.has(form) ? 50 : 300 },
    );
  });

  it.runIf(MEASURED.has(form))('is finite and not negative', () => {
    fc.assert(
      fc.property(cases(form), between(-Math.PI, Math.PI), spread(1e-9, 1e4), (parameters, theta, omega) => {
        const spreading = directionalSpreading(parameters);
        for (const at of [0, omega]) {
          const p = spreading.parameter(at);
          expect(Number.isFinite(p)).toBe(true);
          const shape = spreading.shape(theta, p);
          expect(shape >= 0 && shape < Infinity, `shape(${theta}, ${p}) = ${shape}`).toBe(true);
        }
      }),
      { numRuns: 50 },
    );
  });

  it.skipIf(MEASURED.has(form))(
    'is 1 at its maximum, at the mean direction, even, finite and not negative',
    () => {
      fc.assert(
        fc.property(
          cases(form),
          between(-Math.PI, Math.PI),
          spread(1e-9, 1e4),
          (parameters, theta, omega) => {
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
          },
        ),
        { numRuns: 200 },
      );
    },
  );

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
