import { InternalError } from '../errors.ts';
import type { Codec } from './codec.ts';
import { EXR } from './exr.ts';
import { PNG } from './png.ts';

/** Every file format there is. */
export const CODECS: readonly Codec[] = [EXR, PNG];

/**
 * The codec of a format's name.
 * @throws InternalError for a name that no codec has: sea files are checked before
 */
export function codecFor(format: string): Codec {
  const codec = CODECS.find((candidate) => candidate.format === format);
  if (codec === undefined) throw new InternalError(`No codec writes the format "${format}".`);
  return codec;
}
