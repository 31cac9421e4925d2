import { describe, expect, it } from 'vitest';
import { integral } from '../../../src/math/quadrature.ts';
import { logGamma } from '../../../src/math/special.ts';
import { errorFunctionComplement, exponentialIntegral1 } from '../../support/special-functions.ts';
import { expectPrinted, expectRelative, FEW_ULP, QUADRATURE } from '../../support/tolerances.ts';

describe('logGamma', () => {
  it('is ln (n - 1)! at whole numbers', () => {
    let factorial = 1;
    for (let n = 1; n < 150; n += 1) {
      const expected = Math.log(factorial);
      expect(Math.abs(logGamma(n) - expected)).toBeLessThan(1e-14 + FEW_ULP * expected);
      factorial *= n;
    }
  });

  it('is ln sqrt(pi) at 1/2, and obeys the recurrence and the duplication formula', () => {
    expectRelative(logGamma(0.5), 0.5 * Math.log(Math.PI), 1e-13, 'at 1/2');
    for (const x of [1e-8, 0.01, 0.3, 1.7, 9.99, 10, 42.5, 1e3, 1e4]) {
      const size = Math.max(1, Math.abs(logGamma(2 * x)));
      expect(Math.abs(logGamma(x + 1) - logGamma(x) - Math.log(x)) / size).toBeLessThan(1e-14);
      const doubled = logGamma(x) + logGamma(x + 0.5) + (2 * x - 1) * Math.LN2 - 0.5 * Math.log(Math.PI);
      expect(Math.abs(doubled - logGamma(2 * x)) / size).toBeLessThan(1e-14);
    }
  });

  it('refuses negative arguments', () => {
    expect(logGamma(0)).toBe(Infinity);
    expect(() => logGamma(-0.5)).toThrow(RangeError);
    expect(() => logGamma(Number.NaN)).toThrow(RangeError);
  });
});

describe('functions for tests', () => {
  // Abramowitz & Stegun 1964, tables 5.1 and 7.1 (from memory).
  it('exponential integral', () => {
    expectPrinted(exponentialIntegral1(1), '.2193839344', 'E1(1)');
    for (const x of [1e-6, 0.1, 0.999, 1.001, 3, 10]) {
      const tail = integral((u) => Math.exp(-x / u) / u, 0, 1, { relativeTolerance: 1e-12 });
      expectRelative(exponentialIntegral1(x), tail, QUADRATURE, `E1(${x})`);
    }
  });

  it('complementary error function', () => {
    expectPrinted(errorFunctionComplement(1), '.1572992071', 'erfc(1)');
    // Exceedance of 1 .. 4 standard deviations, computed elsewhere.
    expectPrinted(0.5 * errorFunctionComplement(1 / Math.SQRT2), '.158655', '1 sigma');
    expectPrinted(0.5 * errorFunctionComplement(2 / Math.SQRT2), '.0227501', '2 sigma');
    expectPrinted(0.5 * errorFunctionComplement(3 / Math.SQRT2), '.00134990', '3 sigma');
    expectPrinted(0.5 * errorFunctionComplement(4 / Math.SQRT2), '3.16712e-5', '4 sigma');
  });
});
