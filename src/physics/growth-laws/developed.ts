import { DEVELOPED_ENERGY, DEVELOPED_FREQUENCY } from './law.ts';

/**
 * The peak period that goes with a significant height where a wind has raised all the sea it can.
 *
 *     T_p = sqrt(Hs / g) / (.133 sqrt(4 sqrt(3.64e-3))) = 15.31 sqrt(Hs / g)
 *
 * It is the fully developed Hs = .2413 U10^2 / g and T_p = 7.519 U10 / g with the wind eliminated: the longest period,
 * and so the flattest sea, that wind makes of the height.
 * Source: Pierson & Moskowitz 1964 with U at 10 m (from memory). Check: test/published/sea-states.test.ts.
 *
 * @param significantHeightM Hs, m, >= 0
 * @returns s
 */
export function developedPeakPeriod(significantHeightM: number, gravityMps2: number): number {
  const heightPerWind = 4 * Math.sqrt(DEVELOPED_ENERGY);
  return Math.sqrt(significantHeightM / (gravityMps2 * heightPerWind)) / DEVELOPED_FREQUENCY;
}
