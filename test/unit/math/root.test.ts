import { describe, expect, it } from 'vitest';
import { root } from '../../../src/math/root.ts';
import { expectRelative, FEW_ULP } from '../../support/tolerances.ts';

describe('root', () => {
  it.each([
    ['cube root of 2', (x: number) => x ** 3 - 2, 0, 2, Math.cbrt(2)],
    ['falling', (x: number) => 1 - Math.exp(x - 3), 0, 50, 3],
    ['flat start', (x: number) => x ** 9 - 1e-9, 0, 10, 0.1],
    ['at the lower end', (x: number) => x - 1, 1, 2, 1],
    ['at the upper end', (x: number) => x - 2, 1, 2, 2],
    ['step', (x: number) => (x < 0.7 ? -1 : 1), 0, 1, 0.7],
  ])('%s', (_, f, low, high, expected) => {
    expectRelative(root(f, low, high), expected, FEW_ULP, 'root');
  });

  it('refuses an interval without a change of sign', () => {
    expect(() => root((x) => x * x + 1, -1, 1)).toThrow(RangeError);
  });
});
