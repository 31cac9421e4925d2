import type { DirectionalSpreading } from './form.ts';

/** Directions spread normally, the same at every frequency. */
export interface WrappedNormalParameters {
  readonly form: 'wrapped-normal';
  /** Standard deviation before wrapping, rad, > 0; 10 to 40 degrees for most seas. */
  readonly standardDeviationRad: number;
}

/** Up to here the sum of wrapped images converges faster than the Fourier series. */
const NARROW = 1.5;

/** The narrowest lobe used, rad. */
const NARROWEST = 1e-3;

/**
 * Normal distribution wrapped round the circle.
 *
 *     D(theta) = (1 / 2 pi) [1 + 2 sum of exp(-n^2 sigma^2 / 2) cos n theta],  r1 = exp(-sigma^2 / 2)
 *
 * Source: standard (from memory). Accuracy: 1e-14; test/published/directional-spreading.test.ts.
 */
export function wrappedNormal(parameters: WrappedNormalParameters): DirectionalSpreading {
  const sigma = Math.max(NARROWEST, parameters.standardDeviationRad);
  return {
    form: 'wrapped-normal',
    parameter: () => sigma,
    shape: (theta, p) => density(theta, p) / density(0, p),
    normaliser: (p) => density(0, p),
  };
}

function density(theta: number, sigma: number): number {
  // The images are summed in one order for theta and -theta, so that D is even to the last bit.
  const angle = Math.abs(theta);
  let sum = 0;
  if (sigma < NARROW) {
    for (let turn = -3; turn <= 3; turn += 1) {
      const z = (angle + 2 * Math.PI * turn) / sigma;
      sum += Math.exp(-0.5 * z * z);
    }
    return sum / (sigma * Math.sqrt(2 * Math.PI));
  }
  for (let n = 8; n >= 1; n -= 1) sum += Math.exp(-0.5 * (n * sigma) ** 2) * Math.cos(n * angle);
  return Math.max(0, 1 + 2 * sum) / (2 * Math.PI);
}
