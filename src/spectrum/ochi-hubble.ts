import { logGamma } from '../math/special.ts';
import type { FrequencySpectrum, SpectralDensity } from './form.ts';
import { highestPeak } from './peaks.ts';

/** Swell under a wind sea, each with its height, peak and sharpness; six numbers. */
export interface OchiHubbleParameters {
  readonly form: 'ochi-hubble';
  /** Significant height, m, >= 0, peak angular frequency, rad/s, > 0, and shape lambda, > 0, of the lower part. */
  readonly lowHeightM: number;
  readonly lowOmegaPeakRadPerS: number;
  readonly lowShape: number;
  /** The same of the higher part. */
  readonly highHeightM: number;
  readonly highOmegaPeakRadPerS: number;
  readonly highShape: number;
}

/**
 * Coefficients of one member of the family: H1 / Hs, H2 / Hs, a, b, c, d, lambda1, e, f of
 * omega_m1 = a e^(-b Hs), omega_m2 = c e^(-d Hs), lambda2 = e e^(-f Hs).
 */
type FamilyRow = readonly [number, number, number, number, number, number, number, number, number];

/** Row 0 is the most probable spectrum of a height, rows 1 to 10 those of .95 confidence. */
const FAMILY: readonly FamilyRow[] = [
  [0.84, 0.54, 0.7, 0.046, 1.15, 0.039, 3, 1.54, 0.062],
  [0.95, 0.31, 0.7, 0.046, 1.5, 0.046, 1.35, 2.48, 0.102],
  [0.65, 0.76, 0.61, 0.039, 0.94, 0.036, 4.95, 2.48, 0.102],
  [0.84, 0.54, 0.93, 0.056, 1.5, 0.046, 3, 2.77, 0.112],
  [0.84, 0.54, 0.41, 0.016, 0.88, 0.026, 2.55, 1.82, 0.089],
  [0.9, 0.44, 0.81, 0.052, 1.6, 0.033, 1.8, 2.95, 0.105],
  [0.77, 0.64, 0.54, 0.039, 0.61, 0, 4.5, 1.95, 0.082],
  [0.73, 0.68, 0.7, 0.046, 0.99, 0.039, 6.4, 1.78, 0.069],
  [0.92, 0.39, 0.7, 0.046, 1.37, 0.039, 0.7, 1.78, 0.069],
  [0.84, 0.54, 0.74, 0.052, 1.3, 0.039, 2.65, 3.9, 0.085],
  [0.84, 0.54, 0.62, 0.039, 1.03, 0.03, 2.6, 0.53, 0.069],
];

export const OCHI_HUBBLE_MEMBERS: number = FAMILY.length;

/**
 * The six-parameter spectrum.
 *
 *     S(omega) = (1/4) sum of {[(4 lambda + 1) omega_m^4 / 4]^lambda / Gamma(lambda)} H^2 omega^-(4 lambda + 1)
 *                exp[-((4 lambda + 1) / 4)(omega_m / omega)^4]
 *
 * The m0 of each part is H^2 / 16 exactly; lambda = 1 is the two-parameter spectrum.
 * Source: Ochi & Hubble 1976. Check: printed densities, test/published/two-peaked-spectra.test.ts.
 */
export function ochiHubble(parameters: OchiHubbleParameters): FrequencySpectrum {
  const { lowOmegaPeakRadPerS, highOmegaPeakRadPerS } = parameters;
  const low = part(parameters.lowHeightM, lowOmegaPeakRadPerS, parameters.lowShape);
  const high = part(parameters.highHeightM, highOmegaPeakRadPerS, parameters.highShape);
  const density = (omega: number): number => low(omega) + high(omega);
  return {
    form: 'ochi-hubble',
    omegaPeak: highestPeak(density, [lowOmegaPeakRadPerS, highOmegaPeakRadPerS]),
    density,
  };
}

/**
 * A member of the family that goes with a significant height in the North Atlantic. The published shares are rounded:
 * the height of the result is .998 to 1.002 of the stated one.
 *
 * @param member 0 the most probable, 1 .. 10 the others
 * @param significantHeightM Hs, m, >= 0
 * @throws RangeError if there is no such member
 */
export function ochiHubbleMember(member: number, significantHeightM: number): OchiHubbleParameters {
  const row = FAMILY[member];
  if (row === undefined)
    throw new RangeError(`the family has members 0 .. ${FAMILY.length - 1}, found ${member}`);
  const [H1, H2, a, b, c, d, lambda1, e, f] = row;
  const Hs = significantHeightM;
  return {
    form: 'ochi-hubble',
    lowHeightM: H1 * Hs,
    lowOmegaPeakRadPerS: a * Math.exp(-b * Hs),
    lowShape: lambda1,
    highHeightM: H2 * Hs,
    highOmegaPeakRadPerS: c * Math.exp(-d * Hs),
    highShape: e * Math.exp(-f * Hs),
  };
}

function part(H: number, omegaM: number, lambda: number): SpectralDensity {
  const q = lambda + 0.25;
  // In logarithms and in omega / omega_m: the factors of a sharp part (large lambda) overflow one by one.
  const lnOmegaM = Math.log(omegaM);
  const lnLevel = lambda * Math.log(q) - logGamma(lambda) - lnOmegaM;
  const energy = (H * H) / 4;
  return (omega) => {
    if (omega === 0) return 0;
    const lnRatio = Math.log(omega) - lnOmegaM;
    return energy * Math.exp(lnLevel - 4 * q * lnRatio - q * Math.exp(-4 * lnRatio));
  };
}
