import { LARGEST_CODE, type Plane, type Quantity } from '../image/image.ts';
import type {
  ManifestCascade,
  ManifestChannel,
  ManifestConventions,
  ManifestMap,
} from '../manifest/manifest.ts';
import { fillFromHalf } from '../math/half.ts';
import type { SeenFile } from './frame-reader.ts';
import {
  meanSquareOfClipping,
  meanSquareOfCodes,
  meanSquareOfFloats,
  meanSquareOfHalves,
  type Rounding,
} from './rounding.ts';

/** A quantity over the tile, as a reader of the files gets it, in SI. */
export interface FieldValues {
  readonly quantity: Quantity;
  /** Float64Array N*N, row-major [iy][ix], row 0 in the south; lent until the next frame. */
  readonly values: Float64Array;
  readonly rounding: Rounding;
  readonly channel: ManifestChannel;
  /** Largest magnitude of any channel of its map over the loop, SI. */
  readonly size: number;
  /** Texels at the lowest or highest code of an integer sample: clipped ones are among them. */
  readonly extremes: number;
}

/** Decodes the fields of one frame after another into the same arrays. */
export interface FieldStore {
  readonly frame: (files: readonly SeenFile[]) => (quantity: Quantity) => FieldValues | null;
}

/** SI value of one of the channel's units. */
export function siPerUnit({ unit }: Pick<ManifestChannel, 'unit'>): number {
  return unit === 'cm' || unit === 'cm/s' ? 0.01 : 1;
}

/** @param rowZero which edge the first row of a file holds */
export function fieldStore(cascade: ManifestCascade, rowZero: ManifestConventions['rowZero']): FieldStore {
  const { resolution: N } = cascade;
  const buffers = new Map<Quantity, Float64Array>();
  return {
    frame(files) {
      const made = new Map<Quantity, FieldValues | null>();
      return (quantity) => {
        const before = made.get(quantity);
        if (before !== undefined) return before;
        const field = decodedField(buffers, quantity, files, N, rowZero);
        made.set(quantity, field);
        return field;
      };
    },
  };
}

function decodedField(
  buffers: Map<Quantity, Float64Array>,
  quantity: Quantity,
  files: readonly SeenFile[],
  N: number,
  rowZero: ManifestConventions['rowZero'],
): FieldValues | null {
  for (const { planned, image } of files) {
    const channel = planned.channels.find((candidate) => candidate.quantity === quantity);
    if (channel === undefined || image === null) continue;
    // Memory is taken once there is an image of that size.
    const values = buffers.get(quantity) ?? new Float64Array(N * N);
    buffers.set(quantity, values);
    const plane = image.planes[image.channels.indexOf(channel.name)];
    const { extremes, ...rounding } = fillValues(values, plane, planned, channel);
    if (rowZero === 'north') turnOver(values, N);
    return { quantity, values, rounding, channel, size: mapSize(planned), extremes };
  }
  return null;
}

function mapSize({ channels }: ManifestMap): number {
  return channels.reduce((most, channel) => {
    const { min, max } = channel.written;
    return Math.max(most, siPerUnit(channel) * Math.max(Math.abs(min), Math.abs(max)));
  }, 0);
}

/** Fills SI values in the order of the file. */
function fillValues(
  values: Float64Array,
  plane: Plane,
  map: ManifestMap,
  channel: ManifestChannel,
): Rounding & { readonly extremes: number } {
  const { sample, dither: dithered } = map;
  const si = siPerUnit(channel);
  const scale = channel.decode.scale * si;
  const offset = channel.decode.offset * si;
  const floats = {
    sample,
    scale,
    step: 0,
    dithered: false,
    low: -Infinity,
    high: Infinity,
    clipping: 0,
    extremes: 0,
  };
  if (sample === 'half') {
    const halves = plane as Uint16Array;
    fillFromHalf(values, halves);
    const exponents = new Uint32Array(32);
    for (let i = 0; i < halves.length; i++) {
      exponents[(halves[i] >> 10) & 31]++;
      values[i] = values[i] * scale + offset;
    }
    return { ...floats, meanSquare: meanSquareOfHalves(exponents, scale) };
  }
  if (sample === 'float') {
    let squares = 0;
    for (let i = 0; i < plane.length; i++) {
      squares += (plane[i] * scale) ** 2;
      values[i] = plane[i] * scale + offset;
    }
    return { ...floats, meanSquare: meanSquareOfFloats(squares / plane.length) };
  }
  const largest = LARGEST_CODE[sample];
  const step = scale / largest;
  const extremes =
    sample === 'uint8'
      ? fillFromBytes(values, plane as Uint8Array, step, offset)
      : fillFromWords(values, plane as Uint16Array, step, offset);
  const size = Math.abs(step);
  const codes = {
    sample,
    scale,
    step: size,
    dithered,
    meanSquare: meanSquareOfCodes(size, dithered),
    extremes,
  };
  if (channel.written.clipped === 0) return { ...codes, low: -Infinity, high: Infinity, clipping: 0 };
  const deviation = channel.written.deviation * si;
  const clipping = meanSquareOfClipping(extremes / plane.length, Math.abs(scale) / 2, deviation * deviation);
  return {
    ...codes,
    low: Math.min(offset, offset + scale),
    high: Math.max(offset, offset + scale),
    clipping,
  };
}

/** Fills values of 8-bit codes; returns how many are at an end. One loop a type: a loop over both is half as fast. */
function fillFromBytes(values: Float64Array, codes: Uint8Array, step: number, offset: number): number {
  let extremes = 0;
  for (let i = 0; i < codes.length; i++) {
    const code = codes[i];
    if (code === 0 || code === 255) extremes++;
    values[i] = code * step + offset;
  }
  return extremes;
}

/** The same of 16-bit codes. */
function fillFromWords(values: Float64Array, codes: Uint16Array, step: number, offset: number): number {
  let extremes = 0;
  for (let i = 0; i < codes.length; i++) {
    const code = codes[i];
    if (code === 0 || code === 65535) extremes++;
    values[i] = code * step + offset;
  }
  return extremes;
}

/** Turns the order of the rows round, in place. */
function turnOver(values: Float64Array, N: number): void {
  for (let south = 0, north = N - 1; south < north; south++, north--) {
    for (let x = 0, a = south * N, b = north * N; x < N; x++, a++, b++) {
      const value = values[a];
      values[a] = values[b];
      values[b] = value;
    }
  }
}
