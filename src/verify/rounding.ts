import type { SampleType } from '../image/image.ts';
import { halfStep } from '../math/half.ts';

/**
 * What storing a channel's values may have cost, in SI. A value v was stored as s with |v - s| at most half a step of
 * the samples (a whole one where a dither was added before rounding).
 */
export interface Rounding {
  readonly sample: SampleType;
  /** SI value of one unit of the stored number, signed. */
  readonly scale: number;
  /** Distance between neighbouring codes of an integer sample; 0 for floats. */
  readonly step: number;
  readonly dithered: boolean;
  /** Values of the lowest and highest code, where values beyond them were clipped; infinite where none was. */
  readonly low: number;
  readonly high: number;
  /** Mean square of the error over the frame: of rounding, white in space, see `meanSquareOf...`. */
  readonly meanSquare: number;
  /** And of clipping, which flattens crests: as smooth as the waves are. */
  readonly clipping: number;
}

/** Relative step of a binary32 number is at most 2^-23: half of it. */
const FLOAT_HALF_STEP = 2 ** -24;

/** Largest distance between a value and what was stored of it. */
export function roundingBound(rounding: Rounding, stored: number): number {
  const { sample, scale, step, dithered } = rounding;
  if (sample === 'half') return 0.5 * halfStep(stored / scale) * Math.abs(scale);
  if (sample === 'float') return Math.abs(stored) * FLOAT_HALF_STEP + Math.abs(scale) * 2 ** -150;
  return dithered ? step : step / 2;
}

/** By how much a prediction lies outside the values that are stored as `stored`; 0 where it could be one of them. */
export function roundingExcess(rounding: Rounding, predicted: number, stored: number): number {
  const beyond = Math.abs(predicted - stored) - roundingBound(rounding, stored);
  if (beyond <= 0) return 0;
  if (stored >= rounding.high && predicted > stored) return 0;
  if (stored <= rounding.low && predicted < stored) return 0;
  return beyond;
}

/**
 * Mean square error of rounding to codes: step^2 / 12, and as much again for a dither of one step.
 * Source: uniform error (common practice, no source; true where values change by several codes over the tile).
 */
export function meanSquareOfCodes(step: number, dithered: boolean): number {
  return (step * step) / (dithered ? 6 : 12);
}

/** Mean square error of rounding halves, from how many of them have each 5-bit exponent. */
export function meanSquareOfHalves(counts: Uint32Array, scale: number): number {
  let sum = 0;
  let total = 0;
  for (let exponent = 0; exponent < 32; exponent++) {
    const step = 2 ** (Math.max(exponent, 1) - 25) * scale;
    sum += (counts[exponent] * step * step) / 12;
    total += counts[exponent];
  }
  return total === 0 ? 0 : sum / total;
}

/** Mean square error of rounding to binary32, whose step lies between 2^-24 and 2^-23 of the value. */
export function meanSquareOfFloats(meanSquareValue: number): number {
  return (meanSquareValue * 2 ** -46) / 12;
}

/**
 * Mean square error of clipping a share of normally distributed values at `extent` from their mean:
 *
 *     share E[(x - t)^2 | x > t],  E ~ 2 sigma^4 / t^2 for t of two deviations and more
 *
 * Source: first term of the asymptotic series of Mills' ratio (from memory); an upper bound.
 */
export function meanSquareOfClipping(share: number, extent: number, variance: number): number {
  return share === 0 ? 0 : (share * 2 * variance * variance) / (extent * extent);
}

/**
 * Noise of the transforms themselves, as a share of the largest field of its kind: what the engines promise of
 * themselves (src/field/float32-engine.ts), and for the reference far above what tests see.
 */
export function engineNoise(engine: string): number {
  return engine === 'float64' ? 1e-12 : 1e-6;
}

/** The largest field of a kind in deviations of one: what turns `engineNoise` into a share of a deviation. */
export const LARGEST_IN_DEVIATIONS = 6;
