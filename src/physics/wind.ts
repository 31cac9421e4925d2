import { root } from '../math/root.ts';

const KARMAN = 0.4;

/** Heights over which the logarithmic profile is used here, m. */
const LOWEST_M = 1;
const HIGHEST_M = 100;
const STRONGEST_MPS = 80;

/**
 * Drag coefficient of the sea surface for the wind at 10 m.
 *
 *     1000 C_D = .8 + .065 U10
 *
 * Chosen among the published laws because it is one formula without a jump, made for winds from breeze to hurricane;
 * others differ from it by up to 11 % in friction velocity between 5 and 20 m/s.
 * Source: Wu 1982. Check: test/published/wind.test.ts.
 *
 * @param windSpeed10mMps m/s, >= 0
 */
export function dragCoefficient(windSpeed10mMps: number): number {
  return 1e-3 * (0.8 + 0.065 * windSpeed10mMps);
}

/** Friction velocity u* = sqrt(C_D) U10, m/s. */
export function frictionVelocity(windSpeed10mMps: number): number {
  return Math.sqrt(dragCoefficient(windSpeed10mMps)) * windSpeed10mMps;
}

/**
 * Mean wind speed at a height above the sea, by the logarithmic profile of neutral air.
 *
 *     U(z) = U10 [1 + (sqrt(C_D) / kappa) ln(z / 10)],  kappa = .4
 *
 * U19.5 / U10 is 1.056 to 1.077 for 5 to 20 m/s; the factor 1.026 printed in textbooks does not follow from any drag
 * law for the open sea.
 * Source: standard theory (from memory), drag of Wu 1982. Check: test/published/wind.test.ts.
 *
 * @param windSpeed10mMps wind speed at 10 m, 0 .. 80 m/s
 * @param heightM 1 .. 100 m
 * @returns m/s
 * @throws RangeError outside these ranges
 */
export function windSpeedAtHeight(windSpeed10mMps: number, heightM: number): number {
  checkRanges(windSpeed10mMps, heightM);
  return profile(windSpeed10mMps, heightM);
}

/**
 * Wind speed at 10 m from that at another height, the inverse of `windSpeedAtHeight`.
 *
 * @param windSpeedMps wind speed at `heightM`, m/s, >= 0
 * @param heightM 1 .. 100 m
 * @returns m/s
 * @throws RangeError outside these ranges, or where the answer would exceed 80 m/s
 */
export function windSpeedAt10m(windSpeedMps: number, heightM: number): number {
  checkRanges(windSpeedMps, heightM);
  if (windSpeedMps > profile(STRONGEST_MPS, heightM)) {
    throw new RangeError(`${windSpeedMps} m/s at ${heightM} m is more than ${STRONGEST_MPS} m/s at 10 m`);
  }
  return root((U10) => profile(U10, heightM) - windSpeedMps, 0, STRONGEST_MPS);
}

function profile(U10: number, z: number): number {
  return U10 * (1 + (Math.sqrt(dragCoefficient(U10)) / KARMAN) * Math.log(z / 10));
}

function checkRanges(speed: number, height: number): void {
  if (!(height >= LOWEST_M && height <= HIGHEST_M)) {
    throw new RangeError(`height must be ${LOWEST_M} .. ${HIGHEST_M} m, found ${height}`);
  }
  // Aloft the wind is faster than at 10 m, by up to 1.5 times at 100 m.
  if (!(speed >= 0 && speed <= 1.5 * STRONGEST_MPS)) {
    throw new RangeError(`wind speed must be 0 .. ${STRONGEST_MPS} m/s, found ${speed}`);
  }
}
