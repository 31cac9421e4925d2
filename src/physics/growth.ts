import { DEVELOPED_FREQUENCY } from './growth-laws/law.ts';

/** What a growth law says of a wind sea: the numbers of its JONSWAP spectrum. */
export interface JonswapGrowth {
  readonly alpha: number;
  readonly omegaPeakRadPerS: number;
  readonly peakEnhancement: number;
  /** g X / U10^2, as used: not beyond full development. */
  readonly dimensionlessFetch: number;
  readonly fullyDeveloped: boolean;
}

/** The dimensionless fetch at which the JONSWAP peak frequency has come down to that of a fully developed sea. */
export const DEVELOPED_FETCH: number = (22 / (2 * Math.PI * DEVELOPED_FREQUENCY)) ** 3;

/** Peak enhancement falls from its mean value at this dimensionless fetch to 1 at DEVELOPED_FETCH. */
const FALLING_FROM = 1e4;
const MEAN_ENHANCEMENT = 3.3;

/**
 * The JONSWAP sea that a steady wind raises over a fetch in deep water.
 *
 *     x = g X / U10^2;  alpha = .076 x^-.22;  omega_p = 22 (g^2 / (U10 X))^(1/3);  gamma = 3.3
 *
 * The laws were measured for x up to some 1e4 and run past full development if used further. Here x is held at
 * 18 246, where f_p U10 / g = .133, and gamma falls linearly in ln x from 3.3 at 1e4 to 1 there: the significant height
 * then ends at .240 U10^2 / g, the fully developed limit, instead of 23 % above it. (That blend is ours.)
 *
 * Source: Hasselmann et al. 1973 (Stewart 2008, eqs 16.35 to 16.37). The height of the resulting spectrum is 11 to 25 %
 * above the separate JONSWAP law for the energy; both are published, this is the one used here.
 * Check: test/published/growth.test.ts.
 *
 * @param windSpeedMps U10, m/s, > 0
 * @param fetchM X, m, > 0; `Infinity` is fully developed
 * @throws RangeError if either is not positive
 */
export function jonswapGrowth(windSpeedMps: number, fetchM: number, gravityMps2: number): JonswapGrowth {
  if (!(windSpeedMps > 0)) throw new RangeError(`wind speed must be > 0 m/s, found ${windSpeedMps}`);
  if (!(fetchM > 0)) throw new RangeError(`fetch must be > 0 m, found ${fetchM}`);
  const x = Math.min((gravityMps2 * fetchM) / windSpeedMps ** 2, DEVELOPED_FETCH);
  const fall = Math.max(0, Math.log(x / FALLING_FROM) / Math.log(DEVELOPED_FETCH / FALLING_FROM));
  return {
    alpha: 0.076 * x ** -0.22,
    omegaPeakRadPerS: 22 * x ** (-1 / 3) * (gravityMps2 / windSpeedMps),
    peakEnhancement: MEAN_ENHANCEMENT - (MEAN_ENHANCEMENT - 1) * fall,
    dimensionlessFetch: x,
    fullyDeveloped: x === DEVELOPED_FETCH,
  };
}

/**
 * Inverse wave age U10 / c_p of a sea in deep water: how much faster the wind is than the waves of the peak.
 *
 *     U10 / c_p = U10 omega_p / g
 *
 * Some .83 in a fully developed sea, up to 5 in a very young one, less in swell.
 * Source: Donelan, Hamilton & Hui 1985.
 *
 * @param windSpeedMps U10, m/s
 * @param omegaPeakRadPerS angular frequency of the peak, rad/s
 */
export function inverseWaveAge(windSpeedMps: number, omegaPeakRadPerS: number, gravityMps2: number): number {
  return (windSpeedMps * omegaPeakRadPerS) / gravityMps2;
}
