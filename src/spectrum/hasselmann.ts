import { cosinePower, swellExponent } from './cosine-power.ts';
import type { DirectionalSpreading } from './form.ts';

/** A wind sea, with the exponents of the JONSWAP measurements. */
export interface HasselmannParameters {
  readonly form: 'hasselmann';
  /** Angular frequency of the peak, rad/s, > 0. */
  readonly omegaPeakRadPerS: number;
  /** Inverse wave age U10 / c_p, > 0; .83 fully developed, 5 very young. */
  readonly inverseWaveAge: number;
  /** xi of the swell term, 0 .. 1. */
  readonly swellNarrowing: number;
}

/**
 * Cosine-power spreading of growing seas.
 *
 *     s = 6.97 (omega / omega_p)^4.06 below 1.05 omega_p, 9.77 (omega / omega_p)^mu above
 *     mu = -2.33 - 1.45 (U10 / c_p - 1.17)
 *
 * As published it jumps at 1.05 omega_p, by 3 % at U10 / c_p = 1.17.
 * Source: Hasselmann, Dunckel & Ewing 1980. Check: computed exponents, test/published/directional-spreading.test.ts.
 */
export function hasselmann(parameters: HasselmannParameters): DirectionalSpreading {
  const { omegaPeakRadPerS: omegaPeak, inverseWaveAge, swellNarrowing: xi } = parameters;
  const mu = -2.33 - 1.45 * (inverseWaveAge - 1.17);
  return cosinePower('hasselmann', (omega) => {
    const ratio = omega / omegaPeak;
    const s = ratio < 1.05 ? 6.97 * ratio ** 4.06 : 9.77 * ratio ** mu;
    return s + swellExponent(omega, omegaPeak, xi);
  });
}
