import { describe, expect, it } from 'vitest';
import { SEA_WATER_DEFAULTS } from '../../../src/physics/water.ts';
import { frequencySpectrum, SPECTRUM_FORMS, SPREADING_FORMS } from '../../../src/spectrum/registry.ts';
import { withSignificantHeight } from '../../../src/spectrum/stated-height.ts';
import { expectRelative, MOMENT } from '../../support/tolerances.ts';

const parameters = { form: 'pierson-moskowitz', windSpeed19p5Mps: 10, energyFactor: 1 } as const;

describe('registry', () => {
  it('has the first forms', () => {
    expect(SPECTRUM_FORMS).toEqual(
      expect.arrayContaining(['pierson-moskowitz', 'jonswap', 'tma', 'bretschneider']),
    );
    expect(SPREADING_FORMS).toEqual(expect.arrayContaining(['cos-2s', 'mitsuyasu', 'hasselmann']));
  });

  it('multiplies the energy', () => {
    const [one, three] = [1, 3].map((energyFactor) =>
      frequencySpectrum({ ...parameters, energyFactor }, SEA_WATER_DEFAULTS),
    );
    for (const omega of [0.6, 0.9, 4]) expect(three.density(omega)).toBe(3 * one.density(omega));
  });
});

describe('withSignificantHeight', () => {
  it('changes nothing but the energy factor, whatever that was', () => {
    const stated = withSignificantHeight({ ...parameters, energyFactor: 17 }, SEA_WATER_DEFAULTS, 4.267426);
    expect({ ...stated, energyFactor: 1 }).toEqual(parameters);
    // Pierson & Moskowitz at 10 m/s have Hs 2.133713 m: twice the height is four times the energy.
    expectRelative(stated.energyFactor, 4, 1e-6, 'energy factor');
    expectRelative(
      withSignificantHeight(stated, SEA_WATER_DEFAULTS, 4.267426).energyFactor,
      stated.energyFactor,
      MOMENT,
      'again',
    );
    expect(withSignificantHeight(parameters, SEA_WATER_DEFAULTS, 0).energyFactor).toBe(0);
  });
});
