import { expect, it } from 'vitest';
import { median, relativeToMedian, steadyLimit } from '../../../src/verify/steadiness.ts';
import { scattered } from '../../support/image-scenes.ts';

it('the median is the middle one, or the mean of the middle two', () => {
  expect(median([3, 1, 2])).toBe(2);
  expect(median([4, 1, 3, 2])).toBe(2.5);
});

it('like figures are within their own limit, one of another kind is not', () => {
  const figures = Array.from({ length: 191 }, (_, i) => 10 + 0.1 * scattered(i));
  expect(relativeToMedian(Math.max(...figures), figures)).toBeLessThan(steadyLimit(figures));
  expect(relativeToMedian(11, figures)).toBeGreaterThan(steadyLimit(figures));
  // Outliers among them do not move it: four of eight times their size.
  const limit = steadyLimit(figures);
  figures.fill(80, 20, 24);
  expect(steadyLimit(figures)).toBeLessThan(1.1 * limit);
  expect(relativeToMedian(80, figures)).toBeGreaterThan(steadyLimit(figures));
});

it('figures that do not differ at all leave a hundredth, few figures more than many', () => {
  expect(steadyLimit([5, 5, 5])).toBeCloseTo(1.01, 12);
  const few = [1, 1.1, 0.9, 1.05, 0.95];
  expect(steadyLimit(few)).toBeGreaterThan(steadyLimit(Array.from({ length: 100 }, (_, i) => few[i % 5])));
});

it('nothing but nothing is like nothing', () => {
  expect(relativeToMedian(0, [0, 0, 0])).toBe(1);
  expect(relativeToMedian(1e-9, [0, 0, 0])).toBe(Infinity);
  expect(steadyLimit([0, 0, 0])).toBeGreaterThan(1);
});
