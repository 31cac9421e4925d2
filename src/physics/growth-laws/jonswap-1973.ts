import { developedAtMost, dimensionlessFetch, type GrowthConditions, type WaveGrowth } from './law.ts';

/**
 * Growth with the fetch in the JONSWAP experiment, by energy.
 *
 *     m0 g^2 / U10^4 = 1.6e-7 x;  f_p U10 / g = 3.5 x^-.33;  x = g X / U10^2
 *
 * 11 to 25 % lower than the height of the JONSWAP spectrum with the alpha and gamma of the same experiment
 * (`jonswapGrowth`); ends at full development.
 * Source: Hasselmann et al. 1973, coefficients as in open-source implementations. Check: test/published/growth-laws.test.ts.
 */
export function jonswap1973(conditions: GrowthConditions): WaveGrowth {
  const x = dimensionlessFetch(conditions);
  return developedAtMost(conditions, 1.6e-7 * x, 3.5 * x ** -0.33);
}
