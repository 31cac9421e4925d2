import { argumentOfMaximum } from '../math/maximum.ts';
import type { SpectralDensity } from './form.ts';

/**
 * The highest peak of a spectrum that is the sum of several parts, rad/s: each part's own peak, moved a little by the
 * others, is looked for within a quarter of it.
 *
 * @param density the sum
 * @param omegaPeaks peaks of the parts, rad/s, > 0, at least one
 */
export function highestPeak(density: SpectralDensity, omegaPeaks: readonly number[]): number {
  const found = omegaPeaks.map((omega) => argumentOfMaximum(density, 0.8 * omega, 1.25 * omega));
  return found.reduce((best, omega) => (density(omega) > density(best) ? omega : best));
}
