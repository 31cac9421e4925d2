/** How often a sound bake may fail a statistical check: once in a million rows, and less, since bounds are used. */
export const FALSE_ALARM_RATE = 1e-6;

/**
 * Bounds that a weighted sum of independent exponential numbers of mean 1 leaves with at most the given probability on
 * each side: Chernoff's bound,
 *
 *     P(X >= x) <= min over t of e^{-t x} prod 1 / (1 - t w_i),
 *
 * which holds for every set of weights, few or many. The squared moduli of Gaussian wave amplitudes are such numbers, so
 * this is what one realisation of a random sea can show. Source: Chernoff 1952 (from memory).
 *
 * @param weights of either sign; at least one not 0
 * @param probability on each side
 * @returns bounds on sum w_i X_i, around its mean sum w_i
 */
export function exponentialSumBounds(
  weights: readonly number[],
  probability: number,
): readonly [low: number, high: number] {
  const scale = weights.reduce((most, weight) => Math.max(most, Math.abs(weight)), 0);
  if (scale === 0) return [0, 0];
  const scaled = weights.map((weight) => weight / scale);
  return [
    -scale *
      upperBound(
        scaled.map((weight) => -weight),
        probability,
      ),
    scale * upperBound(scaled, probability),
  ];
}

/** The x at which the bound on P(X >= x) is the probability: the root of ln p = K(t) - t K'(t), x = K'(t). */
function upperBound(weights: readonly number[], probability: number): number {
  const largest = weights.reduce((most, weight) => Math.max(most, weight), 0);
  const target = Math.log(probability);
  // t runs from 0, where the bound is 1, to the pole of the largest weight; without positive weights there is none.
  const pole = largest > 0 ? 1 / largest : Infinity;
  let low = 0;
  let high = pole === Infinity ? 1 : pole;
  if (pole === Infinity) {
    while (logBound(weights, high) > target && high < 1e12) high *= 2;
  }
  for (let step = 0; step < 60; step++) {
    const t = 0.5 * (low + high);
    if (logBound(weights, t) > target) low = t;
    else high = t;
  }
  return derivative(weights, low);
}

/** K(t) - t K'(t), which falls from 0 as t grows. */
function logBound(weights: readonly number[], t: number): number {
  let sum = 0;
  for (const w of weights) sum -= Math.log1p(-t * w) + (t * w) / (1 - t * w);
  return sum;
}

/** K'(t). */
function derivative(weights: readonly number[], t: number): number {
  let sum = 0;
  for (const w of weights) sum += w / (1 - t * w);
  return sum;
}
