/**
 * How far one of many like figures may lie above the others: eight robust deviations of them (1.4826 times the median
 * distance from the median, which outliers do not move), more where they are few and that distance is itself uncertain,
 * and a hundredth for figures that hardly differ at all.
 *
 * For normally distributed figures eight deviations are reached once in 1e15; of a few hundred steps of short loops with
 * few waves the furthest lay 12 of them out, where this allows 24 (test/built/verify-bakes.test.ts).
 */
const DEVIATIONS = 8;
const FEW = 24;
const LEAST_MARGIN = 0.01;

export const STEADINESS_REASON: string = `${DEVIATIONS} robust deviations of all of them above their median, more where they are few`;

/** Largest figure that still belongs to the others, in units of their median. */
export function steadyLimit(figures: readonly number[]): number {
  const middle = median(figures);
  if (middle === 0) return 1 + LEAST_MARGIN;
  const deviation = 1.4826 * median(figures.map((figure) => Math.abs(figure - middle)));
  const deviations = DEVIATIONS * (1 + FEW / figures.length);
  return 1 + LEAST_MARGIN + (deviations * deviation) / middle;
}

/** A figure in units of the median of its like: 1 where all are 0. */
export function relativeToMedian(figure: number, figures: readonly number[]): number {
  const middle = median(figures);
  if (middle === 0) return figure === 0 ? 1 : Infinity;
  return figure / middle;
}

export function median(figures: readonly number[]): number {
  const sorted = [...figures].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half] : 0.5 * (sorted[half - 1] + sorted[half]);
}
