import { logGamma } from '../math/special.ts';
import type { DirectionalSpreading } from './form.ts';

/** The largest exponent used: there directions spread by .8 degrees. */
export const LARGEST_EXPONENT = 1e4;

const TWO_SQRT_PI = 2 * Math.sqrt(Math.PI);

/**
 * A cosine-power spreading whose exponent varies with frequency.
 *
 *     D(theta) = N(s) cos^(2s)(theta / 2),  N(s) = Gamma(s + 1) / (2 sqrt(pi) Gamma(s + 1/2))
 *
 * Source: Longuet-Higgins, Cartwright & Smith 1963. Accuracy: N to 1e-10 for s in [0, 1e4];
 * test/unit/spectrum/cosine-power.test.ts, test/published/directional-spreading.test.ts.
 *
 * @param form key of the published form
 * @param exponent s(omega); values outside [0, LARGEST_EXPONENT] are taken to its ends
 */
export function cosinePower(form: string, exponent: (omega: number) => number): DirectionalSpreading {
  return {
    form,
    parameter: (omega) => Math.min(LARGEST_EXPONENT, Math.max(0, exponent(omega))),
    shape: (theta, s) => Math.abs(Math.cos(0.5 * theta)) ** (2 * s),
    normaliser: (s) => Math.exp(logGamma(s + 1) - logGamma(s + 0.5)) / TWO_SQRT_PI,
  };
}

/**
 * What swell adds to the exponent: waves that have travelled far from their storm run more nearly one way.
 *
 *     16 tanh(omega_p / omega) xi^2
 *
 * Source: Horvath 2015 (from memory: the ratio inside tanh is not checked against the paper).
 *
 * @param swellNarrowing xi, 0 (none) .. 1
 */
export function swellExponent(omega: number, omegaPeakRadPerS: number, swellNarrowing: number): number {
  return swellNarrowing === 0 ? 0 : 16 * Math.tanh(omegaPeakRadPerS / omega) * swellNarrowing ** 2;
}
