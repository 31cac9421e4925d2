import { InputError } from '../errors.ts';

/** The most bytes of pixels a decoder takes on: 8192 x 8192 with four float channels. */
export const LARGEST_PIXEL_BYTES: number = 2 ** 30;

/**
 * DEFLATE makes nothing smaller than this: a match of 258 bytes costs at least 2 bits.
 * Source: RFC 1951 (the bound is arithmetic from its section 3.2.5); zlib's own documentation says 1032:1.
 */
const LARGEST_RATIO = 1032;

/** The refusal of a file that is damaged, or that is not one of ours. */
export function damage(
  source: string,
  path: string,
  expected: string,
  found: string,
  options?: ErrorOptions,
): InputError {
  const remedy = 'The file is damaged or was not written by loopswell; bake it again.';
  return new InputError(source, [{ path, line: 0, column: 0, expected, found, remedy }], options);
}

/**
 * Refuses a size that is absurd or that the file cannot hold, before memory is taken for it.
 * @param pixelBytes bytes that one pixel takes, all channels together
 * @param fileBytes length of the file
 * @throws InputError
 */
export function refuseLyingSize(
  source: string,
  width: number,
  height: number,
  pixelBytes: number,
  fileBytes: number,
): void {
  const size = `${width} x ${height}`;
  if (width < 1 || height < 1) throw damage(source, 'size', 'at least one pixel', size);
  const bytes = width * height * pixelBytes;
  if (bytes > LARGEST_PIXEL_BYTES) {
    throw damage(source, 'size', `at most ${LARGEST_PIXEL_BYTES} bytes of pixels`, `${size}, ${bytes} bytes`);
  }
  if (bytes > fileBytes * LARGEST_RATIO) {
    throw damage(source, 'size', `what a file of ${fileBytes} bytes can hold`, `${size}, ${bytes} bytes`);
  }
}
