/**
 * The shape that the wind-sea spectra share: an omega^-5 tail cut off below the peak.
 *
 *     omega^-5 exp[-(5/4)(omega_p / omega)^4]
 *
 * Largest at omega_p. Source: Pierson & Moskowitz 1964, written with omega_p instead of the wind.
 *
 * @param omega angular frequency, rad/s, >= 0
 * @param omegaPeak angular frequency of the peak, rad/s, > 0
 * @returns (rad/s)^-5; 0 at omega = 0
 */
export function omegaMinusFive(omega: number, omegaPeak: number): number {
  const exponent = 1.25 * (omegaPeak / omega) ** 4;
  // exp has underflowed by here; further down omega^5 would too, and 0 / 0 is not a number.
  return exponent > 745 ? 0 : Math.exp(-exponent) / omega ** 5;
}
