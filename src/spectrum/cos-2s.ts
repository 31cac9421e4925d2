import { cosinePower, swellExponent } from './cosine-power.ts';
import type { DirectionalSpreading } from './form.ts';

/** The same exponent at every frequency. */
export interface Cos2sParameters {
  readonly form: 'cos-2s';
  /** Exponent s, 0 (all round) .. 1e4; 10 for a wind sea, 25 to 75 for swell. */
  readonly s: number;
  /** Angular frequency of the peak, rad/s, > 0; only the swell term looks at it. */
  readonly omegaPeakRadPerS: number;
  /** xi of the swell term, 0 .. 1. */
  readonly swellNarrowing: number;
}

/**
 * Cosine-power spreading with a fixed exponent, plus the swell term.
 *
 * Source: Longuet-Higgins, Cartwright & Smith 1963. Check: printed and computed moments,
 * test/published/directional-spreading.test.ts.
 */
export function cos2s(parameters: Cos2sParameters): DirectionalSpreading {
  const { s, omegaPeakRadPerS: omegaPeak, swellNarrowing: xi } = parameters;
  return cosinePower('cos-2s', (omega) => s + swellExponent(omega, omegaPeak, xi));
}
