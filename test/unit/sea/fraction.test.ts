import { expect, test } from 'vitest';
import {
  decimalFraction,
  fraction,
  nearestWhole,
  numberOf,
  product,
  quotient,
} from '../../../src/sea/fraction.ts';

test('fractions are in lowest terms', () => {
  expect(fraction(48000n, 2002n)).toEqual({ numerator: 24000n, denominator: 1001n });
  expect(fraction(0n, 7n)).toEqual({ numerator: 0n, denominator: 1n });
  expect(() => fraction(1n, 0n)).toThrow(RangeError);
  expect(() => fraction(-1n, 2n)).toThrow(RangeError);
});

test.each([
  [8, 8n, 1n],
  [6.25, 25n, 4n],
  [8.008, 1001n, 125n],
  [0.1, 1n, 10n],
  // 1001 ms after multiplication by 0.001.
  [1.0009999999999999, 1001n, 1000n],
  [1e-7, 1n, 10000000n],
  [3e15, 3000000000000000n, 1n],
  [0, 0n, 1n],
])('decimalFraction(%d) = %d/%d', (value, numerator, denominator) => {
  expect(decimalFraction(value)).toEqual({ numerator, denominator });
});

test('arithmetic is exact', () => {
  // 192 frames at 24000/1001 last 8.008 s exactly.
  const seconds = quotient(fraction(192n, 1n), fraction(24000n, 1001n));
  expect(seconds).toEqual(decimalFraction(8.008));
  expect(product(seconds, fraction(24000n, 1001n))).toEqual(fraction(192n, 1n));
  expect(numberOf(seconds)).toBe(8.008);
});

test.each([
  [1n, 2n, 1n],
  [1n, 3n, 0n],
  [5n, 3n, 2n],
  [191808n, 1000n, 192n],
])('nearestWhole(%d/%d) = %d', (numerator, denominator, whole) => {
  expect(nearestWhole({ numerator, denominator })).toBe(whole);
});
