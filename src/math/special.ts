const HALF_LN_TWO_PI = 0.5 * Math.log(2 * Math.PI);

/**
 * Natural logarithm of the gamma function, for x > 0.
 *
 *     ln Gamma(x) = (x - 1/2) ln x - x + ln(2 pi)/2 + 1/(12x) - 1/(360x^3) + ...
 *
 * Stirling's series from x = 10 on; smaller arguments are moved there by Gamma(x) = Gamma(x + 1) / x.
 * Source: Abramowitz & Stegun 1964 (from memory). Accuracy: 1e-14 absolute or 4 ulp;
 * test/unit/math/special.test.ts.
 *
 * @param x argument, > 0; `Infinity` at 0
 * @throws RangeError if x is negative or not a number
 */
export function logGamma(x: number): number {
  if (!(x >= 0)) throw new RangeError(`logGamma is defined here for x >= 0, found ${x}`);
  let product = 1;
  let z = x;
  while (z < 10) {
    product *= z;
    z += 1;
  }
  const w = 1 / (z * z);
  const series =
    (1 / 12 +
      w * (-1 / 360 + w * (1 / 1260 + w * (-1 / 1680 + w * (1 / 1188 + w * (-691 / 360360 + w / 156)))))) /
    z;
  return (z - 0.5) * Math.log(z) - z + HALF_LN_TWO_PI + series - Math.log(product);
}
