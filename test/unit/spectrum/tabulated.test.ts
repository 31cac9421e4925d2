import { describe, expect, it } from 'vitest';
import { integral } from '../../../src/math/quadrature.ts';
import { SEA_WATER_DEFAULTS } from '../../../src/physics/water.ts';
import { spectralMoment } from '../../../src/spectrum/moments.ts';
import { directionalSpreading, frequencySpectrum } from '../../../src/spectrum/registry.ts';
import { tablePosition } from '../../../src/spectrum/tabulated.ts';
import { expectRelative } from '../../support/tolerances.ts';

const frequencyHz = [0.05, 0.06, 0.08, 0.1, 0.15];
const densityM2PerHz = [1, 4, 10, 0, 2];
const spectrum = frequencySpectrum(
  { form: 'tabulated', frequencyHz, densityM2PerHz, energyFactor: 1 },
  SEA_WATER_DEFAULTS,
);
const at = (hertz: number): number => 2 * Math.PI * spectrum.density(2 * Math.PI * hertz);

describe('a tabulated spectrum', () => {
  it('passes through its entries, straight in between, and is nothing outside', () => {
    frequencyHz.forEach((hertz, i) => {
      expect(Math.abs(at(hertz) - densityM2PerHz[i])).toBeLessThan(1e-12);
    });
    expect(at(0.07)).toBeCloseTo(7, 12);
    expect(at(0.125)).toBeCloseTo(1, 12);
    // Feet: one step of .01 below, one of .05 above.
    expect(at(0.045)).toBeCloseTo(0.5, 12);
    expect(at(0.175)).toBeCloseTo(1, 12);
    for (const outside of [0, 0.01, 0.03999, 0.2001, 5]) expect(at(outside)).toBe(0);
  });

  it('counts each entry for the mean of its two steps: the sum is exact', () => {
    // .01 * 1 + .015 * 4 + .02 * 10 + .035 * 0 + .05 * 2
    expectRelative(spectralMoment(spectrum, 0), 0.37, 1e-10, 'm0');
    expect(spectrum.omegaPeak).toBe(2 * Math.PI * 0.08);
  });

  it('begins at nothing however low its first frequency is', () => {
    const low = frequencySpectrum(
      { form: 'tabulated', frequencyHz: [0.02, 0.1], densityM2PerHz: [3, 1], energyFactor: 1 },
      SEA_WATER_DEFAULTS,
    );
    expect(low.density(0)).toBe(0);
    expect(2 * Math.PI * low.density(0.02 * Math.PI)).toBeCloseTo(1.5, 12);
  });
});

it.each([
  [0.04, -1],
  [0.05, 0],
  [0.07, 1.5],
  [0.1, 3],
  [0.1499, 3.998],
  [0.15, 4],
  [9, 4],
  [Number.NaN, -1],
])('place of %f in a table is %f', (value, place) => {
  expect(tablePosition(frequencyHz, value)).toBeCloseTo(place, 9);
});

describe('a tabulated spreading', () => {
  // A narrow lobe ahead, one abeam to the left, and none at all.
  const turning = directionalSpreading({
    form: 'tabulated',
    frequencyHz: [0.1, 0.2, 0.3],
    cos1: [0.9, 0, 0],
    sin1: [0, 0.9, 0],
    cos2: [0.66, -0.66, 0],
    sin2: [0, 0, 0],
  });
  const D = (hertz: number, theta: number): number => {
    const p = turning.parameter(2 * Math.PI * hertz);
    return turning.normaliser(p) * turning.shape(theta, p);
  };
  const moment = (hertz: number, f: (theta: number) => number): number =>
    integral((theta) => f(theta) * D(hertz, theta), -Math.PI, Math.PI, { relativeTolerance: 1e-10 });

  it('has the moments of its entries, and the blend of both in between', () => {
    expect(moment(0.1, Math.cos)).toBeCloseTo(0.9, 9);
    expect(moment(0.1, (theta) => Math.cos(2 * theta))).toBeCloseTo(0.66, 9);
    expect(moment(0.2, Math.sin)).toBeCloseTo(0.9, 9);
    expect(moment(0.125, Math.cos)).toBeCloseTo(0.75 * 0.9, 9);
    expect(moment(0.125, Math.sin)).toBeCloseTo(0.25 * 0.9, 9);
    for (const theta of [-3, 0, 1]) expect(D(0.3, theta)).toBeCloseTo(1 / (2 * Math.PI), 9);
  });

  it('keeps its outermost directions beyond its ends', () => {
    for (const theta of [-1, 0, 2]) {
      expect(D(0.01, theta)).toBe(D(0.1, theta));
      expect(D(3, theta)).toBe(D(0.3, theta));
    }
  });
});
