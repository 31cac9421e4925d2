import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { SEA_WATER_DEFAULTS } from '../../src/physics/water.ts';
import { jonswap, jonswapAlpha, jonswapNormalisation } from '../../src/spectrum/jonswap.ts';
import { energyPeriod, meanPeriod, spectralMoment, zeroCrossingPeriod } from '../../src/spectrum/moments.ts';
import { expectPrinted, expectRelative, OTHER_QUADRATURE } from '../support/tolerances.ts';

interface Row {
  readonly gamma: number;
  readonly A_exact: number;
  readonly Tm01_Tp: number;
  readonly Tm02_Tp: number;
  readonly Te_Tp: number;
  readonly peak: number;
  readonly m4cut: Readonly<Record<string, number>>;
}

// Computed elsewhere, see data/README.md.
const checkValues: { jonswap_norm: Row[] } = JSON.parse(
  readFileSync(new URL('data/check-spectra.json', import.meta.url), 'utf8'),
);
const rows = checkValues.jonswap_norm;

/** JONSWAP of Hs = 1 m and omega_p = 1 rad/s. */
function unitSea(peakEnhancement: number) {
  const alpha = jonswapAlpha(1, 1, peakEnhancement, SEA_WATER_DEFAULTS.gravityMps2);
  return jonswap({ form: 'jonswap', alpha, omegaPeakRadPerS: 1, peakEnhancement }, SEA_WATER_DEFAULTS);
}

describe('JONSWAP normalisation', () => {
  it.each(rows)('gamma $gamma, computed elsewhere', (row) => {
    const sea = unitSea(row.gamma);
    const Tp = 2 * Math.PI;
    expectRelative(jonswapNormalisation(row.gamma), row.A_exact, OTHER_QUADRATURE, 'A_gamma');
    expectRelative(sea.density(1), row.peak, OTHER_QUADRATURE, 'S at the peak');
    expectRelative(meanPeriod(sea) / Tp, row.Tm01_Tp, OTHER_QUADRATURE, 'Tm01');
    expectRelative(energyPeriod(sea) / Tp, row.Te_Tp, OTHER_QUADRATURE, 'Te');
    // m2 lacks 1.3e-6 of itself beyond 1000 omega_p.
    expectRelative(zeroCrossingPeriod(sea) / Tp, row.Tm02_Tp, 1e-6, 'Tm02');
    for (const [cut, m4] of Object.entries(row.m4cut)) {
      const found = spectralMoment(sea, 4, { fromRadPerS: 0, toRadPerS: Number(cut) });
      expectRelative(found, m4, OTHER_QUADRATURE, `m4 to ${cut}`);
    }
  });

  // Two published fits. Errors in height as measured against the exact factor; both would miss these bounds if the
  // factor were off by .1 %.
  it.each([
    // DNV-RP-C205 section 3.5.5 (from memory) and IEC TS 62600-2 annex C.2 (verified): 1 - .287 ln gamma, 1 .. 5.
    ['DNV and IEC', (gamma: number) => 1 - 0.287 * Math.log(gamma), 5, 1.7e-3],
    // ISO's alternative as printed in stglib (verified): .2 / (.065 gamma^.803 + .135), 1 .. 10.
    ['ISO', (gamma: number) => 0.2 / (0.065 * gamma ** 0.803 + 0.135), 10, 1.5e-3],
  ])('fit of %s', (_, fitted, highest, heightError) => {
    let worst = 0;
    for (let gamma = 1; gamma <= highest; gamma += 0.25) {
      worst = Math.max(worst, Math.abs(Math.sqrt(fitted(gamma) / jonswapNormalisation(gamma)) - 1));
    }
    expect(worst).toBeLessThan(heightError);
    expect(worst).toBeGreaterThan(0.8 * heightError);
  });

  // DNV-RP-C205 section 3.5.5, cubics in gamma as found in several public codes (verified), 1 <= gamma < 7.
  it('published fits of the mean periods', () => {
    for (let gamma = 1; gamma <= 7; gamma += 0.5) {
      const Tp = 2 * Math.PI;
      const sea = unitSea(gamma);
      const Tz = 0.6673 + 0.05037 * gamma - 0.00623 * gamma ** 2 + 0.0003341 * gamma ** 3;
      const T1 = 0.7303 + 0.04936 * gamma - 0.006556 * gamma ** 2 + 0.000361 * gamma ** 3;
      expectRelative(zeroCrossingPeriod(sea) / Tp, Tz, 2.1e-3, `Tz at ${gamma}`);
      expectRelative(meanPeriod(sea) / Tp, T1, 3.5e-3, `Tm01 at ${gamma}`);
    }
  });

  it.each([
    [2, '.80281'],
    [3.3, '.65576'],
    [7, '.44940'],
  ])('A at gamma %f', (gamma, printed) => {
    expectPrinted(jonswapNormalisation(gamma), printed, 'A');
  });
});
