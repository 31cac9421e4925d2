import { argumentOfMaximum } from '../math/maximum.ts';
import { angularFrequency, groupVelocity, phaseSpeed, wavenumber } from '../physics/dispersion.ts';
import type { Water } from '../physics/water.ts';
import { waveAgeEnhancement, waveAgeWidth } from './donelan-hamilton-hui.ts';
import type { DirectionalSpreading, FrequencySpectrum } from './form.ts';

/** A wind sea from its longest waves down to ripples, by wind and age. */
export interface ElfouhailyWind {
  /** U10, m/s, > 0. */
  readonly windSpeedMps: number;
  /** Inverse wave age Omega = U10 / c_p: .84 fully developed .. 5 very young. */
  readonly inverseWaveAge: number;
  /** Friction velocity of the wind, m/s, > 0: what raises the ripples. */
  readonly frictionVelocityMps: number;
}

export interface ElfouhailyParameters extends ElfouhailyWind {
  readonly form: 'elfouhaily';
}

/** The spreading that belongs to the spectrum; it has no water of its own, so it is told the gravity. */
export interface ElfouhailySpreadingParameters extends ElfouhailyWind {
  readonly form: 'elfouhaily';
  readonly gravityMps2: number;
}

/** The wavenumber of the slowest ripples, rad/m, and their speed, m/s, as the paper rounds them. */
const KM = 370;
const CM = 0.23;

/**
 * The unified spectrum of long and short waves.
 *
 *     S(k) = k^-3 (B_l + B_h)
 *     B_l = (1/2) alpha_p (c_p / c) L J exp{-(Omega / sqrt 10)[sqrt(k / k_p) - 1]}
 *     B_h = (1/2) alpha_m (c_m / c) L J exp{-(1/4)[k / k_m - 1]^2}
 *     L = exp[-(5/4)(k_p / k)^2];  J = gamma^Gamma,  Gamma = exp{-[sqrt(k / k_p) - 1]^2 / (2 delta^2)}
 *     k_p = g Omega^2 / U10^2;  c^2 = (g / k)(1 + (k / k_m)^2);  alpha_p = .006 Omega^.55
 *     alpha_m = .01 [1 + ln(u* / c_m)] for u* <= c_m, .01 [1 + 3 ln(u* / c_m)] above
 *
 * Deep water; S(omega) = S(k) / cg with the water's own tension, and in any depth the same S(omega). Where the friction
 * velocity is so small that alpha_m would be negative (u* < c_m / e, a wind of some 2.4 m/s) there are no ripples.
 * Source: Elfouhaily et al. 1997, constants as found in several public codes (the factor L J of B_h is needed: without
 * it the long waves blow up). Check: computed S(k), heights and slopes, test/published/elfouhaily.test.ts.
 */
export function elfouhaily(parameters: ElfouhailyParameters, water: Water): FrequencySpectrum {
  const deep: Water = { ...water, depthM: Infinity };
  const S = elfouhailyWavenumberSpectrum(parameters, water.gravityMps2);
  const density = (omega: number): number => {
    if (!(omega > 0)) return 0;
    const k = wavenumber(omega, deep);
    const Sk = S(k);
    return Sk === 0 ? 0 : Sk / groupVelocity(k, deep);
  };
  const omegaPeak = angularFrequency(peakWavenumber(parameters, water.gravityMps2), deep);
  return {
    form: 'elfouhaily',
    omegaPeak: argumentOfMaximum(density, 0.6 * omegaPeak, 1.2 * omegaPeak),
    density,
  };
}

/** S(k) of the unified spectrum over all directions: rad/m in, m^3/rad out; 0 at k = 0. */
export function elfouhailyWavenumberSpectrum(
  wind: ElfouhailyWind,
  gravityMps2: number,
): (kRadPerM: number) => number {
  const Omega = wind.inverseWaveAge;
  const kp = peakWavenumber(wind, gravityMps2);
  const paper = paperWater(gravityMps2);
  const cp = phaseSpeed(kp, paper);
  const alphaP = 0.006 * Omega ** 0.55;
  const ripples = Math.log(wind.frictionVelocityMps / CM);
  const alphaM = 0.01 * Math.max(0, 1 + (ripples > 0 ? 3 : 1) * ripples);
  const lnGamma = Math.log(waveAgeEnhancement(Omega));
  const delta = waveAgeWidth(Omega);
  return (k) => {
    const cut = 1.25 * (kp / k) ** 2;
    if (!(cut < 745)) return 0;
    const c = phaseSpeed(k, paper);
    const rise = Math.sqrt(k / kp) - 1;
    const LJ = Math.exp(lnGamma * Math.exp(-0.5 * (rise / delta) ** 2) - cut);
    const Bl = 0.5 * alphaP * (cp / c) * Math.exp((-Omega / Math.sqrt(10)) * rise);
    const Bh = 0.5 * alphaM * (CM / c) * Math.exp(-0.25 * (k / KM - 1) ** 2);
    return (LJ * (Bl + Bh)) / k ** 3;
  };
}

/**
 * The spreading of the unified spectrum: even in both senses, as much against the wind as with it.
 *
 *     D(theta) = [1 + Delta cos 2 theta] / 2 pi
 *     Delta = tanh[ln 2 / 4 + 4 (c / c_p)^2.5 + .13 (u* / c_m)(c_m / c)^2.5]
 *
 * Source: Elfouhaily et al. 1997, coefficients as in open-source implementations. Check: computed Delta, test/published/elfouhaily.test.ts.
 */
export function elfouhailySpreading(parameters: ElfouhailySpreadingParameters): DirectionalSpreading {
  const { gravityMps2, frictionVelocityMps } = parameters;
  const paper = paperWater(gravityMps2);
  const cp = phaseSpeed(peakWavenumber(parameters, gravityMps2), paper);
  return {
    form: 'elfouhaily',
    parameter: (omega) => {
      const c = phaseSpeed(wavenumber(omega, paper), paper);
      const short = 0.13 * (frictionVelocityMps / CM) * (CM / c) ** 2.5;
      return Math.tanh(Math.LN2 / 4 + 4 * (c / cp) ** 2.5 + short);
    },
    shape: (theta, Delta) => (1 + Delta * Math.cos(2 * theta)) / (1 + Delta),
    normaliser: (Delta) => (1 + Delta) / (2 * Math.PI),
  };
}

/**
 * The inverse wave age of a fetch.
 *
 *     Omega = .84 tanh[(x / 2.2e4)^.4]^-.75,  x = g X / U10^2
 *
 * Source: Elfouhaily et al. 1997, coefficients as in open-source implementations.
 *
 * @param fetchM X, m, > 0; `Infinity` is fully developed
 */
export function elfouhailyInverseWaveAge(windSpeedMps: number, fetchM: number, gravityMps2: number): number {
  const x = (gravityMps2 * fetchM) / windSpeedMps ** 2;
  return 0.84 * Math.tanh((x / 2.2e4) ** 0.4) ** -0.75;
}

function peakWavenumber(wind: ElfouhailyWind, g: number): number {
  return g * (wind.inverseWaveAge / wind.windSpeedMps) ** 2;
}

/** Deep water with the tension that puts the slowest ripples at k_m: c^2 = (g / k)(1 + (k / k_m)^2). */
function paperWater(g: number): Water {
  return { depthM: Infinity, gravityMps2: g, densityKgpm3: 1, surfaceTensionNpm: g / KM ** 2 };
}
