import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  kurtosis,
  mean,
  mergedPowerSums,
  NO_VALUES,
  powerSums,
  skewness,
  variance,
} from '../../../src/math/statistics.ts';
import { expectRelative } from '../../support/tolerances.ts';

describe('power sums', () => {
  it('of a few values, by hand', () => {
    const sums = powerSums([1, 2, 2, 7]);
    expect(sums).toEqual({
      count: 4,
      sum: 12,
      squares: 58,
      cubes: 360,
      fourths: 2434,
      minimum: 1,
      maximum: 7,
    });
    // Deviations from 3: -2, -1, -1, 4.
    expect(mean(sums)).toBe(3);
    expect(variance(sums)).toBe(5.5);
    expectRelative(skewness(sums), 13.5 / 5.5 ** 1.5, 1e-14, 'skewness');
    expectRelative(kurtosis(sums), 68.5 / 5.5 ** 2, 1e-14, 'kurtosis');
  });

  it('two values a unit from their mean have kurtosis 1', () => {
    const sums = powerSums(new Float32Array([-1, 1, -1, 1]));
    expect([mean(sums), variance(sums), skewness(sums), kurtosis(sums)]).toEqual([0, 1, 0, 1]);
  });

  it('of nothing', () => {
    expect(powerSums([])).toEqual(NO_VALUES);
    expect(mean(NO_VALUES)).toBeNaN();
    expect(variance(powerSums([5, 5, 5]))).toBe(0);
  });

  it('merge to the sums of all values, exactly for whole numbers', () => {
    const whole = fc.array(fc.integer({ min: -100, max: 100 }));
    fc.assert(
      fc.property(whole, whole, (first, second) => {
        const merged = mergedPowerSums(powerSums(first), powerSums(second));
        expect(merged).toEqual(powerSums([...first, ...second]));
        expect(mergedPowerSums(NO_VALUES, merged)).toEqual(merged);
        expect(mergedPowerSums(merged, NO_VALUES)).toEqual(merged);
      }),
    );
  });
});
