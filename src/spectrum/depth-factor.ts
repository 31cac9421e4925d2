import { wavenumber } from '../physics/dispersion.ts';
import type { Water } from '../physics/water.ts';

/**
 * The share of the deep-water tail that depth leaves at an angular frequency, as a function of omega (rad/s).
 *
 *     phi = tanh^2(kh) / (1 + 2kh / sinh 2kh),  k from omega^2 = g k tanh(kh)
 *
 * It keeps the tail's form in wavenumbers, k^-3; without tension, because it compares two pure gravity tails.
 * Source: Kitaigorodskii et al. 1975. Accuracy: 1e-14; test/published/depth-factor.test.ts.
 *
 * @returns 0 at omega = 0 (omega^2 h / 2g near it), 1 in deep water
 */
export function kitaigorodskiiFactor(water: Water): (omega: number) => number {
  const { depthM: h } = water;
  if (h === Infinity) return () => 1;
  const gravityOnly: Water = { ...water, surfaceTensionNpm: 0 };
  return (omega) => {
    const kh = wavenumber(omega, gravityOnly) * h;
    if (kh === 0) return 0;
    return Math.tanh(kh) ** 2 / (1 + (2 * kh) / Math.sinh(2 * kh));
  };
}
