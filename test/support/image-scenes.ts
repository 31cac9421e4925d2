import type { Codec, FrameMetadata } from '../../src/codec/codec.ts';
import { blankPlane, type Image, type Plane, type SampleType } from '../../src/image/image.ts';
import { fillHalf } from '../../src/math/half.ts';

/** Metadata with something in every field, a text that Latin-1 cannot say among them. */
export const FRAME_METADATA: FrameMetadata = {
  software: 'loopswell 9.9.9',
  frameRate: [24000, 1001],
  frameNumber: 1007,
  comments: 'One frame of a scene for tests.',
  attributes: { patchLengthM: 250.123456789, seed: 7, title: 'Größe: 250 m – λ', cascade: 'c0' },
};

export type Fill = 'zero' | 'constant' | 'ramp' | 'waves' | 'noise' | 'extremes' | 'mostly-zero';
export const FILLS: readonly Fill[] = [
  'zero',
  'constant',
  'ramp',
  'waves',
  'noise',
  'extremes',
  'mostly-zero',
];

/** Width and height: one pixel; odd; one whole ZIP block; several blocks. */
export const SIZES: readonly (readonly [width: number, height: number])[] = [
  [1, 1],
  [3, 5],
  [16, 16],
  [64, 48],
];

/** A number in [0, 1) that looks random and depends on its index alone. */
export function scattered(index: number): number {
  let h = Math.imul(index + 1, 0x9e3779b1);
  h = Math.imul(h ^ (h >>> 15), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return ((h ^ (h >>> 16)) >>> 0) / 2 ** 32;
}

/** Values that a careless writer loses: signs of zero, subnormals, the ends of the range, infinities. */
const FLOAT_EXTREMES = [
  0,
  -0,
  2 ** -149,
  -(2 ** -130),
  3.4028234663852886e38,
  -1e30,
  Infinity,
  -Infinity,
  -1,
  1 / 3,
];
const HALF_EXTREMES = [0, -0, 2 ** -24, -(2 ** -15), 65504, -65504, Infinity, -Infinity, -1, 1 / 3];

/** Value of sample (x, y) of channel c: 0..1 for integer samples (to be scaled), any number for floats. */
function sceneValue(fill: Fill, sample: SampleType, x: number, y: number, c: number, index: number): number {
  switch (fill) {
    case 'zero':
      return 0;
    case 'constant':
      return 0.3 + 0.1 * c;
    case 'ramp':
      return (((x + 3 * y) * (c + 1)) % 256) / 255;
    case 'waves':
      return 0.5 + 0.2 * Math.sin(x / 5 + y / 9 + c) + 0.2 * Math.sin(x / 3 - y / 4 + 2 * c);
    case 'noise':
      return sample === 'half' || sample === 'float' ? 4 * scattered(index) - 2 : scattered(index);
    case 'mostly-zero':
      return scattered(index) < 0.97 ? 0 : scattered(index + 1);
    case 'extremes': {
      if (sample === 'half') return HALF_EXTREMES[index % HALF_EXTREMES.length];
      if (sample === 'float') return FLOAT_EXTREMES[index % FLOAT_EXTREMES.length];
      return (x + y + c) % 2;
    }
  }
}

/** An image with the named channels. */
export function sceneImage(
  sample: SampleType,
  names: readonly string[],
  [width, height]: readonly [width: number, height: number],
  fill: Fill,
): Image {
  const planes = names.map((_, c) => {
    const values = Float64Array.from({ length: width * height }, (_, i) =>
      sceneValue(fill, sample, i % width, Math.floor(i / width), c, i + 100_003 * c),
    );
    return plane(sample, values);
  });
  const channels = names.map((name) => ({
    name,
    quantity: 'height' as const,
    unit: 'm' as const,
    decode: { scale: 12.5, offset: -6.25 },
  }));
  return { width, height, sample, channels, planes };
}

function plane(sample: SampleType, values: Float64Array): Plane {
  const out = blankPlane(sample, values.length);
  if (out instanceof Float32Array) out.set(values);
  else if (sample === 'half') fillHalf(out as Uint16Array, values);
  else out.set(values.map((value) => Math.round(value * (sample === 'uint8' ? 255 : 65535))));
  return out;
}

/** Lists of channel names to try a codec with. */
export function channelSetsOf(codec: Codec): readonly (readonly string[])[] {
  if (codec.channelSets !== 'any') return codec.channelSets;
  return [
    ['Y'],
    ['R', 'G', 'B'],
    ['displacement.X', 'displacement.Y', 'displacement.Z'],
    ['b', 'B', 'A', 'Z', 'a.name-longer_than-31-bytes.in-the-channel-list'],
  ];
}

export interface Scene {
  readonly name: string;
  readonly image: Image;
}

/** Every scene that a codec must hold without loss. */
export function scenesOf(codec: Codec): Scene[] {
  const scenes: Scene[] = [];
  for (const sample of codec.samples) {
    for (const names of channelSetsOf(codec)) {
      for (const size of SIZES) {
        for (const fill of FILLS) {
          const name = `${codec.format} ${sample} ${names.join(',')} ${size.join('x')} ${fill}`;
          scenes.push({ name, image: sceneImage(sample, names, size, fill) });
        }
      }
    }
  }
  return scenes;
}

/** The bytes behind a plane: comparing them tells -0 from 0 and one NaN from another. */
export function planeBytes(of: Plane): Uint8Array {
  return new Uint8Array(of.buffer, of.byteOffset, of.byteLength);
}

/** Whether two planes are of one type and equal to the bit. */
export function samePlane(a: Plane, b: Plane): boolean {
  return a.constructor === b.constructor && Buffer.compare(planeBytes(a), planeBytes(b)) === 0;
}
