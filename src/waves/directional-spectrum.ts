import { angularFrequency, groupVelocity, wavenumber } from '../physics/dispersion.ts';
import type { Water } from '../physics/water.ts';
import type { DirectionalSpreading } from '../spectrum/form.ts';
import { directionalSpreading, frequencySpectrum } from '../spectrum/registry.ts';
import { smoothstep } from './band.ts';
import type { WavelengthGain, WaveSystem } from './wave-system.ts';

/** A wave system as functions of the wavenumber. */
export interface DirectionalSpectrum {
  readonly system: WaveSystem;
  /** E(k) = S(sigma) cg with the wavelength gains: variance per wavenumber, m^2 / (rad/m). */
  readonly wavenumberDensity: (kRadPerM: number) => number;
  /** sigma(k), rad/s. */
  readonly intrinsicFrequency: (kRadPerM: number) => number;
  /** Parameter p of the spreading at a wavenumber, see `DirectionalSpreading`. */
  readonly spreadingParameter: (kRadPerM: number) => number;
  /** Factor that makes `spreadingShape` integrate to 1 over the circle at this p. */
  readonly spreadingNormaliser: (p: number) => number;
  /** Unnormalised spreading at an angle from the system's direction of travel, rad in [-pi, pi]. */
  readonly spreadingShape: (theta: number, p: number) => number;
  /** Angular frequency of the peak of S before any gain, and the wavenumber of that frequency in this water. */
  readonly omegaPeakRadPerS: number;
  readonly peakWavenumberRadPerM: number;
}

/** Half-width in angle, rad, over which waves count as moving across the wind rather than with or against it. */
const ACROSS_WIND_HALF_WIDTH = Math.PI / 12;

/** Edges of a wavelength gain fade over this factor, so that cell integrals stay smooth. */
const GAIN_FADE = 1.1;

/**
 * A wave system as functions of the wavenumber, with art-direction gains.
 *
 *     Psi(kx, ky) = S(sigma) D(sigma, theta) cg / k,   integral Psi dkx dky = m0
 *
 * @param system resolved wave system
 * @param water water it runs on
 * @param gains gains on amplitude by wavelength; may be empty
 */
export function directionalSpectrum(
  system: WaveSystem,
  water: Water,
  gains: readonly WavelengthGain[],
): DirectionalSpectrum {
  const { density, omegaPeak } = frequencySpectrum(system.spectrum, water);
  const spreading = directionalSpreading(system.spreading);
  const sided = system.againstShare === 1 ? spreading : withoutHeadSea(spreading, system.againstShare);
  return {
    system,
    wavenumberDensity: (k) => {
      const S = density(angularFrequency(k, water));
      return S === 0 ? 0 : S * groupVelocity(k, water) * energyGain(k, gains);
    },
    intrinsicFrequency: (k) => angularFrequency(k, water),
    spreadingParameter: (k) => spreading.parameter(angularFrequency(k, water)),
    spreadingNormaliser: sided.normaliser,
    spreadingShape: sided.shape,
    omegaPeakRadPerS: omegaPeak,
    peakWavenumberRadPerM: wavenumber(omegaPeak, water),
  };
}

/** Angles at which the highest lobe of a measured spreading is looked for. */
const LOBE_SEARCH = 720;

/** Angle from its highest lobe at which the spreading of the peak has first fallen to a half, rad; at most pi. */
export function peakHalfWidth(spectrum: DirectionalSpectrum): number {
  const p = spectrum.spreadingParameter(spectrum.peakWavenumberRadPerM);
  const shape = (theta: number): number => spectrum.spreadingShape(theta, p);
  let lobe = 0;
  for (let i = 0; i < LOBE_SEARCH; i++) {
    const theta = ((i + 0.5) / LOBE_SEARCH) * 2 * Math.PI - Math.PI;
    if (shape(theta) > shape(lobe)) lobe = theta;
  }
  const half = 0.5 * shape(lobe);
  let theta = 1e-4;
  while (theta < Math.PI && shape(wrapped(lobe + theta)) > half && shape(wrapped(lobe - theta)) > half)
    theta *= 1.1;
  return Math.min(theta, Math.PI);
}

function wrapped(theta: number): number {
  return theta - 2 * Math.PI * Math.round(theta / (2 * Math.PI));
}

/** Product of all gains at a wavenumber, squared: what energy is multiplied by. */
export function energyGain(kRadPerM: number, gains: readonly WavelengthGain[]): number {
  let product = 1;
  for (const { shortestWavelengthM, longestWavelengthM, gain } of gains) {
    const lambda = (2 * Math.PI) / kRadPerM;
    const inside =
      smoothstep(0.5 + Math.log(lambda / shortestWavelengthM) / (2 * Math.log(GAIN_FADE))) *
      smoothstep(0.5 + Math.log(longestWavelengthM / lambda) / (2 * Math.log(GAIN_FADE)));
    product *= 1 + (gain - 1) * inside;
  }
  return product * product;
}

/**
 * A spreading whose part against the mean direction keeps only a share of its energy; renormalised, so that the
 * height stays. The step at right angles to the mean direction is smoothed over 30 degrees.
 */
function withoutHeadSea(
  spreading: DirectionalSpreading,
  share: number,
): Pick<DirectionalSpreading, 'shape' | 'normaliser'> {
  const shape = (theta: number, p: number): number => {
    const along = smoothstep(0.5 + (Math.PI / 2 - Math.abs(theta)) / (2 * ACROSS_WIND_HALF_WIDTH));
    return spreading.shape(theta, p) * (share + (1 - share) * along);
  };
  // The trapezoidal rule on a periodic function converges fast; 720 points leave < 1e-9 for s up to 1000.
  const steps = 720;
  const normaliser = (p: number): number => {
    let sum = 0;
    for (let i = 0; i < steps; i++) sum += shape(((i + 0.5) / steps) * 2 * Math.PI - Math.PI, p);
    return steps / (2 * Math.PI * sum);
  };
  return { shape, normaliser };
}
