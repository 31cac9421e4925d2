import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { resolvedSystems, travelDirection } from '../../../src/plan/systems.ts';
import { significantHeight } from '../../../src/spectrum/moments.ts';
import { frequencySpectrum } from '../../../src/spectrum/registry.ts';
import { seaOf, swellKeys, windSeaKeys } from '../../support/planned-seas.ts';
import { expectRelative, MOMENT } from '../../support/tolerances.ts';

const DEGREE = Math.PI / 180;

describe('travelDirection', () => {
  it.each([
    ['west', 270, 0],
    ['south', 180, 90],
    ['east', 90, 180],
    ['north', 0, -90],
    ['south-west', 225, 45],
    ['north-west', 315, -45],
    ['360 degrees', 360, -90],
  ])('from the %s', (_, bearing, toward) => {
    expect(travelDirection(bearing * DEGREE)).toBeCloseTo(toward * DEGREE, 12);
  });

  it('is opposite to where the waves come from, in (-pi, pi]', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }), (fromRad) => {
        const toward = travelDirection(fromRad);
        // A bearing has its east component in the sine, its north in the cosine.
        expect(Math.cos(toward)).toBeCloseTo(-Math.sin(fromRad), 12);
        expect(Math.sin(toward)).toBeCloseTo(-Math.cos(fromRad), 12);
        expect(toward > -Math.PI && toward <= Math.PI).toBe(true);
      }),
      { numRuns: 1000 },
    );
  });
});

describe('resolved systems', () => {
  it('carry their direction, and lose head sea only where wind made them', () => {
    const systems = [
      { ...windSeaKeys(10, 20), from: 250 },
      { ...swellKeys(9, 3.3, 25), from: 10 },
    ];
    const [windSea, swell] = resolvedSystems(seaOf(systems, { shaping: { againstWind: 0.2 } }));
    expect(windSea.fromRad).toBeCloseTo(250 * DEGREE, 12);
    expect(windSea.towardRad).toBeCloseTo(20 * DEGREE, 12);
    expect(swell.towardRad).toBeCloseTo(-100 * DEGREE, 12);
    expect([windSea.againstShare, swell.againstShare]).toEqual([0.2, 1]);
  });

  it.each([2, 5, 20, 100])('of a stated height and period have both on %i m of water', (depth) => {
    const stated = { kind: 'wind-sea', spectrum: 'tma', significantHeight: 0.3, peakPeriod: 4, windSpeed: 9 };
    const sea = seaOf([stated], { water: { depth } });
    const spectrum = frequencySpectrum(resolvedSystems(sea)[0].spectrum, sea.water);
    expectRelative(significantHeight(spectrum), 0.3, MOMENT, 'height');
    // The depth factor moves the peak of its parent; the search for a maximum is right to the square root of an ulp.
    expectRelative((2 * Math.PI) / spectrum.omegaPeak, 4, 1e-6, 'peak period');
  });
});
