import type { Water } from '../physics/water.ts';
import type { FrequencySpectrum, SpectralDensity } from './form.ts';
import { highestPeak } from './peaks.ts';

/** Wind sea and swell together, as found on average off Norway at a height and peak period. */
export interface TorsethaugenParameters {
  readonly form: 'torsethaugen';
  /** Significant height of the whole, m, >= 0; up to some 11. */
  readonly significantHeightM: number;
  /** Angular frequency of the higher peak, rad/s, > 0; periods of 3 to 20 s. */
  readonly omegaPeakRadPerS: number;
}

/** One of the two parts. */
export interface TorsethaugenPart {
  readonly heightM: number;
  readonly periodS: number;
  readonly peakEnhancement: number;
}

/**
 * The double-peaked spectrum, simplified form.
 *
 *     S_f = sum of (H^2 T / 16) 3.26 A (f T)^-4 exp[-(f T)^-4] gamma^r,  A = (1 + 1.1 (ln gamma)^1.19) / gamma
 *     r = exp[-(f T - 1)^2 / (2 sigma^2)],  sigma = .07 for f T <= 1, else .09
 *
 * The constants are the published ones: they return a significant height up to 1.5 % above the stated one
 * (`withSignificantHeight` removes that).
 * Source: Torsethaugen & Haver 2004 (simplification from memory). Check: computed parts and levels,
 * test/published/two-peaked-spectra.test.ts.
 */
export function torsethaugen(parameters: TorsethaugenParameters, water: Water): FrequencySpectrum {
  const Tp = (2 * Math.PI) / parameters.omegaPeakRadPerS;
  const parts = torsethaugenParts(parameters.significantHeightM, Tp, water.gravityMps2);
  const densities = parts.map(partDensity);
  const density = (omega: number): number => densities[0](omega) + densities[1](omega);
  const peaks = parts.filter(({ heightM }) => heightM > 0).map(({ periodS }) => (2 * Math.PI) / periodS);
  return {
    form: 'torsethaugen',
    omegaPeak: peaks.length === 0 ? parameters.omegaPeakRadPerS : highestPeak(density, peaks),
    density,
  };
}

/**
 * The two parts of a sea, that of the stated peak first. With T_f = 6.6 Hs^(1/3), the peak period of a sea raised by
 * the local wind:
 *
 *     T_p <= T_f:  r = .7 + .3 exp{-[2 (T_f - T_p) / (T_f - 2 sqrt Hs)]^2},  gamma1 = 35 [(2 pi / g) H1 / T_p^2]^.857,
 *                  T2 = T_f + 2
 *     T_p > T_f:   r = .6 + .4 exp{-[(T_p - T_f) / (.3 (25 - T_f))]^2},
 *                  gamma1 = 35 [(2 pi / g) Hs / T_f^2]^.857 [1 + 6 (T_p - T_f) / (25 - T_f)],  T2 = 6.6 H2^(1/3)
 *     H1 = r Hs,  H2 = sqrt(1 - r^2) Hs,  gamma2 = 1
 *
 * gamma1 is held at 1 or above, which A needs.
 * Source: as `torsethaugen`.
 *
 * @param significantHeightM Hs, m, 0 .. 50
 * @param peakPeriodS T_p, s, > 0
 */
export function torsethaugenParts(
  significantHeightM: number,
  peakPeriodS: number,
  gravityMps2: number,
): readonly [TorsethaugenPart, TorsethaugenPart] {
  const [Hs, Tp, g] = [significantHeightM, peakPeriodS, gravityMps2];
  const Tf = 6.6 * Math.cbrt(Hs);
  const windSea = Tp <= Tf;
  const r = windSea
    ? 0.7 + 0.3 * Math.exp(-(((2 * (Tf - Tp)) / (Tf - 2 * Math.sqrt(Hs))) ** 2))
    : 0.6 + 0.4 * Math.exp(-(((Tp - Tf) / (0.3 * (25 - Tf))) ** 2));
  const H1 = r * Hs;
  const H2 = Math.sqrt(Math.max(0, 1 - r * r)) * Hs;
  const gamma = windSea
    ? 35 * (((2 * Math.PI) / g) * (H1 / Tp ** 2)) ** 0.857
    : 35 * (((2 * Math.PI) / g) * (Hs / Tf ** 2)) ** 0.857 * (1 + (6 * (Tp - Tf)) / (25 - Tf));
  return [
    { heightM: H1, periodS: Tp, peakEnhancement: Math.max(1, gamma) },
    { heightM: H2, periodS: windSea ? Tf + 2 : 6.6 * Math.cbrt(H2), peakEnhancement: 1 },
  ];
}

function partDensity({ heightM: H, periodS: T, peakEnhancement: gamma }: TorsethaugenPart): SpectralDensity {
  if (H === 0) return () => 0;
  const lnGamma = Math.log(gamma);
  const A = (1 + 1.1 * lnGamma ** 1.19) / gamma;
  // S(omega) = S_f / 2 pi.
  const level = ((H * H * T) / 16 / (2 * Math.PI)) * 3.26 * A;
  return (omega) => {
    const fT = (omega * T) / (2 * Math.PI);
    const exponent = fT ** -4;
    if (!(exponent < 745)) return 0;
    const deviation = (fT - 1) / (fT <= 1 ? 0.07 : 0.09);
    return level * exponent * Math.exp(lnGamma * Math.exp(-0.5 * deviation * deviation) - exponent);
  };
}
