import {
  DEVELOPED_ENERGY,
  DEVELOPED_FREQUENCY,
  developedAtMost,
  dimensionlessFetch,
  type GrowthConditions,
  type WaveGrowth,
} from './law.ts';

/**
 * Growth with the fetch in water of any depth, from measurements on a shallow lake.
 *
 *     m0 g^2 / U10^4 = 3.64e-3 {tanh A1 tanh[B1 / tanh A1]}^1.74,  A1 = .493 d^.75,   B1 = 3.13e-3 x^.57
 *     f_p U10 / g = .133 {tanh A2 tanh[B2 / tanh A2]}^-.37,        A2 = .331 d^1.01,  B2 = 5.215e-4 x^.73
 *     d = g h / U10^2,  x = g X / U10^2
 *
 * Source: Young & Verhagen 1996, coefficients as in open-source implementations. Check: test/published/growth-laws.test.ts.
 */
export function youngVerhagen(conditions: GrowthConditions): WaveGrowth {
  const { windSpeedMps: U10, depthM, gravityMps2: g } = conditions;
  const x = dimensionlessFetch(conditions);
  const d = (g * depthM) / U10 ** 2;
  const energy = DEVELOPED_ENERGY * limited(0.493 * d ** 0.75, 3.13e-3 * x ** 0.57) ** 1.74;
  const frequency = DEVELOPED_FREQUENCY * limited(0.331 * d ** 1.01, 5.215e-4 * x ** 0.73) ** -0.37;
  return developedAtMost(conditions, energy, frequency);
}

/** tanh A tanh(B / tanh A): the smaller of the limits that depth (A) and fetch (B) set, blended. */
function limited(A: number, B: number): number {
  const depthLimit = Math.tanh(A);
  return depthLimit * Math.tanh(B / depthLimit);
}
