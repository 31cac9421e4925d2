import { describe, expect, it } from 'vitest';
import { bandLimits, bandWeight, energyAbove, smoothstep } from '../../../src/waves/band.ts';

describe('smoothstep', () => {
  it('is 3t^2 - 2t^3 between 0 and 1 and flat outside', () => {
    expect([-1, 0, 0.25, 0.5, 0.75, 1, 2].map(smoothstep)).toEqual([0, 0, 0.15625, 0.5, 0.84375, 1, 1]);
  });
});

describe('energyAbove', () => {
  const border = { kRadPerM: 2, fade: 1.25 };

  it('is a half at the border, nothing a fade below, everything a fade above', () => {
    expect(energyAbove(2, border)).toBe(0.5);
    expect(energyAbove(2 / 1.25, border)).toBeCloseTo(0, 14);
    expect(energyAbove(2 / 1.26, border)).toBe(0);
    expect(energyAbove(2 * 1.25, border)).toBeCloseTo(1, 14);
    expect(energyAbove(2 * 1.26, border)).toBe(1);
  });

  it('is even about the border in ln k', () => {
    for (const factor of [1.01, 1.1, 1.2]) {
      expect(energyAbove(2 * factor, border) + energyAbove(2 / factor, border)).toBeCloseTo(1, 14);
    }
    // A quarter of the way up: smoothstep(1/4).
    expect(energyAbove(2 / Math.sqrt(1.25), border)).toBeCloseTo(0.15625, 14);
  });

  it('a fade of 1 is a hard edge', () => {
    const hard = { kRadPerM: 2, fade: 1 };
    expect([1.999, 2, 2.001].map((k) => energyAbove(k, hard))).toEqual([0, 1, 1]);
  });
});

describe('bandWeight', () => {
  const low = { kRadPerM: 1, fade: 1.25 };
  const high = { kRadPerM: 4, fade: 1.5 };

  it('is 1 inside, a half at the borders and 0 outside', () => {
    expect([0.79, 1, 2, 4, 6.1].map((k) => bandWeight(k, { low, high }))).toEqual([0, 0.5, 1, 0.5, 0]);
  });

  it('has no lower end without a low border', () => {
    expect(bandWeight(1e-9, { low: null, high })).toBe(1);
    expect(bandLimits({ low: null, high })).toEqual({ kMinRadPerM: 0, kMaxRadPerM: 6 });
    expect(bandLimits({ low, high })).toEqual({ kMinRadPerM: 0.8, kMaxRadPerM: 6 });
  });

  it('is nothing between a border and itself', () => {
    for (const k of [0.8, 1, 1.1, 1.3]) expect(bandWeight(k, { low, high: low })).toBe(0);
  });

  it('neighbours sum to 1 where three bands overlap', () => {
    const first = { kRadPerM: 3, fade: 3 };
    const second = { kRadPerM: 6, fade: 3 };
    const end = { kRadPerM: 1000, fade: 1 };
    for (let k = 0.5; k < 20; k *= 1.03) {
      const sum =
        bandWeight(k, { low: null, high: first }) +
        bandWeight(k, { low: first, high: second }) +
        bandWeight(k, { low: second, high: end });
      expect(sum).toBeCloseTo(1, 14);
    }
  });
});
