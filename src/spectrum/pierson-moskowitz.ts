import type { Water } from '../physics/water.ts';
import type { FrequencySpectrum } from './form.ts';
import { omegaMinusFive } from './omega-minus-five.ts';

/** A fully developed sea in deep water, by the wind that keeps it up. */
export interface PiersonMoskowitzParameters {
  readonly form: 'pierson-moskowitz';
  /** Wind speed 19.5 m above the sea (not the usual 10 m), m/s, > 0. */
  readonly windSpeed19p5Mps: number;
}

const ALPHA = 0.0081;
const BETA = 0.74;
/** omega_p U19.5 / g. */
const PEAK = (0.8 * BETA) ** 0.25;

/**
 * The spectrum of fully developed seas.
 *
 *     S(omega) = alpha g^2 omega^-5 exp[-beta (g / (U omega))^4],  alpha = .0081, beta = .74, U at 19.5 m
 *
 * From ship records in some 10 to 20 m/s of wind.
 * Source: Pierson & Moskowitz 1964 (Stewart 2008, eqs 16.28 to 16.33). Check: its closed forms,
 * test/published/frequency-spectra.test.ts.
 */
export function piersonMoskowitz(parameters: PiersonMoskowitzParameters, water: Water): FrequencySpectrum {
  const g = water.gravityMps2;
  const omegaPeak = (PEAK * g) / parameters.windSpeed19p5Mps;
  const level = ALPHA * g * g;
  return {
    form: 'pierson-moskowitz',
    omegaPeak,
    density: (omega) => level * omegaMinusFive(omega, omegaPeak),
  };
}

/**
 * The wind speed at 19.5 m whose fully developed sea has its peak at this angular frequency, m/s.
 *
 *     U = (4 beta / 5)^(1/4) g / omega_p
 */
export function piersonMoskowitzWindSpeed(omegaPeakRadPerS: number, gravityMps2: number): number {
  return (PEAK * gravityMps2) / omegaPeakRadPerS;
}
