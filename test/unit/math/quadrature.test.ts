import { describe, expect, it } from 'vitest';
import { gaussLegendre, integral } from '../../../src/math/quadrature.ts';
import { expectRelative, FEW_ULP, QUADRATURE } from '../../support/tolerances.ts';

describe('integral', () => {
  it('is exact for polynomials of degree 22, from one interval', () => {
    for (let degree = 0; degree <= 22; degree += 1) {
      let calls = 0;
      const value = integral(
        (x) => {
          calls += 1;
          return (degree + 1) * x ** degree;
        },
        0,
        2,
        // So loose that nothing is halved.
        { relativeTolerance: 1 },
      );
      expect(calls).toBe(15);
      expectRelative(value, 2 ** (degree + 1), 4 * FEW_ULP, `degree ${degree}`);
    }
    // Far beyond it is not exact, or the check above would show nothing.
    const steep = integral((x) => x ** 60, -1, 1, { relativeTolerance: 1 });
    expect(Math.abs(steep - 2 / 61)).toBeGreaterThan(1e-11);
  });

  it.each([
    ['exp', Math.exp, 0, 1, Math.E - 1],
    ['narrow hill', (x: number) => 1 / (1e-6 + x * x), -1, 1, 2e3 * Math.atan(1e3)],
    ['root at an end', Math.sqrt, 0, 1, 2 / 3],
    ['logarithm at an end', Math.log, 0, 1, -1],
    ['kink', (x: number) => Math.abs(x - 0.3), 0, 1, 0.29],
    ['reversed', Math.exp, 1, 0, 1 - Math.E],
  ])('%s', (_, f, a, b, expected) => {
    expectRelative(integral(f, a, b), expected, QUADRATURE, 'integral');
  });

  it('with breakpoints finds a hill that it would step over', () => {
    const hill = (x: number): number => Math.exp(-(((x - 0.123) / 1e-4) ** 2));
    const expected = 1e-4 * Math.sqrt(Math.PI);
    expectRelative(
      integral(hill, 0, 1, { breakpoints: [0.12, 0.123, 0.13] }),
      expected,
      QUADRATURE,
      'integral',
    );
    expect(integral(hill, 0, 1)).toBeLessThan(1e-3 * expected);
  });

  it('stops at an absolute tolerance where the integral is zero', () => {
    expect(Math.abs(integral(Math.sin, -3, 3, { absoluteTolerance: 1e-12 }))).toBeLessThan(1e-12);
  });

  it('refuses what it cannot do', () => {
    expect(() => integral(() => Number.NaN, 0, 1)).toThrow(/not finite/);
    const noise = (x: number): number => (1e6 * Math.sin(1e6 * x)) % 1;
    expect(() => integral(noise, 0, 1)).toThrow(/does not converge/);
  });
});

describe('gaussLegendre', () => {
  it('knows the two-point rule', () => {
    const { nodes, weights } = gaussLegendre(2);
    expectRelative(nodes[1], 1 / Math.sqrt(3), FEW_ULP, 'node');
    expectRelative(nodes[0], -1 / Math.sqrt(3), FEW_ULP, 'node');
    expectRelative(weights[0], 1, FEW_ULP, 'weight');
  });

  it.each([1, 2, 3, 5, 8, 16, 33, 100])('%d points are exact to degree 2n - 1', (n) => {
    const { nodes, weights } = gaussLegendre(n);
    const sum = (f: (x: number) => number): number =>
      nodes.reduce((total, x, i) => total + weights[i] * f(x), 0);
    for (const degree of [0, 2, n - (n % 2), 2 * n - 2].filter((even) => even < 2 * n)) {
      expectRelative(
        sum((x) => (degree + 1) * x ** degree),
        2,
        1e-13,
        `degree ${degree}`,
      );
    }
    expect(Math.abs(sum((x) => x ** (2 * n - 1)))).toBeLessThan(1e-14);
    expect([...nodes]).toEqual([...nodes].sort((a, b) => a - b));
    // One degree more is off by 2^(2n+1) n!^4 / ((2n+1) (2n)!^2): visible for small n.
    if (n <= 8) expect(Math.abs(sum((x) => (2 * n + 1) * x ** (2 * n)) - 2)).toBeGreaterThan(1e-10);
  });
});
