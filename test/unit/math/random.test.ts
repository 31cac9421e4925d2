import { describe, expect, it } from 'vitest';
import { type Counter, fillGaussianPair, type Key, philox4x32, uniform } from '../../../src/math/random.ts';
import { kurtosis, mean, powerSums, skewness, variance } from '../../../src/math/statistics.ts';
import { errorFunctionComplement } from '../../support/special-functions.ts';

const COUNT = 200_000;

/** COUNT normal numbers of one key, in counter order. */
function gaussians(key: Key): Float64Array {
  const out = new Float64Array(COUNT);
  const pair = new Float64Array(2);
  const counter: [number, number, number, number] = [0, 0, 0, 0];
  for (let i = 0; i < COUNT; i += 2) {
    counter[0] = i / 2;
    fillGaussianPair(pair, counter, key);
    out[i] = pair[0];
    out[i + 1] = pair[1];
  }
  return out;
}

// The numbers below are fixed by their keys: a test that passes once passes always. The bounds are five standard
// deviations of each statistic, so that a right generator with another key fails in fewer than 1e-6 of all cases.

describe('fillGaussianPair', () => {
  it.each([[[0, 0]], [[1, 0]], [[0xdeadbeef, 0x12345678]]] as [Key][])('moments with key %j', (key) => {
    const sums = powerSums(gaussians(key));
    expect(Math.abs(mean(sums))).toBeLessThan(5 * Math.sqrt(1 / COUNT));
    expect(Math.abs(variance(sums) - 1)).toBeLessThan(5 * Math.sqrt(2 / COUNT));
    expect(Math.abs(skewness(sums))).toBeLessThan(5 * Math.sqrt(6 / COUNT));
    expect(Math.abs(kurtosis(sums) - 3)).toBeLessThan(5 * Math.sqrt(24 / COUNT));
  });

  it('distribution: Kolmogorov-Smirnov distance', () => {
    const sorted = gaussians([7, 7]).sort();
    let distance = 0;
    for (let i = 0; i < COUNT; i += 1) {
      const tail = 0.5 * errorFunctionComplement(Math.abs(sorted[i]) / Math.SQRT2);
      const probability = sorted[i] < 0 ? tail : 1 - tail;
      distance = Math.max(
        distance,
        Math.abs(probability - i / COUNT),
        Math.abs(probability - (i + 1) / COUNT),
      );
    }
    // P(sqrt(n) D > 2.69) = 2 exp(-2 * 2.69^2) = 1e-6.
    expect(Math.sqrt(COUNT) * distance).toBeLessThan(2.69);
  });

  it('the two of a pair, and neighbours in counter and key, do not correlate', () => {
    const [one, other] = [gaussians([3, 0]), gaussians([4, 0])];
    const product = (f: (i: number) => number): number => {
      let sum = 0;
      for (let i = 0; i + 3 < COUNT; i += 2) sum += f(i);
      return sum / Math.sqrt(COUNT / 2);
    };
    expect(Math.abs(product((i) => one[i] * one[i + 1]))).toBeLessThan(5);
    expect(Math.abs(product((i) => one[i] * one[i + 2]))).toBeLessThan(5);
    expect(Math.abs(product((i) => one[i] * other[i]))).toBeLessThan(5);
    // Squares too: Box-Muller's two numbers share a radius.
    expect(Math.abs(product((i) => (one[i] ** 2 - 1) * (one[i + 1] ** 2 - 1)) / 2)).toBeLessThan(5);
  });

  it('is a function of counter and key alone', () => {
    const [a, b] = [new Float64Array(2), new Float64Array(2)];
    fillGaussianPair(a, [1, 2, 3, 4], [5, 6]);
    fillGaussianPair(b, [9, 9, 9, 9], [5, 6]);
    uniform([3, 1, 4, 1], [5, 9]);
    fillGaussianPair(b, [1, 2, 3, 4], [5, 6]);
    expect(b).toEqual(a);
    for (let place = 0; place < 4; place += 1) {
      const counter: [number, number, number, number] = [1, 2, 3, 4];
      counter[place] += 1;
      fillGaussianPair(b, counter, [5, 6]);
      expect(b).not.toEqual(a);
    }
    fillGaussianPair(b, [1, 2, 3, 4], [5, 7]);
    expect(b).not.toEqual(a);
  });
});

describe('uniform', () => {
  it('lies in [0, 1), with the moments of a uniform number', () => {
    const values = Float64Array.from({ length: COUNT }, (_, i) => uniform([i, 0, 0, 0], [1, 1]));
    const sums = powerSums(values);
    expect(sums.minimum).toBeGreaterThanOrEqual(0);
    expect(sums.maximum).toBeLessThan(1);
    expect(Math.abs(mean(sums) - 1 / 2)).toBeLessThan(5 * Math.sqrt(1 / 12 / COUNT));
    expect(Math.abs(variance(sums) - 1 / 12)).toBeLessThan(5 * Math.sqrt(1 / 180 / COUNT));
  });

  it('takes 27 bits of the first word and 26 of the second', () => {
    const words = new Uint32Array(4);
    const counter: Counter = [11, 22, 33, 44];
    philox4x32(counter, [55, 66], words);
    const bits = (BigInt(words[0] >>> 5) << 26n) | BigInt(words[1] >>> 6);
    expect(uniform(counter, [55, 66])).toBe(Number(bits) / 2 ** 53);
  });
});
