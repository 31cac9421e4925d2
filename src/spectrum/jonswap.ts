import { integral } from '../math/quadrature.ts';
import type { Water } from '../physics/water.ts';
import type { FrequencySpectrum, SpectralDensity } from './form.ts';
import { omegaMinusFive } from './omega-minus-five.ts';

/** The numbers of a JONSWAP shape, whichever form uses it. */
export interface JonswapShape {
  /** Level of the tail; about .008 to .02. */
  readonly alpha: number;
  /** Angular frequency of the peak, rad/s, > 0. */
  readonly omegaPeakRadPerS: number;
  /** Peak enhancement gamma: how many times the Pierson-Moskowitz peak; 1 to 7, 3.3 on average. */
  readonly peakEnhancement: number;
}

/** A wind sea that is still growing, in deep water. */
export interface JonswapParameters extends JonswapShape {
  readonly form: 'jonswap';
}

const SIGMA_BELOW = 0.07;
const SIGMA_ABOVE = 0.09;

/**
 * The spectrum of fetch-limited seas.
 *
 *     S(omega) = alpha g^2 omega^-5 exp[-(5/4)(omega_p / omega)^4] gamma^r
 *     r = exp[-(omega - omega_p)^2 / (2 sigma^2 omega_p^2)],  sigma = .07 for omega <= omega_p, else .09
 *
 * Source: Hasselmann et al. 1973 (Stewart 2008, eqs 16.34 to 16.37). Check: computed densities and m0,
 * test/published/frequency-spectra.test.ts.
 */
export function jonswap(parameters: JonswapParameters, water: Water): FrequencySpectrum {
  return {
    form: 'jonswap',
    omegaPeak: parameters.omegaPeakRadPerS,
    density: jonswapDensity(parameters, water.gravityMps2),
  };
}

/** S(omega) of a JONSWAP shape, for the forms that build on it. */
export function jonswapDensity(shape: JonswapShape, gravityMps2: number): SpectralDensity {
  const { alpha, omegaPeakRadPerS: omegaPeak, peakEnhancement: gamma } = shape;
  const level = alpha * gravityMps2 * gravityMps2;
  const lnGamma = Math.log(gamma);
  return (omega) => {
    const sigma = omega <= omegaPeak ? SIGMA_BELOW : SIGMA_ABOVE;
    const deviation = (omega / omegaPeak - 1) / sigma;
    return (
      level * omegaMinusFive(omega, omegaPeak) * Math.exp(lnGamma * Math.exp(-0.5 * deviation * deviation))
    );
  };
}

/**
 * The factor A_gamma by which the energy of a JONSWAP shape exceeds that of its Pierson-Moskowitz part, inverted:
 * (5/16) A_gamma Hs^2 omega_p^4 is the level alpha g^2 of a sea of significant height Hs.
 *
 *     A_gamma = (1/5) / integral of x^-5 exp(-(5/4) x^-4) gamma^r(x) dx
 *
 * Exact, unlike the published fits, which are off by up to .9 % in height at gamma 7.
 * Accuracy: 1e-10; test/published/jonswap-normalisation.test.ts.
 *
 * @param peakEnhancement gamma, > 0
 */
export function jonswapNormalisation(peakEnhancement: number): number {
  const density = jonswapDensity({ alpha: 1, omegaPeakRadPerS: 1, peakEnhancement }, 1);
  // In ln x; the tail beyond x = 20, where gamma^r is 1 to the last bit, has the closed form x^-4 / 4.
  const [low, high] = [0.2, 20];
  const body = integral((lnX) => density(Math.exp(lnX)) * Math.exp(lnX), Math.log(low), Math.log(high), {
    relativeTolerance: 1e-12,
    breakpoints: [Math.log(0.8), 0, Math.log(1.3)],
  });
  const tail = -0.2 * Math.expm1(-1.25 * high ** -4);
  return 0.2 / (body + tail);
}

/**
 * The alpha of a JONSWAP sea in deep water with a stated significant height.
 *
 *     alpha = (5/16) A_gamma Hs^2 omega_p^4 / g^2
 *
 * @param significantHeightM Hs = 4 sqrt(m0), m, >= 0
 * @param omegaPeakRadPerS angular frequency of the peak, rad/s, > 0
 * @param peakEnhancement gamma, > 0
 */
export function jonswapAlpha(
  significantHeightM: number,
  omegaPeakRadPerS: number,
  peakEnhancement: number,
  gravityMps2: number,
): number {
  const A = jonswapNormalisation(peakEnhancement);
  return ((5 / 16) * A * significantHeightM ** 2 * omegaPeakRadPerS ** 4) / gravityMps2 ** 2;
}
