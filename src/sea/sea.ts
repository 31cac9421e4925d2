import type { Current, Water } from '../physics/water.ts';

/** A sea as asked for: validated, frozen, SI and radians, every default filled in. Plain and cloneable. */
export interface Sea {
  /** Version of the sea file's format. */
  readonly seaFile: 1;
  readonly title: string;
  /** 0 .. 2^32 - 1. */
  readonly seed: number;
  readonly water: Water;
  readonly current: Current;
  readonly systems: readonly WaveSystemRequest[];
  readonly shaping: Shaping;
  readonly loop: Loop;
  readonly cascades: CascadesRequest;
  readonly foam: FoamRequest;
  readonly maps: readonly MapRequest[];
  readonly output: OutputConventions;
}

/** What the user asks of one wave system, before any formula is applied. */
export type WaveSystemRequest = WindSeaRequest | SwellRequest | MeasuredRequest;

interface SystemCommon {
  /** Unique in the sea; keys the system's random numbers, so that adding a system leaves the others' waves alone. */
  readonly name: string;
  /** Direction the waves come from: radians clockwise from north, in [0, 2 pi). */
  readonly fromRad: number;
  /** Significant height the system is brought to, whatever made it, m; null leaves it as it comes. */
  readonly scaleToM: number | null;
}

interface FormedCommon extends SystemCommon {
  readonly spectrum: SpectrumName;
  /** Member of the Ochi-Hubble family, 0 the most probable, 1 .. 10 the others; null with every other spectrum. */
  readonly spectrumRow: number | null;
  /** Peak enhancement gamma of the JONSWAP family; null leaves it to the growth law or the form's default. */
  readonly peakEnhancement: number | null;
  readonly spreading: SpreadingRequest;
}

/** A sea raised by the wind over it, by its wind and fetch or by its height and period. */
export interface WindSeaRequest extends FormedCommon {
  readonly kind: 'wind-sea';
  readonly growth: WindGrowth | null;
  readonly stated: StatedHeight | null;
  /** Wind speed at 10 m where it is known, also beside a stated height (for whitecaps and spreading); else null. */
  readonly windSpeedMps: number | null;
  /** The words the wind was given in; null where there is none. */
  readonly wind: WindWords | null;
  /** WMO code whose class the stated height stands for; null where the height itself was stated. */
  readonly seaState: number | null;
  /** Whether the peak period is the user's, that of a fully developed sea of this height, or the spectrum's own. */
  readonly periodBy: 'user' | 'full-development' | 'spectrum' | null;
}

/** A wind as it was given: measured at a height, or by its force on the Beaufort scale. */
export type WindWords =
  | { readonly by: 'speed'; readonly speedMps: number; readonly heightM: number }
  | { readonly by: 'beaufort'; readonly force: number };

/** Waves that have left the wind that raised them. */
export interface SwellRequest extends FormedCommon {
  readonly kind: 'swell';
  readonly stated: StatedHeight;
}

/** A sea that an instrument has measured; `fromRad` is the mean direction of all its energy. */
export interface MeasuredRequest extends SystemCommon {
  readonly kind: 'measured';
  /** The file, and the moment of the record, in words. */
  readonly source: string;
  readonly spectrum: MeasuredSpectrum;
  /** Wind speed at 10 m where it is known (for whitecaps), and the words it was given in; else null. */
  readonly windSpeedMps: number | null;
  readonly wind: WindWords | null;
}

/** A measured spectrum as plain numbers: the lists have an entry for each frequency. */
export interface MeasuredSpectrum {
  /** 4 sqrt(sum of density times bandwidth): the height of the file, m. */
  readonly significantHeightM: number;
  /** Mean direction at the highest density: radians clockwise from north, in [0, 2 pi). */
  readonly peakFromRad: number;
  /** Hz, ascending. */
  readonly frequencyHz: readonly number[];
  /** m^2/Hz. */
  readonly densityM2PerHz: readonly number[];
  /** Means of cos, sin theta and cos, sin 2 theta, theta counter-clockwise from the mean direction of travel. */
  readonly cos1: readonly number[];
  readonly sin1: readonly number[];
  readonly cos2: readonly number[];
  readonly sin2: readonly number[];
}

export const GROWTH_NAMES = [
  'jonswap',
  'kahma-calkoen',
  'shore-protection-manual',
  'wilson',
  'young-verhagen',
] as const;
/** `jonswap` is the experiment's own alpha, peak frequency and gamma; the others give a height and a period. */
export type GrowthName = (typeof GROWTH_NAMES)[number];

/** Wind speed at 10 m, fetch and duration; `Infinity` is as much as a fully developed sea needs. */
export interface WindGrowth {
  readonly windSpeedMps: number;
  readonly fetchM: number;
  readonly durationS: number;
  /** null leaves it to the spectrum, which has a growth of its own (`elfouhaily`, `pierson-moskowitz`). */
  readonly law: GrowthName | null;
}

/** Significant height (4 sqrt m0) in the stated depth, and peak period. */
export interface StatedHeight {
  readonly significantHeightM: number;
  readonly peakPeriodS: number;
}

export const SPECTRUM_NAMES = [
  'pierson-moskowitz',
  'jonswap',
  'tma',
  'bretschneider',
  'donelan-hamilton-hui',
  'elfouhaily',
  'ochi-hubble',
  'torsethaugen',
] as const;
export type SpectrumName = (typeof SPECTRUM_NAMES)[number];

export const SPREADING_NAMES = [
  'cos-2s',
  'mitsuyasu',
  'hasselmann',
  'donelan-banner',
  'wrapped-normal',
  'elfouhaily',
] as const;
export type SpreadingName = (typeof SPREADING_NAMES)[number];

export interface SpreadingRequest {
  readonly form: SpreadingName;
  /** Exponent s of `cos-2s`; null for the other forms. */
  readonly s: number | null;
  /** Standard deviation of `wrapped-normal`, rad; null for the other forms. */
  readonly widthRad: number | null;
  /** Swell narrowing xi of Horvath 2015, 0..1; adds to s, and is 0 for forms without one. */
  readonly swellNarrowing: number;
}

/** Art direction. */
export interface Shaping {
  /** Energy gains per wavelength band; they act last, so the height changes. Bands may not overlap. */
  readonly bandGains: readonly BandGain[];
  /** Share of the wind seas' waves moving against their wind that stays, 0..1; acts before normalisation. */
  readonly againstWind: number;
  /** Multiplies the horizontal displacement of linear theory; 1 is physical. */
  readonly horizontalScale: number;
  readonly matchHeight: boolean;
  readonly amplitudes: 'gaussian' | 'deterministic';
}

export interface BandGain {
  readonly shortestWavelengthM: number;
  readonly longestWavelengthM: number;
  /** Gain on amplitude (a gain of 2 doubles the height of these waves). */
  readonly gain: number;
}

/** Frames per second as an exact fraction. */
export type FrameRate = readonly [numerator: number, denominator: number];

/** A period of `frameCount` frames at `frameRate`: T = frameCount * denominator / numerator seconds, exactly. */
export interface Loop {
  readonly frameCount: number;
  readonly frameRate: FrameRate;
  /** Number of the first file; the same for all cascades. */
  readonly firstFrame: number;
  /** Seconds as the user wrote them, if they did; the loop's true length can differ by half a frame. */
  readonly askedSeconds: number | null;
}

export type CascadesRequest = AutoCascades | ListedCascades;

/** Cascades to be planned from the spectrum. */
export interface AutoCascades {
  readonly plan: 'auto';
  readonly count: number;
  readonly resolution: number;
  /** Shortest wave wanted, m. */
  readonly shortestWavelengthM: number;
  /** Overrides the planned longest patch, m; null plans it. */
  readonly longestPatchM: number | null;
  /** Share of the Nyquist wavenumber at which the band ends, (0, 0.85]. */
  readonly headRoom: number;
  /** Loops of single cascades by index; missing or null entries use the whole loop. */
  readonly loops: readonly (Loop | null)[];
}

export interface ListedCascades {
  readonly plan: 'list';
  /** Longest patch first. */
  readonly list: readonly ListedCascade[];
  readonly headRoom: number;
}

export interface ListedCascade {
  readonly patchLengthM: number;
  readonly resolution: number;
  /** Longest wave of the band; null lets the patch (c0) or the neighbour decide. */
  readonly longestWavelengthM: number | null;
  /** Shortest wave of the band; null lets the head room decide. */
  readonly shortestWavelengthM: number | null;
  readonly loop: Loop | null;
}

export interface FoamRequest {
  /**
   * `wind`: whitecap coverage of Monahan & O'Muircheartaigh 1980; `coverage`: the number; `breaking-level`: foam where
   * J falls below it; `off`: none.
   */
  readonly target:
    | { readonly by: 'wind' }
    | { readonly by: 'coverage'; readonly coverage: number }
    | { readonly by: 'breaking-level'; readonly breakingJ: number }
    | { readonly by: 'off' };
  /** e-folding time of foam, s; null takes min(3.85 s, T/3) of each cascade. */
  readonly decayTimeS: number | null;
  readonly residue: 'remove' | 'keep';
  /** Shares of the coverage by cascade index, summing to 1; null shares by compression. */
  readonly shares: readonly number[] | null;
}

export const MAP_NAMES = [
  'displacement',
  'height',
  'velocity',
  'slope',
  'strain',
  'normal',
  'jacobian',
  'foam',
] as const;
export type MapName = (typeof MAP_NAMES)[number];

/** One kind of map to write for every cascade. */
export interface MapRequest {
  readonly map: MapName;
  readonly format: 'exr' | 'png';
  /** exr: half or float; png: uint8 or uint16. */
  readonly sample: 'half' | 'float' | 'uint8' | 'uint16';
  readonly range: RangePolicy;
  /** Keyed ordered-random dithering before rounding to 8 bits. */
  readonly dither: boolean;
}

/**
 * Range of an integer map: a multiple of the realised standard deviation, a stated largest magnitude in the map's own
 * unit (m, m/s or 1), or the largest magnitude found by a pass over the whole loop. `natural` is for maps whose range
 * follows from their definition (normal, foam) and for float files.
 */
export type RangePolicy =
  | { readonly policy: 'sigmas'; readonly sigmas: number }
  | { readonly policy: 'extent'; readonly extent: number }
  | { readonly policy: 'survey' }
  | { readonly policy: 'natural' };

export interface OutputConventions {
  readonly axes: 'z-up' | 'y-up';
  readonly rowZero: 'north' | 'south';
  readonly normalGreen: 'north' | 'south';
  readonly lengthUnit: 'm' | 'cm';
  /** `plain`: R,G,B (Y for one channel); `layered`: displacement.X and so on. */
  readonly exrChannels: 'plain' | 'layered';
  /** Least number of digits of a frame number in a file name. */
  readonly padding: number;
}
