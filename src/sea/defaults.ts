import { type Current, SEA_WATER_DEFAULTS } from '../physics/water.ts';
import type { FrameRate, MapName, OutputConventions, Shaping } from './sea.ts';

// Every value a sea file may leave out. `plan` prints them all; the JSON Schema's descriptions quote them.

export const SEED_DEFAULT = 1;

export { SEA_WATER_DEFAULTS };

export const CURRENT_DEFAULTS: Current = Object.freeze({ eastMps: 0, northMps: 0 });

/**
 * A swell keeps cos-2s with s = 25, the usual value for a swell of short travel.
 * Source: Goda & Suzuki 1975 (10 for a wind sea, 25 and 75 for swells of short and long travel). A measured spectrum
 * without a spread takes 30 degrees, what buoys find at the peak of a mixed sea: common practice, no source.
 */
export const SPREADING_DEFAULTS: Readonly<{
  windSeaS: number;
  swellS: number;
  swellNarrowing: number;
  measuredRad: number;
}> = Object.freeze({ windSeaS: 10, swellS: 25, swellNarrowing: 0, measuredRad: Math.PI / 6 });

export const SHAPING_DEFAULTS: Shaping = Object.freeze({
  bandGains: Object.freeze([]),
  againstWind: 1,
  horizontalScale: 1,
  matchHeight: true,
  amplitudes: 'gaussian',
});

export const LOOP_DEFAULTS: Readonly<{ seconds: number; frameRate: FrameRate; firstFrame: number }> =
  Object.freeze({ seconds: 8, frameRate: Object.freeze([24, 1] as const), firstFrame: 1 });

/**
 * Three cascades of 256 reach 0.25 m for peaks up to about 60 m; below a quarter of a metre spectra of this family
 * hold no physics of interest. Bands end at half the Nyquist wavenumber, four texels a wave, where the error of
 * bilinear filtering and the energy left out are smallest together.
 */
export const CASCADES_DEFAULTS: Readonly<{
  count: number;
  resolution: number;
  shortestWavelengthM: number;
  headRoom: number;
}> = Object.freeze({ count: 3, resolution: 256, shortestWavelengthM: 0.25, headRoom: 0.5 });

export const FOAM_DEFAULTS: Readonly<{ residue: 'remove' | 'keep' }> = Object.freeze({ residue: 'remove' });

/** Written when a sea file names no maps; foam only where there is a coverage to aim at. */
export const MAPS_DEFAULTS: Readonly<Partial<Record<MapName, 'exr' | 'png'>>> = Object.freeze({
  displacement: 'exr',
  normal: 'png',
  foam: 'png',
});

/** A 16-bit range of 6 standard deviations clips about 2 texels in a thousand million and costs a quarter of a bit. */
export const RANGE_DEFAULTS: Readonly<{ sigmas: number }> = Object.freeze({ sigmas: 6 });

export const OUTPUT_DEFAULTS: OutputConventions = Object.freeze({
  axes: 'z-up',
  rowZero: 'north',
  normalGreen: 'north',
  lengthUnit: 'm',
  exrChannels: 'plain',
  padding: 4,
});
