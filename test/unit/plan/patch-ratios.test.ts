import { describe, expect, it } from 'vitest';
import { distanceToFractions, unrelatedRatio, writtenPatch } from '../../../src/plan/patch-ratios.ts';

describe('distanceToFractions', () => {
  it.each([
    ['the golden ratio', (1 + Math.sqrt(5)) / 2, (3 - Math.sqrt(5)) / 2],
    ['sqrt 2, by 2 (3 - 2 sqrt 2)', Math.SQRT2, 2 * (3 - 2 * Math.SQRT2)],
    ['sqrt 3', Math.sqrt(3), 2 - Math.sqrt(3)],
    ['sqrt 5, by 4 (9 - 4 sqrt 5)', Math.sqrt(5), 4 * (9 - 4 * Math.sqrt(5))],
    ['7.618', 7.618033988749895, (3 - Math.sqrt(5)) / 2],
  ])('of %s', (_, ratio, distance) => {
    expect(distanceToFractions(ratio)).toBeCloseTo(distance, 12);
  });

  it.each([7, 7.5, 7 + 1 / 3, 7.4, 7.3, 8 + 1 / 12])('of %f is none', (ratio) => {
    expect(distanceToFractions(ratio)).toBeLessThan(1e-12);
  });
});

describe('unrelatedRatio', () => {
  it('stays within a tenth below the one asked for, and clear of simple fractions', () => {
    for (const R of [1.5, 3, 4.1, 8.192, 16.4, 32.8]) {
      const ratio = unrelatedRatio([100], R);
      expect(ratio).toBeGreaterThanOrEqual(0.9 * R * (1 - 1e-12));
      expect(ratio).toBeLessThanOrEqual(R * (1 + 1e-12));
      expect(distanceToFractions(ratio)).toBeGreaterThan(0.25);
    }
  });

  it('minds every longer patch, not the last alone', () => {
    const [first, second] = [374.9, 49.21];
    const ratio = unrelatedRatio([first, second], 8.192);
    expect(distanceToFractions(ratio)).toBeGreaterThan(0.2);
    expect(distanceToFractions((first / second) * ratio)).toBeGreaterThan(0.2);
  });
});

describe('writtenPatch', () => {
  it('has four digits, is within half a per cent, and is clear of simple fractions as written', () => {
    for (const ideal of [81.1805, 17.1961, 6.65943, 5.86155, 0.30067]) {
      const longer = [374.9, 49.21].filter((patch) => patch > 2 * ideal);
      const written = writtenPatch(ideal, longer);
      expect(written).toBe(Number(written.toPrecision(4)));
      expect(Math.abs(written / ideal - 1)).toBeLessThan(0.0051);
      for (const patch of longer) expect(distanceToFractions(patch / written)).toBeGreaterThan(0.15);
    }
  });

  it('moves away from where rounding brings two tiles into line', () => {
    // 374.9 / 7.43 is 50.458 and 12 times that is 605.49: rounded, the four tiles would all but line up.
    const longer = [374.9, 101.2, 27.22];
    const least = (patch: number): number => Math.min(...longer.map((l) => distanceToFractions(l / patch)));
    expect(least(7.43)).toBeLessThan(0.03);
    expect(least(writtenPatch(7.43, longer))).toBeGreaterThan(0.1);
  });
});
