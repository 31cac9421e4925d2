import type { Image, Plane, SampleType } from '../image/image.ts';

/**
 * One file format: bytes in, bytes out, no paths. The same image and metadata always give the same bytes.
 *
 * To add a format, write one file that exports a `Codec` and add it to `CODECS` in registry.ts; the tests in
 * test/formats then cover it.
 */
export interface Codec {
  /** Name in sea files and manifests, e.g. `exr`. */
  readonly format: string;
  /** File name extension without its dot. */
  readonly extension: string;
  /** The sample types it can hold, without loss. */
  readonly samples: readonly SampleType[];
  /** The lists of channel names it can hold, in the image's order; `any` where names are free. */
  readonly channelSets: 'any' | readonly (readonly string[])[];
  /**
   * The file of an image. Neither argument is changed or kept.
   * @throws InternalError where the image is inconsistent or this format cannot hold it
   */
  readonly encode: (image: Image, metadata: FrameMetadata) => Uint8Array;
  /**
   * The image in a file. The planes are new; `bytes` is not kept. Memory is bounded before it is taken: a header that
   * lies about sizes is refused, not obeyed.
   * @param source what to call the file in messages
   * @throws InputError where the bytes are damaged, cut short, too large, or hold what loopswell does not write
   */
  readonly decode: (bytes: Uint8Array, source?: string) => DecodedImage;
}

/** What a file says about its frame, beside the pixels. */
export interface FrameMetadata {
  /** Name and version of the program. */
  readonly software: string;
  /** Frames per second as an exact fraction of two positive integers. */
  readonly frameRate: readonly [numerator: number, denominator: number];
  /** The number in the file's name; an integer. */
  readonly frameNumber: number;
  /** One sentence for a person who finds the file alone. */
  readonly comments: string;
  /** More facts, written under `ATTRIBUTE_PREFIX`: letters, digits, dots and dashes in a key, numbers finite.
   * Formats may keep numbers to float32 only. */
  readonly attributes: Readonly<Record<string, string | number>>;
}

/** Stands before each attribute that is ours alone, so that it meets no standard one. */
export const ATTRIBUTE_PREFIX = 'loopswell.';

/** What a decoder found in a file. */
export interface DecodedImage {
  readonly width: number;
  readonly height: number;
  readonly sample: SampleType;
  /** In the order of the file, which need not be the order they were encoded in: OpenEXR sorts them. */
  readonly channels: readonly string[];
  /** One for each channel: `width * height` samples as in `Image`; the caller's. */
  readonly planes: readonly Plane[];
  /** Texts and numbers under their names in the file. PNG knows texts only. */
  readonly attributes: ReadonlyMap<string, string | number>;
}
