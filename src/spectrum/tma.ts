import { argumentOfMaximum } from '../math/maximum.ts';
import type { Water } from '../physics/water.ts';
import { kitaigorodskiiFactor } from './depth-factor.ts';
import type { FrequencySpectrum } from './form.ts';
import { type JonswapShape, jonswapDensity } from './jonswap.ts';
import { spectralMoment } from './moments.ts';

/** A wind sea in water of any depth; the numbers are those of its deep-water parent. */
export interface TmaParameters extends JonswapShape {
  readonly form: 'tma';
}

/**
 * The spectrum of wind seas on finite depth: JONSWAP times the depth factor.
 *
 *     S(omega) = S_JONSWAP(omega) phi(omega, h)
 *
 * The depth factor moves the largest S up a little from the parent's omega_p (by 14 % at most, where gamma is 1 and
 * the water very shallow).
 * Source: Bouws et al. 1985. Check: printed densities, test/published/depth-factor.test.ts.
 */
export function tma(parameters: TmaParameters, water: Water): FrequencySpectrum {
  const parent = jonswapDensity(parameters, water.gravityMps2);
  const factor = kitaigorodskiiFactor(water);
  const density = (omega: number): number => {
    const S = parent(omega);
    return S === 0 ? 0 : S * factor(omega);
  };
  const omegaParent = parameters.omegaPeakRadPerS;
  return {
    form: 'tma',
    omegaPeak: argumentOfMaximum(density, omegaParent, 1.2 * omegaParent),
    density,
  };
}

/**
 * The alpha of a TMA sea whose significant height **in this depth** is the stated one.
 *
 * @param significantHeightM Hs = 4 sqrt(m0), m, >= 0
 * @param omegaPeakRadPerS angular frequency of the deep parent's peak, rad/s, > 0
 * @param peakEnhancement gamma, > 0
 */
export function tmaAlpha(
  significantHeightM: number,
  omegaPeakRadPerS: number,
  peakEnhancement: number,
  water: Water,
): number {
  const unit = tma({ form: 'tma', alpha: 1, omegaPeakRadPerS, peakEnhancement }, water);
  return significantHeightM ** 2 / 16 / spectralMoment(unit, 0);
}

/** alpha and gamma of a TMA sea, from its wind and its own peak wave. */
export interface TmaLevel {
  readonly alpha: number;
  readonly peakEnhancement: number;
}

/**
 * Level and peak enhancement of a wind sea on finite depth.
 *
 *     kappa = 2 pi U10^2 / (g L_p);  alpha = .0078 kappa^.49;  gamma = 2.47 kappa^.39
 *
 * Source: Bouws et al. 1985, coefficients as in open-source implementations. Check: test/published/depth-factor.test.ts.
 *
 * @param windSpeedMps U10, m/s, > 0
 * @param peakWavelengthM L_p, wavelength of the peak in this depth, m, > 0
 */
export function tmaLevel(windSpeedMps: number, peakWavelengthM: number, gravityMps2: number): TmaLevel {
  const kappa = (2 * Math.PI * windSpeedMps ** 2) / (gravityMps2 * peakWavelengthM);
  return { alpha: 0.0078 * kappa ** 0.49, peakEnhancement: 2.47 * kappa ** 0.39 };
}
