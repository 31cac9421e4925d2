/**
 * Peak enhancement gamma of a JONSWAP sea that is known by height and period only: the steeper, the younger.
 *
 *     gamma = exp(5.75 - 1.15 T_p / sqrt Hs), 5 where T_p / sqrt Hs <= 3.6, 1 from 5 on
 *
 * Source: DNV-RP-C205, IEC TS 62600-2, coefficients as in open-source implementations. It jumps by .003 at 3.6. Check:
 * test/published/peak-enhancement.test.ts.
 *
 * @param significantHeightM Hs, m, > 0
 * @param peakPeriodS T_p, s, > 0
 * @returns 1 .. 5
 */
export function steepnessEnhancement(significantHeightM: number, peakPeriodS: number): number {
  const ratio = peakPeriodS / Math.sqrt(significantHeightM);
  if (ratio <= 3.6) return 5;
  return ratio >= 5 ? 1 : Math.exp(5.75 - 1.15 * ratio);
}
