import { cosinePower, swellExponent } from './cosine-power.ts';
import type { DirectionalSpreading } from './form.ts';

/** A wind sea, narrowest at its peak and the narrower the older it is. */
export interface MitsuyasuParameters {
  readonly form: 'mitsuyasu';
  /** Angular frequency of the peak, rad/s, > 0. */
  readonly omegaPeakRadPerS: number;
  /** Inverse wave age U10 / c_p, > 0; .83 fully developed, 5 very young. */
  readonly inverseWaveAge: number;
  /** xi of the swell term, 0 .. 1. */
  readonly swellNarrowing: number;
}

/**
 * Cosine-power spreading of fetch-limited seas.
 *
 *     s = s_p (omega / omega_p)^5 up to the peak, s_p (omega / omega_p)^-2.5 above;  s_p = 11.5 (U10 / c_p)^-2.5
 *
 * Source: Mitsuyasu et al. 1975 (s_p from memory). Check: computed exponents,
 * test/published/directional-spreading.test.ts.
 */
export function mitsuyasu(parameters: MitsuyasuParameters): DirectionalSpreading {
  const { omegaPeakRadPerS: omegaPeak, inverseWaveAge, swellNarrowing: xi } = parameters;
  const sp = 11.5 * inverseWaveAge ** -2.5;
  return cosinePower('mitsuyasu', (omega) => {
    const ratio = omega / omegaPeak;
    const s = sp * ratio ** (ratio <= 1 ? 5 : -2.5);
    return s + swellExponent(omega, omegaPeak, xi);
  });
}
