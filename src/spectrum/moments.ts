import { integral } from '../math/quadrature.ts';
import type { FrequencySpectrum } from './form.ts';

/** The angular frequencies an integral runs over, rad/s, from < to. */
export interface FrequencyLimits {
  readonly fromRadPerS: number;
  readonly toRadPerS: number;
}

/** Where the integrand bends most, in peak frequencies: the first intervals of the quadrature meet there. */
const BENDS = [0.1, 0.3, 0.6, 0.85, 1, 1.2, 1.6, 2.5, 5, 30];

/**
 * The limits used where none are given: .05 to 1000 peak frequencies. Beyond them an omega^-5 tail holds some 1e-12 of
 * m0, 1e-9 of m1, 1e-6 of m2, 1e-3 of m3, an omega^-4 tail a thousand times as much; the moment of order 4 (or 3) of
 * such tails grows with the logarithm of the limit and means nothing without one.
 */
export function defaultLimits(spectrum: FrequencySpectrum): FrequencyLimits {
  return { fromRadPerS: 0.05 * spectrum.omegaPeak, toRadPerS: 1000 * spectrum.omegaPeak };
}

/**
 * Spectral moment of any order.
 *
 *     m_n = integral of omega^n S(omega) d omega
 *
 * Adaptive quadrature in ln omega. Accuracy: 1e-8 between the limits; test/unit/spectrum/moments.test.ts.
 *
 * @param order n, usually -1 to 4
 * @param limits rad/s; 0 and `Infinity` mean the default ones
 * @returns m^2 (rad/s)^n
 */
export function spectralMoment(
  spectrum: FrequencySpectrum,
  order: number,
  limits: FrequencyLimits = defaultLimits(spectrum),
): number {
  const widest = defaultLimits(spectrum);
  const a = Math.log(limits.fromRadPerS > 0 ? limits.fromRadPerS : widest.fromRadPerS);
  const b = Math.log(limits.toRadPerS < Infinity ? limits.toRadPerS : widest.toRadPerS);
  const bends = spectrum.knots ?? BENDS.map((bend) => bend * spectrum.omegaPeak);
  const breakpoints = bends.map((omega) => Math.log(omega)).filter((x) => x > a && x < b);
  const integrand = (lnOmega: number): number => {
    const omega = Math.exp(lnOmega);
    return omega ** (order + 1) * spectrum.density(omega);
  };
  return integral(integrand, a, b, { relativeTolerance: 1e-10, breakpoints });
}

/** Significant height Hs = Hm0 = 4 sqrt(m0), m. */
export function significantHeight(spectrum: FrequencySpectrum, limits?: FrequencyLimits): number {
  return 4 * Math.sqrt(spectralMoment(spectrum, 0, limits));
}

/** Mean period Tm01 = 2 pi m0 / m1, s. */
export function meanPeriod(spectrum: FrequencySpectrum, limits?: FrequencyLimits): number {
  return (2 * Math.PI * spectralMoment(spectrum, 0, limits)) / spectralMoment(spectrum, 1, limits);
}

/** Mean zero up-crossing period Tm02 = 2 pi sqrt(m0 / m2), s. */
export function zeroCrossingPeriod(spectrum: FrequencySpectrum, limits?: FrequencyLimits): number {
  return 2 * Math.PI * Math.sqrt(spectralMoment(spectrum, 0, limits) / spectralMoment(spectrum, 2, limits));
}

/** Energy period Te = 2 pi m-1 / m0, s. */
export function energyPeriod(spectrum: FrequencySpectrum, limits?: FrequencyLimits): number {
  return (2 * Math.PI * spectralMoment(spectrum, -1, limits)) / spectralMoment(spectrum, 0, limits);
}
