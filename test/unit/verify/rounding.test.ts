import { describe, expect, it } from 'vitest';
import { halfFromNumber, numberFromHalf } from '../../../src/math/half.ts';
import { fillGaussianPair } from '../../../src/math/random.ts';
import {
  meanSquareOfClipping,
  meanSquareOfCodes,
  meanSquareOfFloats,
  meanSquareOfHalves,
  type Rounding,
  roundingBound,
  roundingExcess,
} from '../../../src/verify/rounding.ts';
import { scattered } from '../../support/image-scenes.ts';

const CODES: Rounding = {
  sample: 'uint8',
  scale: 2.55,
  step: 0.01,
  dithered: false,
  low: -Infinity,
  high: Infinity,
  meanSquare: 0,
  clipping: 0,
};

/** Normal numbers of deviation 1. */
function normal(count: number): Float64Array {
  const pair = new Float64Array(2);
  return Float64Array.from({ length: count }, (_, i) => {
    fillGaussianPair(pair, [i, 0, 0, 0], [1, 2]);
    return pair[0];
  });
}

function meanSquare(errors: Float64Array): number {
  return errors.reduce((sum, error) => sum + error * error, 0) / errors.length;
}

describe('the bound on rounding', () => {
  it('is half a step of codes, a whole one where dithered', () => {
    expect(roundingBound(CODES, 0.3)).toBe(0.005);
    expect(roundingBound({ ...CODES, dithered: true }, 0.3)).toBe(0.01);
  });

  it.each([0.001, 1.2345, -37.5, 6e-8])('holds for halves of either scale: %s', (value) => {
    const half: Rounding = { ...CODES, sample: 'half', step: 0, scale: -0.01 };
    const stored = -0.01 * numberFromHalf(halfFromNumber(value / -0.01));
    expect(Math.abs(stored - value)).toBeLessThanOrEqual(roundingBound(half, stored));
    // And is no wider than needed: half of it does not hold everywhere.
    const middle = stored + 0.999 * roundingBound(half, stored);
    expect(-0.01 * numberFromHalf(halfFromNumber(middle / -0.01))).toBeCloseTo(stored, 12);
  });

  it('holds for binary32', () => {
    const float: Rounding = { ...CODES, sample: 'float', step: 0, scale: 1 };
    for (let i = 0; i < 1000; i++) {
      const value = (scattered(i) - 0.5) * 10 ** (8 * scattered(i + 5000) - 4);
      expect(Math.abs(Math.fround(value) - value)).toBeLessThanOrEqual(
        roundingBound(float, Math.fround(value)),
      );
    }
  });

  it('leaves the excess beyond it, and none beyond a clipped end', () => {
    expect(roundingExcess(CODES, 0.304, 0.3)).toBe(0);
    expect(roundingExcess(CODES, 0.308, 0.3)).toBeCloseTo(0.003, 12);
    const clipped = { ...CODES, low: -1, high: 0.3 };
    expect(roundingExcess(clipped, 5, 0.3)).toBe(0);
    expect(roundingExcess(clipped, 0.2, 0.3)).toBeCloseTo(0.095, 12);
    expect(roundingExcess(clipped, -7, -1)).toBe(0);
  });
});

describe('the mean square of rounding', () => {
  const values = normal(200_000);

  it('of codes is that of uniform errors, to 2 %', () => {
    const errors = values.map((value) => Math.round(value / 0.2) * 0.2 - value);
    expect(meanSquare(errors) / meanSquareOfCodes(0.2, false)).toBeCloseTo(1, 1.5);
    const dithered = values.map((value, i) => Math.round(value / 0.2 + scattered(i) - 0.5) * 0.2 - value);
    expect(meanSquare(dithered) / meanSquareOfCodes(0.2, true)).toBeCloseTo(1, 1.5);
  });

  it('of halves is that of uniform errors in each binade, to 2 %', () => {
    const exponents = new Uint32Array(32);
    const errors = values.map((value) => {
      const bits = halfFromNumber(value);
      exponents[(bits >> 10) & 31]++;
      return numberFromHalf(bits) - value;
    });
    expect(meanSquare(errors) / meanSquareOfHalves(exponents, 1)).toBeCloseTo(1, 1.5);
    expect(meanSquareOfHalves(exponents, -0.01) / meanSquareOfHalves(exponents, 1)).toBeCloseTo(1e-4, 12);
    expect(meanSquareOfHalves(new Uint32Array(32), 1)).toBe(0);
  });

  it('of binary32 is not above what it says, nor below a quarter of it', () => {
    const errors = values.map((value) => Math.fround(value) - value);
    const ratio = meanSquare(errors) / meanSquareOfFloats(meanSquare(values));
    expect(ratio).toBeLessThan(1);
    expect(ratio).toBeGreaterThan(0.25);
  });

  it.each([1.5, 2, 2.5, 3])(
    'of clipping at %s deviations is not above what it says, nor below a third',
    (t) => {
      const errors = values.map((value) => Math.min(t, Math.max(-t, value)) - value);
      const share = errors.filter((error) => error !== 0).length / errors.length;
      const ratio = meanSquare(errors) / meanSquareOfClipping(share, t, 1);
      expect(ratio).toBeLessThan(1);
      expect(ratio).toBeGreaterThan(0.33);
    },
  );
});
