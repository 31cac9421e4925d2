import type { DirectionalSpreading } from './form.ts';

/** A wind sea, narrowest just below its peak. */
export interface DonelanBannerParameters {
  readonly form: 'donelan-banner';
  /** Angular frequency of the peak, rad/s, > 0. */
  readonly omegaPeakRadPerS: number;
}

/**
 * Hyperbolic-secant spreading, with Banner's extension to high frequencies.
 *
 *     D(theta) = (1/2) beta sech^2(beta theta) / tanh(pi beta);  q = omega / omega_p
 *     beta = 2.61 q^1.3 for .56 <= q < .95;  2.28 q^-1.3 for .95 <= q < 1.6;  1.24 below .56
 *     beta = 10^{-.4 + .8393 exp[-.567 ln q^2]} from 1.6 on
 *
 * The published form has no tanh: it integrates to 1 over the whole line, not the circle. As published it jumps by 1 %
 * at .56 and by .2 % at .95.
 * Source: Donelan, Hamilton & Hui 1985; Banner 1990. Check: computed beta and moments,
 * test/published/directional-spreading.test.ts.
 */
export function donelanBanner(parameters: DonelanBannerParameters): DirectionalSpreading {
  const { omegaPeakRadPerS: omegaPeak } = parameters;
  return {
    form: 'donelan-banner',
    parameter: (omega) => beta(omega / omegaPeak),
    shape: (theta, b) => Math.cosh(b * theta) ** -2,
    normaliser: (b) => (0.5 * b) / Math.tanh(Math.PI * b),
  };
}

function beta(q: number): number {
  if (q < 0.56) return 1.24;
  if (q < 0.95) return 2.61 * q ** 1.3;
  if (q < 1.6) return 2.28 * q ** -1.3;
  return 10 ** (-0.4 + 0.8393 * Math.exp(-0.567 * Math.log(q * q)));
}
