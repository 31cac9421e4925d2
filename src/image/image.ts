/** How a sample is stored: unsigned integer codes, or IEEE binary16 (as its bits) and binary32. */
export type SampleType = 'uint8' | 'uint16' | 'half' | 'float';

/**
 * `value = stored * scale + offset`, where `stored` is the float in the file, or for integer files the code
 * divided by its largest code (0..1).
 */
export interface Decode {
  readonly scale: number;
  readonly offset: number;
}

/** The physical quantity in one channel: what the reader recovers after decoding. */
export type Quantity =
  | 'displacement-east'
  | 'displacement-north'
  | 'displacement-up'
  | 'velocity-east'
  | 'velocity-north'
  | 'velocity-up'
  | 'slope-east'
  | 'slope-north'
  | 'strain-east-east'
  | 'strain-north-north'
  | 'strain-east-north'
  | 'normal-east'
  | 'normal-north'
  | 'normal-up'
  | 'jacobian'
  | 'foam'
  | 'height';

/** Unit of a quantity after decoding; `1` is dimensionless. */
export type Unit = 'm' | 'cm' | 'm/s' | 'cm/s' | '1';

/** One named channel: what it holds and how to read it. */
export interface ChannelSpec {
  /** Name in the file: `R`, `G`, `B`, `Y`, or layered (`displacement.X`). */
  readonly name: string;
  readonly quantity: Quantity;
  readonly unit: Unit;
  readonly decode: Decode;
}

/** Samples of one channel: `half` travels as its 16 bits in a Uint16Array. */
export type Plane = Uint8Array | Uint16Array | Float32Array;

/**
 * An image in memory, planar.
 *
 * `planes[c]` holds channel c: `width * height` samples, row-major, row 0 is the first row **of the file** (the
 * upper edge in every viewer), x fastest. The image owns its planes.
 */
export interface Image {
  readonly width: number;
  readonly height: number;
  readonly sample: SampleType;
  readonly channels: readonly ChannelSpec[];
  readonly planes: readonly Plane[];
}

/** The largest code of an integer sample type. */
export const LARGEST_CODE = { uint8: 255, uint16: 65535 } as const;

/** Bytes of one stored sample. */
export const SAMPLE_BYTES: Readonly<Record<SampleType, number>> = { uint8: 1, uint16: 2, half: 2, float: 4 };

/** Zeroed samples of one type, `count` of them; the caller's. */
export function blankPlane(sample: SampleType, count: number): Plane {
  if (sample === 'uint8') return new Uint8Array(count);
  return sample === 'float' ? new Float32Array(count) : new Uint16Array(count);
}

/**
 * What makes an image inconsistent in itself, as the end of a sentence; null where nothing does.
 * Whether a file format can hold it is the format's business.
 */
export function imageFault(image: Image): string | null {
  const { width, height, sample, channels, planes } = image;
  if (!isSide(width) || !isSide(height)) return `its size is ${width} x ${height}`;
  if (channels.length === 0) return 'it has no channel';
  if (channels.length !== planes.length)
    return `it has ${channels.length} channels but ${planes.length} planes`;
  if (new Set(channels.map(({ name }) => name)).size !== channels.length) return 'two channels share a name';
  const wanted = blankPlane(sample, 0).constructor;
  for (const [c, plane] of planes.entries()) {
    const { name } = channels[c];
    if (plane.constructor !== wanted) return `channel ${name} is not of type ${sample}`;
    if (plane.length !== width * height)
      return `channel ${name} has ${plane.length} samples, not ${width * height}`;
  }
  return null;
}

function isSide(length: number): boolean {
  return Number.isInteger(length) && length >= 1;
}
