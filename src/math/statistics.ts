/**
 * Power sums of some values, which can be merged. Merging in a fixed order gives the same bits however the values were
 * shared out, as long as each part held the same values.
 */
export interface PowerSums {
  readonly count: number;
  readonly sum: number;
  readonly squares: number;
  readonly cubes: number;
  readonly fourths: number;
  /** `Infinity` if there are no values. */
  readonly minimum: number;
  /** `-Infinity` if there are no values. */
  readonly maximum: number;
}

/** The power sums of nothing, the identity of `mergedPowerSums`. */
export const NO_VALUES: PowerSums = Object.freeze({
  count: 0,
  sum: 0,
  squares: 0,
  cubes: 0,
  fourths: 0,
  minimum: Infinity,
  maximum: -Infinity,
});

/**
 * Power sums of values whose mean is not far from zero next to their deviation (raw sums lose digits otherwise: two
 * for a mean of ten deviations in the variance, four in the fourth moment).
 *
 * @param values any length, any order; not kept
 */
export function powerSums(values: ArrayLike<number>): PowerSums {
  let sum = 0;
  let squares = 0;
  let cubes = 0;
  let fourths = 0;
  let minimum = Infinity;
  let maximum = -Infinity;
  for (let i = 0; i < values.length; i += 1) {
    const x = values[i];
    const xx = x * x;
    sum += x;
    squares += xx;
    cubes += xx * x;
    fourths += xx * xx;
    if (x < minimum) minimum = x;
    if (x > maximum) maximum = x;
  }
  return { count: values.length, sum, squares, cubes, fourths, minimum, maximum };
}

/** Power sums of the values of `first` followed by those of `second`. */
export function mergedPowerSums(first: PowerSums, second: PowerSums): PowerSums {
  return {
    count: first.count + second.count,
    sum: first.sum + second.sum,
    squares: first.squares + second.squares,
    cubes: first.cubes + second.cubes,
    fourths: first.fourths + second.fourths,
    minimum: Math.min(first.minimum, second.minimum),
    maximum: Math.max(first.maximum, second.maximum),
  };
}

/** Arithmetic mean; NaN of no values. */
export function mean(sums: PowerSums): number {
  return sums.sum / sums.count;
}

/** Population variance <(x - mean)^2>, never below 0; NaN of no values. */
export function variance(sums: PowerSums): number {
  const m = mean(sums);
  return Math.max(0, sums.squares / sums.count - m * m);
}

/** Skewness <(x - mean)^3> / variance^(3/2); NaN where the variance is 0. */
export function skewness(sums: PowerSums): number {
  const { count: n } = sums;
  const m = mean(sums);
  const third = sums.cubes / n - (3 * m * sums.squares) / n + 2 * m ** 3;
  return third / variance(sums) ** 1.5;
}

/** Kurtosis <(x - mean)^4> / variance^2 (3 for a normal distribution); NaN where the variance is 0. */
export function kurtosis(sums: PowerSums): number {
  const { count: n } = sums;
  const m = mean(sums);
  const fourth = sums.fourths / n - (4 * m * sums.cubes) / n + (6 * m * m * sums.squares) / n - 3 * m ** 4;
  return fourth / variance(sums) ** 2;
}
