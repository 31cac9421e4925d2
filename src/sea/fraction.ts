/** An exact positive or zero rational in lowest terms. */
export interface Fraction {
  readonly numerator: bigint;
  readonly denominator: bigint;
}

/** @throws RangeError if the denominator is not positive or the numerator negative */
export function fraction(numerator: bigint, denominator: bigint): Fraction {
  if (denominator <= 0n || numerator < 0n) throw new RangeError('a fraction must not be negative');
  const divisor = greatestCommonDivisor(numerator, denominator);
  return { numerator: numerator / divisor, denominator: denominator / divisor };
}

/**
 * The decimal number a double was most likely written as, exactly: its shortest decimal of at most 12 digits
 * (`1001 ms` is 1.0009999999999999 s after the unit; it means 1.001).
 *
 * @param value finite, >= 0
 */
export function decimalFraction(value: number): Fraction {
  const [mantissa, exponentText] = value.toExponential(11).split('e');
  const digits = BigInt(mantissa.replace('.', ''));
  const exponent = Number(exponentText) - 11;
  return exponent >= 0
    ? fraction(digits * 10n ** BigInt(exponent), 1n)
    : fraction(digits, 10n ** BigInt(-exponent));
}

export function product(a: Fraction, b: Fraction): Fraction {
  return fraction(a.numerator * b.numerator, a.denominator * b.denominator);
}

/** @throws RangeError if b is zero */
export function quotient(a: Fraction, b: Fraction): Fraction {
  return fraction(a.numerator * b.denominator, a.denominator * b.numerator);
}

/** The nearest whole number; halves go up. */
export function nearestWhole({ numerator, denominator }: Fraction): bigint {
  return (2n * numerator + denominator) / (2n * denominator);
}

export function numberOf({ numerator, denominator }: Fraction): number {
  return Number(numerator) / Number(denominator);
}

function greatestCommonDivisor(a: bigint, b: bigint): bigint {
  while (b !== 0n) [a, b] = [b, a % b];
  return a;
}
