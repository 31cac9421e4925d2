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
