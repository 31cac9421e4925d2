import { describe, expect, it } from 'vitest';
import { integral } from '../../../src/math/quadrature.ts';
import { SEA_WATER_DEFAULTS } from '../../../src/physics/water.ts';
import { directionalSpectrum, energyGain, peakHalfWidth } from '../../../src/waves/directional-spectrum.ts';
import type { WaveSystem } from '../../../src/waves/wave-system.ts';
import { jonswapSystem } from '../../support/tiny-waves.ts';
import { expectRelative } from '../../support/tolerances.ts';

describe('energyGain', () => {
  const gains = [{ shortestWavelengthM: 2, longestWavelengthM: 10, gain: 3 }];
  const at = (wavelengthM: number): number => energyGain((2 * Math.PI) / wavelengthM, gains);

  it('is the square of the gain within the band and 1 outside', () => {
    for (const wavelength of [2.3, 4, 9]) expect(at(wavelength)).toBe(9);
    for (const wavelength of [0.5, 1.8, 11.2, 100]) expect(at(wavelength)).toBe(1);
  });

  it('meets half way on amplitude at the edges', () => {
    expect(at(2)).toBeCloseTo(2 ** 2, 12);
    expect(at(10)).toBeCloseTo(2 ** 2, 12);
  });

  it('bands that touch hold their gain up to the edge between them', () => {
    const touching = [
      { shortestWavelengthM: 1, longestWavelengthM: 2, gain: 0 },
      { shortestWavelengthM: 2, longestWavelengthM: 4, gain: 1 },
    ];
    expect(energyGain((2 * Math.PI) / 1.5, touching)).toBe(0);
    expect(energyGain((2 * Math.PI) / 2.5, touching)).toBe(1);
  });
});

describe('againstShare', () => {
  /** Integrals of D over all directions, and over those more than 105 degrees off the mean. */
  function energies(againstShare: number, s: number): readonly [all: number, against: number, peak: number] {
    const system: WaveSystem = { ...jonswapSystem('sea', 1, 5, { s }), againstShare };
    const spectrum = directionalSpectrum(system, SEA_WATER_DEFAULTS, []);
    const p = spectrum.spreadingParameter(0.3);
    const D = (theta: number): number => spectrum.spreadingNormaliser(p) * spectrum.spreadingShape(theta, p);
    const edge = (105 * Math.PI) / 180;
    const breakpoints = [-edge, (-75 * Math.PI) / 180, 0, (75 * Math.PI) / 180, edge];
    return [
      integral(D, -Math.PI, Math.PI, { breakpoints, relativeTolerance: 1e-9 }),
      2 * integral(D, edge, Math.PI, { relativeTolerance: 1e-9 }),
      D(0),
    ];
  }

  it('takes the head sea out and keeps the energy', () => {
    for (const s of [1, 4, 20]) {
      const [all, against, peak] = energies(1, s);
      const [allWithout, againstWithout, peakWithout] = energies(0, s);
      const [allHalf, againstHalf, peakHalf] = energies(0.5, s);
      for (const sum of [all, allWithout, allHalf]) expectRelative(sum, 1, 1e-6, `sum of D, s = ${s}`);
      expect(againstWithout).toBe(0);
      // What stays is a half of what was, times what renormalising gives to all.
      expectRelative(againstHalf / against, 0.5 * (peakHalf / peak), 1e-6, 'half the head sea');
      expect(peakWithout).toBeGreaterThan(peak);
    }
  });
});

describe('directionalSpectrum', () => {
  it('gains multiply E(k) in their band alone', () => {
    const system = jonswapSystem('sea', 1, 5);
    const plain = directionalSpectrum(system, SEA_WATER_DEFAULTS, []);
    const gains = [{ shortestWavelengthM: 2, longestWavelengthM: 10, gain: 0.5 }];
    const shaped = directionalSpectrum(system, SEA_WATER_DEFAULTS, gains);
    const ratio = (wavelengthM: number): number => {
      const k = (2 * Math.PI) / wavelengthM;
      return shaped.wavenumberDensity(k) / plain.wavenumberDensity(k);
    };
    expect([40, 5, 1].map(ratio)).toEqual([1, 0.25, 1]);
    expect(shaped.peakWavenumberRadPerM).toBe(plain.peakWavenumberRadPerM);
  });
});

describe('half-width of the peak', () => {
  const halfWidth = (spreading: WaveSystem['spreading']): number => {
    const system: WaveSystem = { ...jonswapSystem('sea', 1, 5), spreading };
    return peakHalfWidth(directionalSpectrum(system, SEA_WATER_DEFAULTS, []));
  };

  // Half-power half-widths of cos-2s, computed elsewhere; found in steps of a tenth.
  it.each([
    [10, 29.9953],
    [75, 11.0078],
  ])('s = %d: %f degrees', (s, degrees) => {
    const found = (halfWidth({ form: 'cos-2s', s, omegaPeakRadPerS: 1, swellNarrowing: 0 }) * 180) / Math.PI;
    expect(found).toBeGreaterThanOrEqual(degrees);
    expect(found).toBeLessThan(1.1 * degrees);
  });

  it('is that of the highest lobe, wherever a measured one lies', () => {
    const lobe = (about: number): number =>
      halfWidth({
        form: 'tabulated',
        frequencyHz: [0.01, 1],
        cos1: [0.95, 0.95].map((r) => r * Math.cos(about)),
        sin1: [0.95, 0.95].map((r) => r * Math.sin(about)),
        cos2: [0.815, 0.815].map((r) => r * Math.cos(2 * about)),
        sin2: [0.815, 0.815].map((r) => r * Math.sin(2 * about)),
      });
    for (const about of [-3.1, -1, 0.5, 3]) expectRelative(lobe(about), lobe(0), 0.11, `lobe at ${about}`);
    expect(lobe(0)).toBeLessThan(0.5);
  });
});
