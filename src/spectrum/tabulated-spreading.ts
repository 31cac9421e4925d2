import type { DirectionalSpreading } from './form.ts';
import { entropyDensity, maximumEntropy } from './maximum-entropy.ts';
import { tablePosition } from './tabulated.ts';

/** Directions as measured: their first two Fourier moments at each frequency of a table. */
export interface TabulatedSpreadingParameters {
  readonly form: 'tabulated';
  /** Frequencies of the table, Hz, > 0, ascending, at least two; the lists below have an entry for each. */
  readonly frequencyHz: readonly number[];
  /** Means of cos, sin theta and cos, sin 2 theta, theta counter-clockwise from the system's direction of travel. */
  readonly cos1: readonly number[];
  readonly sin1: readonly number[];
  readonly cos2: readonly number[];
  readonly sin2: readonly number[];
}

/**
 * Directions as measured: at each frequency the distribution of largest entropy with its moments, blended in between.
 *
 *     D(f, theta) = (1 - t) D_i(theta) + t D_{i+1}(theta),  f = (1 - t) f_i + t f_{i+1}
 *
 * The mean direction turns with frequency, and D is neither even nor largest at the mean. The parameter p is the place
 * in the table, i + t; beyond its ends the outermost distributions hold.
 * Check: moments kept, non-negative, test/unit/spectrum/tabulated.test.ts, test/published/buoy-day.test.ts.
 */
export function tabulatedSpreading(parameters: TabulatedSpreadingParameters): DirectionalSpreading {
  const { frequencyHz, cos1, sin1, cos2, sin2 } = parameters;
  const exponents = frequencyHz.map((_, i) =>
    maximumEntropy({ cos1: cos1[i], sin1: sin1[i], cos2: cos2[i], sin2: sin2[i] }),
  );
  const last = exponents.length - 1;
  return {
    form: 'tabulated',
    parameter: (omega) => Math.max(0, tablePosition(frequencyHz, omega / (2 * Math.PI))),
    shape: (theta, p) => {
      const i = Math.min(Math.floor(p), last);
      const t = p - i;
      const below = entropyDensity(exponents[i], theta);
      return t > 0 && i < last ? below + t * (entropyDensity(exponents[i + 1], theta) - below) : below;
    },
    normaliser: () => 1,
  };
}
