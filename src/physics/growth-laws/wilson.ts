import { dimensionlessFetch, type GrowthConditions, type WaveGrowth } from './law.ts';

/** Peak period over significant period of wind seas. Source: Goda's T1/3 = .95 Tp (from memory). */
const PEAK_OVER_SIGNIFICANT = 1 / 0.95;

/**
 * Growth with the fetch, long used in Japan.
 *
 *     g Hs / U^2 = .3 {1 - [1 + .004 x^(1/2)]^-2};  g T_s / (2 pi U) = 1.37 {1 - [1 + .008 x^(1/3)]^-5}
 *
 * T_s is the significant period; the peak period is taken as T_s / .95.
 * Source: Wilson 1965, coefficients as in open-source implementations. Check: test/published/growth-laws.test.ts.
 */
export function wilson(conditions: GrowthConditions): WaveGrowth {
  const { windSpeedMps: U, gravityMps2: g } = conditions;
  const x = dimensionlessFetch(conditions);
  const Hs = (0.3 * (1 - (1 + 0.004 * Math.sqrt(x)) ** -2) * U ** 2) / g;
  const Ts = (2 * Math.PI * 1.37 * (1 - (1 + 0.008 * Math.cbrt(x)) ** -5) * U) / g;
  return { significantHeightM: Hs, peakPeriodS: PEAK_OVER_SIGNIFICANT * Ts };
}
