import { developedAtMost, dimensionlessFetch, type GrowthConditions, type WaveGrowth } from './law.ts';

/**
 * Growth with the fetch from several experiments together, stable and unstable air mixed.
 *
 *     m0 g^2 / U10^4 = 5.2e-7 x^.9;  omega_p U10 / g = 13.7 x^-.27;  x = g X / U10^2
 *
 * Source: Kahma & Calkoen 1992, composite, coefficients as in open-source implementations. Check: test/published/growth-laws.test.ts.
 */
export function kahmaCalkoen(conditions: GrowthConditions): WaveGrowth {
  const x = dimensionlessFetch(conditions);
  return developedAtMost(conditions, 5.2e-7 * x ** 0.9, (13.7 * x ** -0.27) / (2 * Math.PI));
}
