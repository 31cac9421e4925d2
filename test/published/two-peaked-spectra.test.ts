import { describe, expect, it } from 'vitest';
import { SEA_WATER_DEFAULTS } from '../../src/physics/water.ts';
import { significantHeight } from '../../src/spectrum/moments.ts';
import { OCHI_HUBBLE_MEMBERS, ochiHubble, ochiHubbleMember } from '../../src/spectrum/ochi-hubble.ts';
import { torsethaugen, torsethaugenParts } from '../../src/spectrum/torsethaugen.ts';
import { expectPrinted, expectRelative } from '../support/tolerances.ts';

describe('Ochi & Hubble 1976', () => {
  // pywafo at c831ec8e, doctest of its OchiHubble class, Hs 7 m (member 4). Status: verified.
  it.each([
    [1, '.90155636'],
    [2, '.04185445'],
    [3, '.00583207'],
  ])('member 4 at %d rad/s, as printed', (omega, printed) => {
    expectPrinted(ochiHubble(ochiHubbleMember(4, 7)).density(omega), printed, 'S');
  });

  // Computed elsewhere.
  it.each([
    [0.4, '1.4331399'],
    [0.5, '11.277616'],
    [0.6, '6.3861985'],
    [0.8, '1.7957502'],
    [1, '1.2917002'],
    [2, '.07852665'],
    [3, '.01076574'],
  ])('most probable sea of 7 m at %f rad/s', (omega, printed) => {
    expectPrinted(ochiHubble(ochiHubbleMember(0, 7)).density(omega), printed, 'S');
  });

  // sqrt(H1^2 + H2^2) / Hs of the eleven rows, as the published coefficients give it.
  it.each(
    [
      '.99860',
      '.99930',
      '1.00005',
      '.99860',
      '.99860',
      '1.00180',
      '1.00125',
      '.99765',
      '.99925',
      '.99860',
      '.99860',
    ].map((ratio, member) => ({ ratio, member })),
  )('height of member $member is $ratio of the stated one', ({ ratio, member }) => {
    const parameters = ochiHubbleMember(member, 3);
    expectPrinted(Math.hypot(parameters.lowHeightM, parameters.highHeightM) / 3, ratio, 'parts');
    // A tail of omega^-(4 lambda + 1) with lambda = .53 e^-.2 (member 10) leaves 1e-5 beyond 1000 omega_p.
    expectRelative(significantHeight(ochiHubble(parameters)) / 3, Number(ratio), 2e-5, 'integral');
  });

  it('has eleven members', () => {
    expect(OCHI_HUBBLE_MEMBERS).toBe(11);
    expect(() => ochiHubbleMember(11, 3)).toThrow(RangeError);
    expect(() => ochiHubbleMember(-1, 3)).toThrow(RangeError);
  });

  it('names the higher of its peaks', () => {
    const swellHigher = ochiHubble(ochiHubbleMember(0, 7));
    expect(swellHigher.omegaPeak).toBeCloseTo(0.7 * Math.exp(-0.046 * 7), 2);
    const windHigher = ochiHubble({ ...ochiHubbleMember(0, 7), lowHeightM: 0.5 });
    expect(windHigher.omegaPeak).toBeCloseTo(1.15 * Math.exp(-0.039 * 7), 2);
  });
});

describe('Torsethaugen, simplified', () => {
  const water = { ...SEA_WATER_DEFAULTS, gravityMps2: 9.81 };

  // Computed elsewhere with g = 9.81 and the published constants, which give a height some 1 % too large.
  it.each([
    [3, 6, '2.333073', '2.289872', '1.885940', '11.518847', '5.171529', '3.0310'],
    [3, 12, '2.702054', '2.526161', '1.303420', '7.209505', '13.174136', '3.0426'],
    [6, 12, null, null, null, null, '46.304705', '6.0570'],
    [2, 14, null, null, null, null, '5.154458', '2.0138'],
  ])('%d m, %d s', (Hs, Tp, H1, gamma1, H2, T2, atPeak, height) => {
    const [first, second] = torsethaugenParts(Hs, Tp, 9.81);
    if (H1 !== null) {
      expectPrinted(first.heightM, H1, 'H1');
      expectPrinted(first.peakEnhancement, gamma1, 'gamma1');
      expectPrinted(second.heightM, H2, 'H2');
      expectPrinted(second.periodS, T2, 'T2');
    }
    expect(first.periodS).toBe(Tp);
    expect(second.peakEnhancement).toBe(1);
    const omegaPeakRadPerS = (2 * Math.PI) / Tp;
    const sea = torsethaugen({ form: 'torsethaugen', significantHeightM: Hs, omegaPeakRadPerS }, water);
    expectPrinted(2 * Math.PI * sea.density(omegaPeakRadPerS), atPeak, 'S_f at the stated peak');
    expectPrinted(significantHeight(sea), height, 'Hs');
  });

  it('is all wind sea at T_f and continuous there', () => {
    const Tf = 6.6 * Math.cbrt(3);
    const [below, above] = [torsethaugenParts(3, Tf, 9.81), torsethaugenParts(3, Tf * (1 + 1e-9), 9.81)];
    expect(below[0].heightM).toBe(3);
    expect(below[1].heightM).toBe(0);
    expectRelative(above[0].heightM, 3, 1e-9, 'H1');
    expectRelative(above[0].peakEnhancement, below[0].peakEnhancement, 1e-7, 'gamma1');
  });

  it('without height is flat, its peak where it is stated', () => {
    const sea = torsethaugen({ form: 'torsethaugen', significantHeightM: 0, omegaPeakRadPerS: 0.6 }, water);
    expect(sea.omegaPeak).toBe(0.6);
    expect(sea.density(0.6)).toBe(0);
  });
});
