import { describe, expect, it } from 'vitest';
import type { FrequencySpectrum } from '../../../src/spectrum/form.ts';
import {
  defaultLimits,
  energyPeriod,
  meanPeriod,
  significantHeight,
  spectralMoment,
  zeroCrossingPeriod,
} from '../../../src/spectrum/moments.ts';
import { expectRelative, MOMENT } from '../../support/tolerances.ts';

/** S = 2 from 1 to 3 rad/s, nothing elsewhere: every moment by hand. */
const box: FrequencySpectrum = {
  form: 'box',
  omegaPeak: 1.5,
  density: (omega) => (omega >= 1 && omega <= 3 ? 2 : 0),
};

/** S = omega^-5 from 1 rad/s on: a tail and nothing else. */
const tail: FrequencySpectrum = {
  form: 'tail',
  omegaPeak: 1,
  density: (omega) => (omega >= 1 ? omega ** -5 : 0),
};

const inside = { fromRadPerS: 1, toRadPerS: 3 };

describe('spectral moments', () => {
  it.each([
    [-1, 2 * Math.log(3)],
    [0, 4],
    [1, 8],
    [2, 52 / 3],
    [4, (2 * 242) / 5],
  ])('of order %d of a box', (order, expected) => {
    expectRelative(spectralMoment(box, order, inside), expected, MOMENT, 'moment');
  });

  it('lead to height and periods', () => {
    expectRelative(significantHeight(box, inside), 8, MOMENT, 'Hs');
    expectRelative(meanPeriod(box, inside), Math.PI, MOMENT, 'Tm01');
    expectRelative(zeroCrossingPeriod(box, inside), 2 * Math.PI * Math.sqrt(12 / 52), MOMENT, 'Tm02');
    expectRelative(energyPeriod(box, inside), Math.PI * Math.log(3), MOMENT, 'Te');
  });

  it('leave out of a tail what is stated', () => {
    expect(defaultLimits(tail)).toEqual({ fromRadPerS: 0.05, toRadPerS: 1000 });
    const missing = (order: number, whole: number): number => 1 - spectralMoment(tail, order) / whole;
    expect(Math.abs(missing(0, 1 / 4))).toBeLessThan(1e-9);
    expectRelative(missing(2, 1 / 2), 1e-6, 1e-3, 'share of m2');
    expectRelative(missing(3, 1), 1e-3, 1e-3, 'share of m3');
    expectRelative(spectralMoment(tail, 4), Math.log(1000), MOMENT, 'm4 up to the limit');
  });

  it('take 0 and Infinity for the default limits', () => {
    const open = { fromRadPerS: 0, toRadPerS: Infinity };
    expect(spectralMoment(tail, 0, open)).toBe(spectralMoment(tail, 0));
  });
});
