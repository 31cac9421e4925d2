import { describe, expect, it } from 'vitest';
import { integral } from '../../../src/math/quadrature.ts';
import { cosinePower, LARGEST_EXPONENT } from '../../../src/spectrum/cosine-power.ts';
import { expectRelative, FEW_ULP } from '../../support/tolerances.ts';

const spreading = cosinePower('test', (omega) => omega - 1);

describe('cosinePower', () => {
  it.each([0, 1e-6, 0.1, 0.5, 1, 6.97, 9.77, 75, 500, 1e4])('normaliser by quadrature, s = %f', (s) => {
    const half = integral((theta) => spreading.shape(theta, s), 0, Math.PI, {
      relativeTolerance: 1e-12,
      breakpoints: [0.02, 0.1, 0.5, 2],
    });
    expectRelative(spreading.normaliser(s) * 2 * half, 1, 1e-10, 'integral');
  });

  it('is the same all round at s = 0 and a cosine at s = 1', () => {
    expectRelative(spreading.normaliser(0), 1 / (2 * Math.PI), 4 * FEW_ULP, 'N(0)');
    expect(spreading.shape(Math.PI, 0)).toBe(1);
    expectRelative(spreading.normaliser(1), 1 / Math.PI, 4 * FEW_ULP, 'N(1)');
    expectRelative(spreading.shape(1, 1), 0.5 * (1 + Math.cos(1)), FEW_ULP, 'shape');
  });

  it('goes to a normal distribution for large s: N = sqrt(s / (4 pi)) within 1 / s', () => {
    for (const s of [100, 1e3, 1e4])
      expectRelative(spreading.normaliser(s), Math.sqrt(s / Math.PI) / 2, 1 / s, 'N');
  });

  it('keeps the exponent within its range', () => {
    expect(spreading.parameter(0)).toBe(0);
    expect(spreading.parameter(3)).toBe(2);
    expect(spreading.parameter(1e6)).toBe(LARGEST_EXPONENT);
    expect(spreading.parameter(Infinity)).toBe(LARGEST_EXPONENT);
  });
});
