import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type CircularMoments,
  entropyDensity,
  maximumEntropy,
} from '../../../src/spectrum/maximum-entropy.ts';
import { between } from '../../support/form-arbitraries.ts';

const POINTS = 4096;

/** Mean over the circle of a distribution times a function, by the trapezoidal rule. */
function mean(moments: CircularMoments, f: (theta: number) => number): number {
  const exponent = maximumEntropy(moments);
  let sum = 0;
  for (let i = 0; i < POINTS; i++) {
    const theta = (2 * Math.PI * (i + 0.5)) / POINTS;
    sum += entropyDensity(exponent, theta) * f(theta);
  }
  return (sum * 2 * Math.PI) / POINTS;
}

function momentsOf(moments: CircularMoments): CircularMoments {
  return {
    cos1: mean(moments, Math.cos),
    sin1: mean(moments, Math.sin),
    cos2: mean(moments, (theta) => Math.cos(2 * theta)),
    sin2: mean(moments, (theta) => Math.sin(2 * theta)),
  };
}

/** Moments of cos-2s about an angle: r1 = s / (s + 1), r2 = s (s - 1) / ((s + 1)(s + 2)). */
function cosinePowerMoments(s: number, about: number): CircularMoments {
  const [r1, r2] = [s / (s + 1), (s * (s - 1)) / ((s + 1) * (s + 2))];
  return {
    cos1: r1 * Math.cos(about),
    sin1: r1 * Math.sin(about),
    cos2: r2 * Math.cos(2 * about),
    sin2: r2 * Math.sin(2 * about),
  };
}

describe('the distribution of largest entropy', () => {
  it('is even all round where nothing is known', () => {
    const { level, ...rest } = maximumEntropy({ cos1: 0, sin1: 0, cos2: 0, sin2: 0 });
    expect(level).toBeCloseTo(-Math.log(2 * Math.PI), 12);
    expect(rest).toEqual({ a1: 0, b1: 0, a2: 0, b2: 0 });
  });

  // Its own family: a von Mises distribution of concentration 2 has r1 = I1(2) / I0(2) and r2 = I2(2) / I0(2), with
  // I0, I1, I2 = 2.2795853, 1.5906369, .6889484 (Abramowitz & Stegun 1964, table 9.8, from memory).
  it('is von Mises for the moments of von Mises', () => {
    const exponent = maximumEntropy({
      cos1: 1.5906369 / 2.2795853,
      sin1: 0,
      cos2: 0.6889484 / 2.2795853,
      sin2: 0,
    });
    expect(exponent.a1).toBeCloseTo(2, 5);
    for (const zero of [exponent.b1, exponent.a2, exponent.b2]) expect(Math.abs(zero)).toBeLessThan(1e-5);
  });

  it.each([2, 10, 25, 75, 1000])('has the moments of cos-2s with s %f, and its single lobe', (s) => {
    const about = -0.7;
    const wanted = cosinePowerMoments(s, about);
    const found = momentsOf(wanted);
    for (const key of ['cos1', 'sin1', 'cos2', 'sin2'] as const)
      expect(found[key]).toBeCloseTo(wanted[key], 10);
    expect(mean(wanted, () => 1)).toBeCloseTo(1, 12);
    const exponent = maximumEntropy(wanted);
    const density = Array.from({ length: 720 }, (_, i) =>
      entropyDensity(exponent, about + (Math.PI * i) / 720),
    );
    // Falling from the mean to its opposite: the entropy of Lygre & Krogstad has two peaks beside the mean here.
    for (let i = 1; i < density.length; i++)
      expect(density[i]).toBeLessThanOrEqual(density[i - 1] * (1 + 1e-9));
  });

  it('keeps the first moment of anything, and the second wherever a distribution has it', () => {
    const angle = between(-Math.PI, Math.PI);
    fc.assert(
      fc.property(between(0, 0.97), angle, between(0, 1), angle, (r1, at1, r2, at2) => {
        const wanted = {
          cos1: r1 * Math.cos(at1),
          sin1: r1 * Math.sin(at1),
          cos2: r2 * Math.cos(at2),
          sin2: r2 * Math.sin(at2),
        };
        const found = momentsOf(wanted);
        expect(Math.hypot(found.cos1 - wanted.cos1, found.sin1 - wanted.sin1)).toBeLessThan(1e-9);
        const off = Math.hypot(
          wanted.cos2 - r1 * r1 * Math.cos(2 * at1),
          wanted.sin2 - r1 * r1 * Math.sin(2 * at1),
        );
        const missed = Math.hypot(found.cos2 - wanted.cos2, found.sin2 - wanted.sin2);
        // What is left to the second moment, less a margin: there the distribution would be two needles.
        const room = 1 - r1 * r1;
        const reach = room * (1 - Math.min(0.05, 0.3 * room));
        if (r2 > 0.99) expect(missed).toBeLessThan(0.01 + Math.max(0, off - reach));
        else expect(missed).toBeLessThan(Math.max(0, off - reach) + 1e-9);
      }),
      { numRuns: 100 },
    );
  });

  it('is never narrower than a normal lobe of two degrees', () => {
    const needle = maximumEntropy({ cos1: 1, sin1: 0, cos2: 1, sin2: 0 });
    const lobe = 1 / (Math.sqrt(2 * Math.PI) * ((2 * Math.PI) / 180));
    expect(Math.abs(entropyDensity(needle, 0) / lobe - 1)).toBeLessThan(0.01);
    expect(mean({ cos1: 1, sin1: 0, cos2: 1, sin2: 0 }, () => 1)).toBeCloseTo(1, 9);
  });
});
