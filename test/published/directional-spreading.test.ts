import { readFileSync } from 'node:fs';
import { describe, it } from 'vitest';
import { integral } from '../../src/math/quadrature.ts';
import type { DirectionalSpreading } from '../../src/spectrum/form.ts';
import { directionalSpreading } from '../../src/spectrum/registry.ts';
import { expectPrinted, expectRelative, QUADRATURE } from '../support/tolerances.ts';

interface Row {
  readonly s: number;
  readonly N: number;
  readonly r1_formula: number;
  readonly r2_formula: number;
  readonly half_width_deg: number;
}

// Computed elsewhere, see data/README.md.
const checkValues: { cos2s: Row[] } = JSON.parse(
  readFileSync(new URL('data/check-spreading.json', import.meta.url), 'utf8'),
);

function cos2s(s: number, swellNarrowing = 0): DirectionalSpreading {
  return directionalSpreading({ form: 'cos-2s', s, omegaPeakRadPerS: 1, swellNarrowing });
}

/** D(theta) for the parameter at omega. */
function density(spreading: DirectionalSpreading, omega: number, theta: number): number {
  const p = spreading.parameter(omega);
  return spreading.normaliser(p) * spreading.shape(theta, p);
}

/** r_n = integral of D cos(n theta). */
function moment(spreading: DirectionalSpreading, n: number): number {
  const breakpoints = [-2, -0.5, -0.1, 0, 0.1, 0.5, 2];
  const f = (theta: number): number => density(spreading, 1, theta) * Math.cos(n * theta);
  return integral(f, -Math.PI, Math.PI, { breakpoints, absoluteTolerance: 1e-11 });
}

describe('cosine power, Longuet-Higgins, Cartwright & Smith 1963', () => {
  // pywafo at c831ec8e, doctest of its cos2s spreading. Status: verified.
  it('D(0) for s = 15, as printed', () => {
    expectPrinted(density(cos2s(15), 1, 0), '1.10168934', 'D(0)');
  });

  it.each(checkValues.cos2s)('s = $s', ({ s, N, r1_formula, r2_formula, half_width_deg }) => {
    const spreading = cos2s(s);
    // The other program's own log-gamma is off by 5e-14 at s = 100.
    expectRelative(density(spreading, 1, 0), N, 1e-12, 'N');
    expectRelative(moment(spreading, 1), r1_formula, QUADRATURE, 'r1');
    // r2 = 0 for s = 1 exactly.
    expectRelative(1 + moment(spreading, 2), 1 + r2_formula, QUADRATURE, 'r2');
    expectRelative(moment(spreading, 1), s / (s + 1), QUADRATURE, 'r1 = s / (s + 1)');
    const atHalf = spreading.shape((half_width_deg * Math.PI) / 180, s);
    expectRelative(atHalf, 0.5, 1e-9, 'half power at the half-width');
  });
});

describe('exponents of Mitsuyasu et al. 1975', () => {
  // Computed elsewhere.
  it.each([
    [0.8, 1, '20.0897'],
    [1, 1, '11.5'],
    [1.2, 1, '7.29029'],
    [1.5, 1, '4.17320'],
    [2, 1, '2.03293'],
    [1, 0.8, '3.76832'],
    [1, 1.5, '4.17320'],
    [1, 2, '2.03293'],
  ])('U / cp = %f at %f omega_p', (inverseWaveAge, ratio, printed) => {
    const spreading = directionalSpreading({
      form: 'mitsuyasu',
      omegaPeakRadPerS: 0.7,
      inverseWaveAge,
      swellNarrowing: 0,
    });
    expectPrinted(spreading.parameter(0.7 * ratio), printed, 's');
  });
});

describe('exponents of Hasselmann, Dunckel & Ewing 1980', () => {
  // Computed elsewhere.
  it.each([
    [1.17, 0.6, '.876046'],
    [1.17, 0.8, '2.816943'],
    [1.17, 1, '6.97'],
    [1.17, 1.05 + 1e-9, '8.720141'],
    [1.17, 1.05 - 1e-9, '8.49692'],
    [1.17, 1.2, '6.388549'],
    [1.17, 1.5, '3.798411'],
    [1.17, 2, '1.943098'],
    [1.17, 3, '.755444'],
    [0.9, 1.05 + 1e-9, '8.888308'],
    [0.9, 1.2, '6.861226'],
    [0.9, 1.5, '4.451862'],
    [0.9, 2, '2.548871'],
    [0.9, 3, '1.161435'],
  ])('U / cp = %f at %f omega_p', (inverseWaveAge, ratio, printed) => {
    const spreading = directionalSpreading({
      form: 'hasselmann',
      omegaPeakRadPerS: 0.7,
      inverseWaveAge,
      swellNarrowing: 0,
    });
    expectPrinted(spreading.parameter(0.7 * ratio), printed, 's');
  });
});

describe('swell term of Horvath 2015', () => {
  // Computed elsewhere from the formula as remembered: the ratio inside tanh is not checked against the paper.
  it.each([
    [1, 0.5, '15.42444'],
    [1, 1, '12.18551'],
    [1, 2, '7.39387'],
    [1, 4, '3.91870'],
    [0.5, 0.5, '3.85611'],
    [0.5, 1, '3.04638'],
    [0.5, 2, '1.84847'],
    [0.5, 4, '.97967'],
  ])('xi = %f at %f omega_p', (xi, omega, printed) => {
    expectPrinted(cos2s(0, xi).parameter(omega), printed, 'addition to s');
    for (const form of ['mitsuyasu', 'hasselmann'] as const) {
      const parameters = { form, omegaPeakRadPerS: 1, inverseWaveAge: 1 };
      const plain = directionalSpreading({ ...parameters, swellNarrowing: 0 }).parameter(omega);
      const narrowed = directionalSpreading({ ...parameters, swellNarrowing: xi }).parameter(omega);
      expectPrinted(narrowed - plain, printed, `addition to s of ${form}`);
    }
  });
});

describe('hyperbolic secant, Donelan, Hamilton & Hui 1985 and Banner 1990', () => {
  const spreading = directionalSpreading({ form: 'donelan-banner', omegaPeakRadPerS: 0.7 });

  // Exponents verified in pywafo at c831ec8e; values computed elsewhere.
  it.each([
    [0.3, '1.24'],
    [0.56 + 1e-9, '1.228245'],
    [0.7, '1.641602'],
    [0.95 - 1e-9, '2.44164'],
    [0.95 + 1e-9, '2.437217'],
    [1, '2.28'],
    [1.3, '1.621095'],
    [1.6 - 1e-9, '1.23760'],
    [1.6 + 1e-9, '1.237497'],
    [2, '.960346'],
    [3, '.694175'],
    [5, '.543621'],
    [10, '.458826'],
  ])('beta at %f omega_p', (ratio, printed) => {
    expectPrinted(spreading.parameter(0.7 * ratio), printed, 'beta');
  });

  it('both pieces meet at 1.6 omega_p', () => {
    expectRelative(spreading.parameter(1.6 * 0.7 * (1 + 1e-9)), 1.237497, 2e-4, 'beta');
  });

  it.each([
    [0.5, '.340613'],
    [1, '.688116'],
    [1.24, '.776697'],
    [2, '.904151'],
    [2.28, '.925066'],
    [2.44, '.934128'],
    // The beta of r1 = 15/16, where a toolbox's help text says .89.
    [2.50811, '.93750'],
  ])('r1 of beta = %f', (beta, printed) => {
    const fixed: DirectionalSpreading = { ...spreading, parameter: () => beta };
    expectPrinted(moment(fixed, 1), printed, 'r1');
  });

  // 1 / tanh(pi beta): what the circle cuts off the published normaliser.
  it.each([
    [0.5, '1.09033'],
    [1, '1.003742'],
    [1.24, '1.000827'],
  ])('normaliser at beta = %f', (beta, printed) => {
    expectPrinted(spreading.normaliser(beta) / (0.5 * beta), printed, 'N');
  });
});

describe('wrapped normal', () => {
  // Computed elsewhere.
  it.each([
    [10, '2.285771', '.984885'],
    [20, '1.142885', '.940895'],
    [30, '.761924', '.871902'],
    [40, '.571443', '.783727'],
  ])('standard deviation %d degrees', (degrees, atZero, r1) => {
    const sigma = (degrees * Math.PI) / 180;
    const spreading = directionalSpreading({ form: 'wrapped-normal', standardDeviationRad: sigma });
    expectPrinted(density(spreading, 1, 0), atZero, 'D(0)');
    expectPrinted(moment(spreading, 1), r1, 'r1');
  });

  it('r1 = exp(-sigma^2 / 2), r2 = exp(-2 sigma^2), across the change of series', () => {
    for (const sigma of [0.05, 0.5, 1.49, 1.51, 3]) {
      const spreading = directionalSpreading({ form: 'wrapped-normal', standardDeviationRad: sigma });
      expectRelative(1 + moment(spreading, 1), 1 + Math.exp(-(sigma ** 2) / 2), QUADRATURE, `r1 of ${sigma}`);
      expectRelative(1 + moment(spreading, 2), 1 + Math.exp(-2 * sigma ** 2), QUADRATURE, `r2 of ${sigma}`);
    }
  });

  it('both series agree where one takes over from the other', () => {
    const [images, fourier] = [1.5 * (1 - 1e-12), 1.5].map((standardDeviationRad) =>
      directionalSpreading({ form: 'wrapped-normal', standardDeviationRad }),
    );
    for (const theta of [0, 0.4, 1.7, Math.PI]) {
      expectRelative(density(images, 1, theta), density(fourier, 1, theta), 1e-11, `D(${theta})`);
    }
  });
});
