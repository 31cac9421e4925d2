import { describe, expect, it } from 'vitest';
import { uniform } from '../../../src/math/random.ts';
import { exponentialSumBounds } from '../../../src/verify/chance.ts';

describe('bounds on a weighted sum of exponential numbers', () => {
  // Chernoff's bound by hand for one number: e^{-tx} / (1 - t) is least at t = 1 - 1/x, which gives x e^{1-x}.
  it.each([1e-2, 1e-6, 1e-9])('of one number are the roots of x e^(1 - x) = %s', (p) => {
    const [low, high] = exponentialSumBounds([3], p);
    expect((high / 3) * Math.exp(1 - high / 3)).toBeCloseTo(p, 12);
    expect((low / 3) * Math.exp(1 - low / 3)).toBeCloseTo(p, 12);
    expect(low).toBeLessThan(3);
    expect(high).toBeGreaterThan(3);
  });

  it('of n like numbers are those of one, with the n-th root of the probability', () => {
    const [low, high] = exponentialSumBounds(new Array(20).fill(0.5), 1e-6);
    const [lowOne, highOne] = exponentialSumBounds([0.5], 1e-6 ** (1 / 20));
    expect(low).toBeCloseTo(20 * lowOne, 9);
    expect(high).toBeCloseTo(20 * highOne, 9);
  });

  it('of many numbers approach those of a normal one from outside', () => {
    const [low, high] = exponentialSumBounds(new Array(100_000).fill(1e-5), 1e-6);
    // exp(-z^2 / 2) = 1e-6 at z = 5.2565, with deviation 1 / sqrt(100 000).
    expect((high - 1) * Math.sqrt(100_000)).toBeCloseTo(5.2565, 1);
    expect((1 - low) * Math.sqrt(100_000)).toBeCloseTo(5.2565, 1);
  });

  it('turn round with the signs of the weights', () => {
    const [low, high] = exponentialSumBounds([1, -0.3, 0.02], 1e-4);
    const [lowTurned, highTurned] = exponentialSumBounds([-1, 0.3, -0.02], 1e-4);
    expect(lowTurned).toBeCloseTo(-high, 12);
    expect(highTurned).toBeCloseTo(-low, 12);
    expect(exponentialSumBounds([0, 0], 1e-4)).toEqual([0, 0]);
  });

  it('are crossed no more often than they say, and not a hundred times less', () => {
    const weights = [1, 0.5, -0.7, 0.2, 0.2, -0.1, 0.05];
    const [low, high] = exponentialSumBounds(weights, 0.02);
    let [below, above] = [0, 0];
    const draws = 50_000;
    for (let draw = 0; draw < draws; draw++) {
      let sum = 0;
      weights.forEach((w, i) => {
        sum -= w * Math.log(1 - uniform([draw, i, 0, 0], [7, 7]));
      });
      if (sum < low) below++;
      if (sum > high) above++;
    }
    for (const crossed of [below, above]) {
      expect(crossed / draws).toBeLessThan(0.02);
      expect(crossed / draws).toBeGreaterThan(0.0002);
    }
  });
});
