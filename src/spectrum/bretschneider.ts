import type { FrequencySpectrum } from './form.ts';
import { omegaMinusFive } from './omega-minus-five.ts';

/** The two-parameter spectrum (also known as ISSC and ITTC): the Pierson-Moskowitz shape at any height and period. */
export interface BretschneiderParameters {
  readonly form: 'bretschneider';
  /** Significant height 4 sqrt(m0), m, >= 0. */
  readonly significantHeightM: number;
  /** Angular frequency of the peak, rad/s, > 0. */
  readonly omegaPeakRadPerS: number;
}

/**
 * The two-parameter spectrum.
 *
 *     S(omega) = (5/16) Hs^2 omega_p^4 omega^-5 exp[-(5/4)(omega_p / omega)^4]
 *
 * Its m0 is exactly Hs^2 / 16, in any depth.
 * Source: Bretschneider 1959. Check: printed densities, test/published/frequency-spectra.test.ts.
 */
export function bretschneider(parameters: BretschneiderParameters): FrequencySpectrum {
  const { significantHeightM: Hs, omegaPeakRadPerS: omegaPeak } = parameters;
  const level = (5 / 16) * Hs ** 2 * omegaPeak ** 4;
  return {
    form: 'bretschneider',
    omegaPeak,
    density: (omega) => level * omegaMinusFive(omega, omegaPeak),
  };
}
