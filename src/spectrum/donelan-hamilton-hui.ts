import type { Water } from '../physics/water.ts';
import type { FrequencySpectrum } from './form.ts';

/** A wind sea by its age, with an omega^-4 tail. */
export interface DonelanHamiltonHuiParameters {
  readonly form: 'donelan-hamilton-hui';
  /** Angular frequency of the peak, rad/s, > 0. */
  readonly omegaPeakRadPerS: number;
  /** Inverse wave age U10 / c_p; measured for .83 (fully developed) .. 5 (very young). */
  readonly inverseWaveAge: number;
}

/**
 * The spectrum of wind seas of any age, from measurements on Lake Ontario and in a tank.
 *
 *     S(omega) = alpha g^2 omega^-4 omega_p^-1 exp[-(omega_p / omega)^4] gamma^r
 *     r = exp[-(omega - omega_p)^2 / (2 sigma^2 omega_p^2)]
 *     alpha = .006 (U/cp)^.55;  gamma = 1.7 for U/cp < 1, else 1.7 + 6 lg(U/cp);  sigma = .08 (1 + 4 (U/cp)^-3)
 *
 * Source: Donelan, Hamilton & Hui 1985. Check: computed levels and heights, test/published/wave-age-spectra.test.ts.
 */
export function donelanHamiltonHui(
  parameters: DonelanHamiltonHuiParameters,
  water: Water,
): FrequencySpectrum {
  const { omegaPeakRadPerS: omegaPeak, inverseWaveAge } = parameters;
  const alpha = 0.006 * inverseWaveAge ** 0.55;
  const lnGamma = Math.log(waveAgeEnhancement(inverseWaveAge));
  const sigma = waveAgeWidth(inverseWaveAge);
  const level = (alpha * water.gravityMps2 ** 2) / omegaPeak;
  return {
    form: 'donelan-hamilton-hui',
    omegaPeak,
    density: (omega) => {
      const exponent = (omegaPeak / omega) ** 4;
      // exp has underflowed by here, omega^-4 not yet overflowed.
      if (!(exponent < 745)) return 0;
      const deviation = (omega / omegaPeak - 1) / sigma;
      const r = Math.exp(-0.5 * deviation * deviation);
      return (level * Math.exp(lnGamma * r - exponent)) / omega ** 4;
    },
  };
}

/**
 * Peak enhancement of a wind sea by its inverse wave age U10 / c_p.
 *
 *     gamma = 1.7 for U/cp < 1, 1.7 + 6 lg(U/cp) above
 *
 * Source: Donelan, Hamilton & Hui 1985.
 */
export function waveAgeEnhancement(inverseWaveAge: number): number {
  return 1.7 + 6 * Math.max(0, Math.log10(inverseWaveAge));
}

/**
 * Relative width of the enhanced peak by the inverse wave age: sigma = .08 (1 + 4 (U/cp)^-3).
 * Source: Donelan, Hamilton & Hui 1985.
 */
export function waveAgeWidth(inverseWaveAge: number): number {
  return 0.08 * (1 + 4 / inverseWaveAge ** 3);
}
