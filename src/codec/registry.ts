import { InternalError } from '../errors.ts';
import type { Codec } from './codec.ts';
import type { CoderName } from './coder.ts';
import { EXR, EXR_BY_ZLIB } from './exr.ts';
import { PNG, PNG_BY_ZLIB } from './png.ts';

/** Every file format there is, written by the kernel. */
export const CODECS: readonly Codec[] = [EXR, PNG];

/** The same formats, written by Node's zlib. */
export const CODECS_BY_ZLIB: readonly Codec[] = [EXR_BY_ZLIB, PNG_BY_ZLIB];

/**
 * The codec of a format's name.
 * @param coder which program compresses; decoding is the same
 * @throws InternalError for a name that no codec has: sea files are checked before
 */
export function codecFor(format: string, coder: CoderName = 'kernel'): Codec {
  const codecs = coder === 'kernel' ? CODECS : CODECS_BY_ZLIB;
  const codec = codecs.find((candidate) => candidate.format === format);
  if (codec === undefined) throw new InternalError(`No codec writes the format "${format}".`);
  return codec;
}
