import type { Current, Water } from './water.ts';

/**
 * Below this relative depth kh the horizontal orbit is no longer stretched further: there coth(kh) = 20.02 and the
 * wave is 126 depths long, beyond what a wind-wave spectrum holds. It keeps cells next to k = 0 of a very shallow
 * sea from being thrown about by rounding noise times a huge factor.
 */
export const LEAST_RELATIVE_DEPTH = 0.05;

const TWO_PI = 2 * Math.PI;

/**
 * Intrinsic angular frequency of a linear capillary-gravity wave over a flat bed, rad/s.
 *
 *     omega^2 = (g k + (sigma / rho) k^3) tanh(kh)
 *
 * Source: Airy's theory (Stewart 2008, ch. 16, for the gravity part); tension term from memory, deep form in
 * Fitzpatrick's course. Accuracy: a few ulp; test/published/dispersion.test.ts.
 *
 * @param kRadPerM wavenumber, rad/m, >= 0
 * @returns omega >= 0; 0 at k = 0
 */
export function angularFrequency(kRadPerM: number, water: Water): number {
  const k = kRadPerM;
  const stiffness = water.gravityMps2 + (water.surfaceTensionNpm / water.densityKgpm3) * k * k;
  return Math.sqrt(k * stiffness * tanhKh(k, water.depthM));
}

/**
 * Phase speed c = omega / k, m/s; its limit sqrt(gh) at k = 0 (`Infinity` in deep water).
 *
 * @param kRadPerM wavenumber, rad/m, >= 0
 */
export function phaseSpeed(kRadPerM: number, water: Water): number {
  if (kRadPerM === 0) return Math.sqrt(water.gravityMps2 * water.depthM);
  return angularFrequency(kRadPerM, water) / kRadPerM;
}

/**
 * Group velocity d omega / dk, m/s; its limit sqrt(gh) at k = 0 (`Infinity` in deep water).
 *
 *     cg = (c / 2) [ (g + 3 T k^2) / (g + T k^2) + 2kh / sinh 2kh ],  T = sigma / rho
 *
 * Source: derivative of the dispersion relation; without tension SPM 1984, Stewart 2008 ch. 16.
 * Accuracy: a few ulp; test/published/dispersion.test.ts, test/laws/dispersion.test.ts.
 *
 * @param kRadPerM wavenumber, rad/m, >= 0
 */
export function groupVelocity(kRadPerM: number, water: Water): number {
  const k = kRadPerM;
  const g = water.gravityMps2;
  const tension = (water.surfaceTensionNpm / water.densityKgpm3) * k * k;
  const ratio = (g + 3 * tension) / (g + tension) + xOverSinhX(2 * k * water.depthM);
  return 0.5 * phaseSpeed(k, water) * (k === 0 ? 2 : ratio);
}

/**
 * Wavenumber of an intrinsic angular frequency, the inverse of `angularFrequency`, rad/m.
 *
 * Newton's method on ln omega (ln k), whose slope cg / c lies between 1/2 and 3/2 for every depth and tension, kept
 * inside a bracket; starts from the smaller of the pure gravity and the pure capillary wavenumber.
 * Accuracy: round trip within 4 ulp for kh from 1e-6 to 1e6; test/laws/dispersion.test.ts.
 *
 * @param omegaRadPerS intrinsic angular frequency, rad/s, >= 0
 * @throws RangeError if it is negative or not a number
 */
export function wavenumber(omegaRadPerS: number, water: Water): number {
  if (!(omegaRadPerS >= 0)) throw new RangeError(`angular frequency must be >= 0, found ${omegaRadPerS}`);
  if (omegaRadPerS === Infinity) return Infinity;
  let k = firstGuess(omegaRadPerS, water);
  if (k === 0) return 0;
  let low = 0;
  let high = Infinity;
  for (let step = 0; step < 60; step += 1) {
    const excess = angularFrequency(k, water) - omegaRadPerS;
    if (excess === 0) return k;
    if (excess < 0) low = k;
    else high = k;
    let next = k - excess / groupVelocity(k, water);
    if (!(next > low && next < high)) next = high === Infinity ? 2 * low : 0.5 * (low + high);
    // Newton doubles the digits: the step after this one would be below the last.
    if (Math.abs(next - k) <= 1e-9 * k) return next;
    k = next;
  }
  return k;
}

/**
 * Angular frequency seen by a fixed observer: the intrinsic one plus the Doppler shift of a uniform current; negative
 * where the current carries the wave backwards.
 *
 *     omega_abs = sigma(|k|) + k . U
 *
 * Source: Jonsson 1990.
 *
 * @param kEastRadPerM wave vector's east component, rad/m
 * @param kNorthRadPerM wave vector's north component, rad/m
 * @returns rad/s, signed
 */
export function absoluteAngularFrequency(
  kEastRadPerM: number,
  kNorthRadPerM: number,
  water: Water,
  current: Current,
): number {
  // Math.hypot guards against overflow that cannot occur here, at many times the cost.
  const k = Math.sqrt(kEastRadPerM * kEastRadPerM + kNorthRadPerM * kNorthRadPerM);
  return angularFrequency(k, water) + kEastRadPerM * current.eastMps + kNorthRadPerM * current.northMps;
}

/**
 * Ratio of the horizontal to the vertical semi-axis of the orbit at the surface, bounded where kh is tiny.
 *
 *     coth(max(kh, LEAST_RELATIVE_DEPTH))
 *
 * Source: linear theory (from memory).
 *
 * @param kRadPerM wavenumber, rad/m, >= 0
 * @param depthM still-water depth, m, > 0; `Infinity` gives 1
 * @returns 1 .. 20.02
 */
export function cothKh(kRadPerM: number, depthM: number): number {
  if (depthM === Infinity) return 1;
  return 1 / Math.tanh(Math.max(kRadPerM * depthM, LEAST_RELATIVE_DEPTH));
}

/** Wavelength 2 pi / k of a wavenumber, m; `Infinity` at k = 0. */
export function wavelengthM(kRadPerM: number): number {
  return TWO_PI / kRadPerM;
}

/** Wavenumber 2 pi / lambda of a wavelength, rad/m; `Infinity` at 0. */
export function wavelengthWavenumber(lengthM: number): number {
  return TWO_PI / lengthM;
}

function tanhKh(k: number, h: number): number {
  // 0 * Infinity is not a number, so deep water takes its own way.
  return h === Infinity ? 1 : Math.tanh(k * h);
}

function xOverSinhX(x: number): number {
  if (x === 0) return 1;
  // Also true of deep water at k = 0, whose x is not a number and whose group velocity is infinite anyway.
  if (!(x < 700)) return 0;
  return x / Math.sinh(x);
}

function firstGuess(omega: number, water: Water): number {
  const { depthM: h, gravityMps2: g } = water;
  const deep = (omega * omega) / g;
  if (deep === 0) return 0;
  // Eckart 1952: within 6 % of the gravity wavenumber at every depth.
  const gravity = h === Infinity ? deep : deep / Math.sqrt(Math.tanh(deep * h));
  const capillary = Math.cbrt((omega * omega * water.densityKgpm3) / water.surfaceTensionNpm);
  return Math.min(gravity, capillary);
}
