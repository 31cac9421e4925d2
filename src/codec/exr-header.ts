import type { SampleType } from '../image/image.ts';
import { concatenation } from './bytes.ts';
import type { FrameMetadata } from './codec.ts';
import { floatLE, int32LE, nullTerminated, uint8, utf8 } from './exr-bytes.ts';

/*
 * The header of a single-part scan-line file.
 * Source: OpenEXR, "OpenEXR File Layout" and "Standard Attributes" (the published documents of the format).
 */

/** First four bytes of every OpenEXR file. */
export const MAGIC = 20000630;

/** Version 2 of the format, in the low byte of the version field; flags above it. */
export const VERSION = 2;

/** Version-field flag: some name is longer than 31 bytes (up to 255). */
export const LONG_NAMES_FLAG = 0x400;

/** The values of `pixelType` for the samples we write; 0 is uint. */
export const PIXEL_TYPE = { half: 1, float: 2 } as const;

/** Value of the `compression` attribute for zlib over blocks of 16 scan lines. */
export const ZIP_COMPRESSION = 3;

/** Scan lines in one block, by the value of `compression`: none, (RLE), ZIPS, ZIP. */
export const LINES_PER_BLOCK: Readonly<Record<number, number>> = { 0: 1, 2: 1, 3: 16 };

const INCREASING_Y = 0;

/** What the header of one frame is made from. */
export interface ExrHeader {
  readonly width: number;
  readonly height: number;
  readonly sample: SampleType;
  /** Channel names in byte order. */
  readonly channels: readonly string[];
  readonly metadata: FrameMetadata;
  /** Attributes of our own, prefixed and in the order to be written. */
  readonly attributes: readonly (readonly [name: string, value: string | number])[];
}

/** Magic number, version field and header: everything before the offset table. */
export function exrPreamble(header: ExrHeader): Uint8Array {
  const { width, height, metadata } = header;
  const pixelType = header.sample === 'float' ? PIXEL_TYPE.float : PIXEL_TYPE.half;
  const names = [...header.channels, ...header.attributes.map(([name]) => name)];
  const flags = names.some((name) => utf8(name).length > 31) ? LONG_NAMES_FLAG : 0;
  const window = concatenation([int32LE(0), int32LE(0), int32LE(width - 1), int32LE(height - 1)]);

  return concatenation([
    // Magic number and version field ------------------------------------------------------------------
    int32LE(MAGIC),
    int32LE(VERSION | flags),

    // Required attributes -----------------------------------------------------------------------------
    attribute('channels', 'chlist', channelList(header.channels, pixelType)),
    attribute('compression', 'compression', uint8(ZIP_COMPRESSION)),
    attribute('dataWindow', 'box2i', window),
    attribute('displayWindow', 'box2i', window),
    attribute('lineOrder', 'lineOrder', uint8(INCREASING_Y)),
    attribute('pixelAspectRatio', 'float', floatLE(1)),
    attribute('screenWindowCenter', 'v2f', concatenation([floatLE(0), floatLE(0)])),
    attribute('screenWindowWidth', 'float', floatLE(1)),
    attribute('type', 'string', utf8('scanlineimage')),

    // Standard optional attributes --------------------------------------------------------------------
    // No chromaticities and no colour: these are measurements. No capDate: it would make every bake differ.
    attribute('colorInteropID', 'string', utf8('data')),
    attribute('comments', 'string', utf8(metadata.comments)),
    // Without a rate of its own a sequence is read at 24 frames per second.
    attribute('framesPerSecond', 'rational', concatenation(metadata.frameRate.map(int32LE))),
    attribute('imageCounter', 'int', int32LE(metadata.frameNumber)),
    attribute('software', 'string', utf8(metadata.software)),
    attribute('wrapmodes', 'string', utf8('periodic')),

    // Attributes of our own ---------------------------------------------------------------------------
    ...header.attributes.map(([name, value]) => ownAttribute(name, value)),

    // End of header -----------------------------------------------------------------------------------
    uint8(0),
  ]);
}

/**
 * A text as `string`, a whole number as `int`, any other as `float`. There is a type `double`, but readers in browsers
 * complain about it in the user's console; exact numbers are in the texts of the decode rules.
 */
function ownAttribute(name: string, value: string | number): Uint8Array {
  if (typeof value === 'string') return attribute(name, 'string', utf8(value));
  const int32 = Number.isInteger(value) && Math.abs(value) < 2 ** 31;
  return int32 ? attribute(name, 'int', int32LE(value)) : attribute(name, 'float', floatLE(value));
}

/** name, type name, size of the value, value. */
function attribute(name: string, type: string, value: Uint8Array): Uint8Array {
  return concatenation([nullTerminated(name), nullTerminated(type), int32LE(value.length), value]);
}

/** Type `chlist`: for each channel its name, pixelType, pLinear, 3 reserved bytes, xSampling, ySampling; then a 0. */
function channelList(names: readonly string[], pixelType: number): Uint8Array {
  const entries = names.map((name) =>
    concatenation([
      nullTerminated(name),
      int32LE(pixelType),
      // pLinear is a hint to lossy compressors only; 0 where unsure.
      uint8(0),
      new Uint8Array(3),
      int32LE(1),
      int32LE(1),
    ]),
  );
  return concatenation([...entries, uint8(0)]);
}
