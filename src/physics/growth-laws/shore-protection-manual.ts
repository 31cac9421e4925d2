import type { GrowthConditions, WaveGrowth } from './law.ts';

/**
 * Growth with the fetch for coastal practice.
 *
 *     U_A = .71 U10^1.23;  x = g X / U_A^2
 *     g Hs / U_A^2 = 1.6e-3 x^(1/2), at most .2433;  g T_p / U_A = .2857 x^(1/3), at most 8.134
 *
 * Source: Shore Protection Manual 1984, coefficients as in open-source implementations. Check: test/published/growth-laws.test.ts.
 */
export function shoreProtectionManual({
  windSpeedMps,
  fetchM,
  gravityMps2: g,
}: GrowthConditions): WaveGrowth {
  const UA = adjustedWind(windSpeedMps);
  const x = (g * fetchM) / UA ** 2;
  return {
    significantHeightM: (Math.min(1.6e-3 * Math.sqrt(x), 0.2433) * UA ** 2) / g,
    peakPeriodS: (Math.min(0.2857 * Math.cbrt(x), 8.134) * UA) / g,
  };
}

/**
 * The fetch that a wind of this duration makes use of, m: a sea that has had too little time is as if its fetch were
 * this.
 *
 *     g t / U_A = 68.8 x^(2/3), at most 71500
 *
 * Source: Shore Protection Manual 1984, coefficients as in open-source implementations. Check: test/published/growth-laws.test.ts.
 *
 * @param durationS s, > 0; `Infinity` from full development on
 */
export function shoreProtectionManualFetch(
  windSpeedMps: number,
  durationS: number,
  gravityMps2: number,
): number {
  const UA = adjustedWind(windSpeedMps);
  const t = (gravityMps2 * durationS) / UA;
  return t >= 71500 ? Infinity : ((t / 68.8) ** 1.5 * UA ** 2) / gravityMps2;
}

function adjustedWind(U10: number): number {
  return 0.71 * U10 ** 1.23;
}
