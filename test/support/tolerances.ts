import { expect } from 'vitest';

/**
 * Named tolerances, each with its reason. Relative unless the name says otherwise.
 */

/** A short chain of correctly rounded operations and library functions of 1 ulp each. */
export const FEW_ULP = 4 * Number.EPSILON;

/** A formula with powers and exponentials of large arguments: each digit of the argument costs one of the result. */
export const POWERS = 1e-13;

/** Adaptive quadrature asked for 1e-10. */
export const QUADRATURE = 1e-9;

/** Moments of a spectrum, as promised by src/spectrum/moments.ts. */
export const MOMENT = 1e-8;

/** Values computed by another program with another quadrature, both of ten digits. */
export const OTHER_QUADRATURE = 1e-7;

/**
 * Half a unit in the last digit of a number as it is printed: what rounding explains, and no more. `.0204` gives
 * 5e-5, `1.2e-4` gives 5e-6. Absolute.
 */
export function printedTolerance(printed: string): number {
  const match = /^[+-]?\d*(?:\.(\d*))?(?:e([+-]?\d+))?$/.exec(printed);
  if (match === null) throw new Error(`not a printed number: ${printed}`);
  const [, decimals = '', exponent = '0'] = match;
  // A millionth more, for values that lie on the border of rounding.
  return 0.5 * 10 ** (Number(exponent) - decimals.length) * (1 + 1e-6);
}

/** Expects a value to be what is printed, to the last digit printed. */
export function expectPrinted(actual: number, printed: string, what: string): void {
  expect(Math.abs(actual - Number(printed)), `${what}: ${actual}, printed ${printed}`).toBeLessThanOrEqual(
    printedTolerance(printed),
  );
}

/** Expects |actual - expected| <= relative * |expected|. */
export function expectRelative(actual: number, expected: number, relative: number, what: string): void {
  expect(Math.abs(actual - expected), `${what}: ${actual}, expected ${expected}`).toBeLessThanOrEqual(
    relative * Math.abs(expected),
  );
}

/**
 * A transformed field against a direct sum, as a share of the field's root mean square: some twenty roundings of a
 * transform's largest terms, which are up to a hundred times the root mean square.
 */
export const TRANSFORM = 1e-13;

/** Deviations predicted from the waves against those of a whole loop: two sums of some 10^5 terms. */
export const PARSEVAL = 1e-12;

/** Sum of cell variances against the one-dimensional integral of the band. */
export const CELL_SUM = 1e-3;

/** Linear interpolation in a radial table, as a share of the largest tabulated value. */
export const RADIAL_TABLE = 6e-5;
