import { describe, expect, it } from 'vitest';
import { argumentOfMaximum } from '../../../src/math/maximum.ts';

describe('argumentOfMaximum', () => {
  it.each([
    ['inside', (x: number) => -((x - 0.3) ** 2), -1, 2, 0.3],
    ['the higher of two hills', (x: number) => Math.sin(x) + 0.1 * x, 0, 9, 2 * Math.PI + Math.acos(-0.1)],
    ['at the lower end', (x: number) => -x, 0, 5, 0],
    ['at the upper end', (x: number) => x, 0, 5, 5],
  ])('%s', (_, f, a, b, expected) => {
    expect(Math.abs(argumentOfMaximum(f, a, b) - expected)).toBeLessThan(3e-8 * (b - a));
  });
});
