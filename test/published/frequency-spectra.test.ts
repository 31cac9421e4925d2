import { describe, expect, it } from 'vitest';
import { logGamma } from '../../src/math/special.ts';
import { angularFrequency, groupVelocity } from '../../src/physics/dispersion.ts';
import { SEA_WATER_DEFAULTS, STANDARD_GRAVITY_MPS2, type Water } from '../../src/physics/water.ts';
import { jonswapAlpha } from '../../src/spectrum/jonswap.ts';
import {
  energyPeriod,
  meanPeriod,
  significantHeight,
  spectralMoment,
  zeroCrossingPeriod,
} from '../../src/spectrum/moments.ts';
import { piersonMoskowitzWindSpeed } from '../../src/spectrum/pierson-moskowitz.ts';
import { frequencySpectrum } from '../../src/spectrum/registry.ts';
import { exponentialIntegral1 } from '../support/special-functions.ts';
import { expectPrinted, expectRelative, FEW_ULP, MOMENT } from '../support/tolerances.ts';

const g = STANDARD_GRAVITY_MPS2;
const deep: Water = { ...SEA_WATER_DEFAULTS, surfaceTensionNpm: 0 };

function piersonMoskowitz(windSpeed19p5Mps: number) {
  return frequencySpectrum({ form: 'pierson-moskowitz', windSpeed19p5Mps, energyFactor: 1 }, deep);
}

function bretschneider(significantHeightM: number, peakPeriodS: number) {
  const omegaPeakRadPerS = (2 * Math.PI) / peakPeriodS;
  return frequencySpectrum(
    { form: 'bretschneider', significantHeightM, omegaPeakRadPerS, energyFactor: 1 },
    deep,
  );
}

function jonswap(significantHeightM: number, peakPeriodS: number, peakEnhancement: number) {
  const omegaPeakRadPerS = (2 * Math.PI) / peakPeriodS;
  const alpha = jonswapAlpha(significantHeightM, omegaPeakRadPerS, peakEnhancement, g);
  return frequencySpectrum(
    { form: 'jonswap', alpha, omegaPeakRadPerS, peakEnhancement, energyFactor: 1 },
    deep,
  );
}

describe('Pierson & Moskowitz 1964', () => {
  // Stewart 2008, eqs 16.28 to 16.33: printed closed forms. Status: verified.
  it('closed forms as printed', () => {
    const spectrum = piersonMoskowitz(10);
    expectPrinted((spectrum.omegaPeak * 10) / g, '.877', 'omega_p U / g');
    expectPrinted(g / spectrum.omegaPeak / 10, '1.14', 'c_p / U');
    expectPrinted((spectralMoment(spectrum, 0) * g ** 2) / 10 ** 4, '2.74e-3', 'm0 g^2 / U^4');
    expectPrinted((significantHeight(spectrum) * g) / 10 ** 2, '.21', 'Hs g / U^2');
  });

  // Computed elsewhere from the published formula.
  it.each([
    [5, '1.720407', '.01480822', '.01778410', '.5334282', '.03964372', '.1043096'],
    [10, '.8602033', '.4738630', '.2845457', '2.133713', '.3171497', '.4172382'],
    [15, '.573469', '3.598397', '1.440512', '4.800854', '1.070380', '.9387860'],
    [20, '.4301016', '15.16361', '4.552730', '8.534851', '2.537198', '1.668953'],
    [25, '.3440813', '46.27568', '11.11506', '13.33571', '4.955465', '2.607739'],
  ])('%d m/s: peak, S there, m0, Hs, m1, m2', (wind, peak, atPeak, m0, Hs, m1, m2) => {
    const spectrum = piersonMoskowitz(wind);
    expectPrinted(spectrum.omegaPeak, peak, 'omega_p');
    expectPrinted(spectrum.density(spectrum.omegaPeak), atPeak, 'S(omega_p)');
    expectPrinted(spectralMoment(spectrum, 0), m0, 'm0');
    expectPrinted(significantHeight(spectrum), Hs, 'Hs');
    expectPrinted(spectralMoment(spectrum, 1), m1, 'm1');
    // Without the 1.3e-6 of m2 that lies beyond 1000 omega_p.
    expectRelative(spectralMoment(spectrum, 2), Number(m2), 2e-6, 'm2');
    expectRelative(piersonMoskowitzWindSpeed(spectrum.omegaPeak, g), wind, FEW_ULP, 'wind of the peak');
  });

  // The deep-water S(k) = S(omega) cg of the same spectrum. Computed elsewhere.
  it.each([
    [10, 0.05, '1.8804574'],
    [10, 0.1, '1.9878547'],
    [10, 0.5, '.03149069'],
    [10, 1, '.004021280'],
    [15, 0.05, '18.464657'],
    [15, 0.1, '3.5188770'],
    [15, 1, '.004044311'],
  ])('%d m/s over wavenumber %f', (wind, k, printed) => {
    const S = piersonMoskowitz(wind).density(angularFrequency(k, deep));
    expectPrinted(S * groupVelocity(k, deep), printed, 'S(k)');
  });

  // Slope variance up to a cut-off: (alpha/4) E1[beta (g / (kc U^2))^2], values computed elsewhere.
  it.each([
    [10, 1, '.00886'],
    [10, 10, '.01817'],
    [10, 100, '.02750'],
    [10, 370, '.03280'],
    [15, 1, '.01213'],
    [15, 10, '.02146'],
    [15, 100, '.03078'],
    [15, 370, '.03608'],
  ])('%d m/s, slope variance up to %d rad/m', (wind, kc, printed) => {
    const limits = { fromRadPerS: 0, toRadPerS: angularFrequency(kc, deep) };
    const mss = spectralMoment(piersonMoskowitz(wind), 4, limits) / g ** 2;
    expectPrinted(mss, printed, 'mss');
    expectRelative(
      mss,
      (0.0081 / 4) * exponentialIntegral1(0.74 * (g / (kc * wind ** 2)) ** 2),
      MOMENT,
      'mss',
    );
  });
});

describe('two-parameter spectrum', () => {
  // pywafo at c831ec8e, doctests of its Bretschneider class. Status: verified.
  it.each([
    [6.5, 10, '1.69350993', '.06352698', '.00844783'],
    [7, 11, '1.42694133', '.05051648', '.00669692'],
  ])('%f m, %d s, as printed', (Hs, Tp, at1, at2, at3) => {
    const { density } = bretschneider(Hs, Tp);
    expectPrinted(density(1), at1, 'S(1)');
    expectPrinted(density(2), at2, 'S(2)');
    expectPrinted(density(3), at3, 'S(3)');
  });

  // Coastal Wiki, worked statistic of this shape: Hm0 1 m, Tp 5 s gives T02 3.55 s. Status: verified.
  it('zero-crossing period as printed', () => {
    expectPrinted(zeroCrossingPeriod(bretschneider(1, 5)), '3.55', 'Tm02');
  });

  // Computed elsewhere.
  it.each([
    [0.4, '.0212077'],
    [0.5, '.6211931'],
    [(2 * Math.PI) / 10, '1.2824622'],
    [0.8, '.8313778'],
    [1, '.3607477'],
    [1.5, '.05554474'],
  ])('3 m, 10 s at %f rad/s', (omega, printed) => {
    expectPrinted(bretschneider(3, 10).density(omega), printed, 'S');
  });

  // m_n = m0 omega_p^n (5/4)^(n/4) Gamma(1 - n/4): identity.
  it.each([
    [-1, '.857223'],
    [0, '1'],
    [1, '1.295720'],
    [2, '1.981664'],
  ])('moment of order %d', (n, printed) => {
    const spectrum = bretschneider(4, 2 * Math.PI);
    const closed = 1.25 ** (n / 4) * Math.exp(logGamma(1 - n / 4));
    expectPrinted(closed, printed, 'closed form');
    expectRelative(spectralMoment(spectrum, n), closed, n < 2 ? MOMENT : 2e-6, `m${n}`);
  });

  it('fourth moment up to a limit, (5/64) Hs^2 omega_p^4 E1[1.25 (omega_p / omega_c)^4]', () => {
    const spectrum = bretschneider(1, 2 * Math.PI);
    for (const toRadPerS of [5, 10, 20]) {
      const m4 = spectralMoment(spectrum, 4, { fromRadPerS: 0, toRadPerS });
      expectRelative(
        m4,
        (5 / 64) * exponentialIntegral1(1.25 / toRadPerS ** 4),
        MOMENT,
        `m4 to ${toRadPerS}`,
      );
    }
  });

  it('is JONSWAP without enhancement', () => {
    const [two, one] = [bretschneider(3, 10), jonswap(3, 10, 1)];
    for (const omega of [0.3, 0.6, 0.9, 2, 5]) {
      expectRelative(one.density(omega), two.density(omega), 1e-9, `S(${omega})`);
    }
  });
});

describe('JONSWAP, Hasselmann et al. 1973', () => {
  // Computed elsewhere with the exact normalisation.
  it.each([
    [0.4, 0.01390719],
    [0.5, 0.4143086],
    [(2 * Math.PI) / 10, 2.7752574],
    [0.8, 0.5517095],
    [1, 0.2365638],
    [1.5, 0.036424],
  ])('3 m, 10 s, gamma 3.3 at %f rad/s', (omega, S) => {
    // Seven digits at least, from a normalisation good to 6e-8.
    expectRelative(jonswap(3, 10, 3.3).density(omega), S, 4e-7, 'S');
  });

  // README of an open-source JONSWAP library: Hs 2.5, Tp 7, gamma 1.932, cut at a period of .5 s. Status: verified; its
  // m0 follows from its own fit of the normalisation and its own rectangle rule, hence .2 %.
  it('moments as printed', () => {
    const spectrum = jonswap(2.5, 7, 1.932);
    const limits = { fromRadPerS: 0, toRadPerS: 4 * Math.PI };
    expectRelative(spectralMoment(spectrum, 0, limits), 0.3897, 3e-3, 'm0');
    expectRelative(spectralMoment(spectrum, 2, limits), 0.5635, 3e-3, 'm2');
    expectRelative(spectralMoment(spectrum, 4, limits), 2.562, 3e-3, 'm4');
  });

  // pywafo at c831ec8e, tests of its Jonswap class: Hm0 5, Tp 11, gamma 1.08136, Simpson's rule over 0 .. 3 rad/s.
  // Status: verified. Its level is normalised over 0 .. 6 omega_p, its rule has 257 points.
  it('moments as printed by a toolbox', () => {
    const spectrum = jonswap(5, 11, 1.08136);
    const limits = { fromRadPerS: 0, toRadPerS: 3 };
    const m0 = spectralMoment(spectrum, 0, limits);
    expectRelative(m0, 1.5614600345, 1.1e-3, 'm0');
    expectRelative(spectralMoment(spectrum, 2, limits) / m0, 0.9556708948 / 1.5614600345, 1e-4, 'm2 / m0');
    expectRelative(meanPeriod(spectrum, limits), 8.59007646, 1e-4, 'Tm01');
    expectRelative(zeroCrossingPeriod(spectrum, limits), 8.03139757, 1e-4, 'Tm02');
  });

  it('has its largest value where it says', () => {
    const { density, omegaPeak } = jonswap(3, 10, 3.3);
    expect(density(omegaPeak)).toBeGreaterThan(density(omegaPeak * 0.999));
    expect(density(omegaPeak)).toBeGreaterThan(density(omegaPeak * 1.001));
  });

  it('has the stated height', () => {
    for (const gamma of [1, 3.3, 7, 20]) {
      expectRelative(significantHeight(jonswap(2, 6, gamma)), 2, MOMENT, `Hs at gamma ${gamma}`);
    }
    expectRelative(energyPeriod(jonswap(2, 6, 3.3)) / 6, 0.9033, 1e-4, 'Te / Tp');
  });
});
