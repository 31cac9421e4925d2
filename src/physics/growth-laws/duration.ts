/**
 * How long a wind must blow for its sea to be limited by the fetch, s.
 *
 *     t = 77.23 X^.67 / (U10^.34 g^.33)
 *
 * Source: Coastal Engineering Manual, Part II ch. 2, coefficients as in open-source implementations. (The form of the same law in terms of the
 * friction velocity gives some 25 % longer times.) Check: test/published/growth-laws.test.ts.
 *
 * @param windSpeedMps U10, m/s, > 0
 * @param fetchM X, m, >= 0
 */
export function fetchLimitedAfter(windSpeedMps: number, fetchM: number, gravityMps2: number): number {
  return (77.23 * fetchM ** 0.67) / (windSpeedMps ** 0.34 * gravityMps2 ** 0.33);
}

/**
 * The fetch that a wind of this duration makes use of, m: the inverse of `fetchLimitedAfter`. A sea is limited by the
 * smaller of this and its real fetch.
 *
 * @param windSpeedMps U10, m/s, > 0
 * @param durationS s, >= 0
 */
export function fetchOfDuration(windSpeedMps: number, durationS: number, gravityMps2: number): number {
  return ((durationS * windSpeedMps ** 0.34 * gravityMps2 ** 0.33) / 77.23) ** (1 / 0.67);
}
