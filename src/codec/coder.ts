import { UnavailableError } from '../errors.ts';
import type { Plane } from '../image/image.ts';
import { type CodeKernel, codeKernel } from '../kernel/code/code-kernel.ts';

/**
 * How pixels become the end of a file, behind a head that says what they are. Neither argument is changed or kept; the
 * result is new.
 */
export type PixelCoder = (
  head: Uint8Array,
  planes: readonly Plane[],
  width: number,
  height: number,
) => Uint8Array;

/**
 * Which program compresses: `kernel` is WebAssembly and the fast one; `zlib` is Node's, for machines whose WebAssembly
 * has no SIMD, and to compare with. Both write standard streams of about the same size, but other bytes.
 */
export type CoderName = 'kernel' | 'zlib';

/**
 * This thread's kernel.
 * @throws UnavailableError (69) where it cannot run; never another coder in its place, for the bytes would differ
 */
export function availableKernel(): CodeKernel {
  try {
    return codeKernel();
  } catch (cause) {
    throw new UnavailableError(
      'The encoder cannot run: it needs WebAssembly with SIMD, and dist/kernel/code.wasm, which `npm run build` makes. On a machine without SIMD use --engine float64.',
      { cause },
    );
  }
}

/** The bytes behind some rows of a plane. */
export function rowBytesOf(plane: Plane, width: number, from: number, rows: number): Uint8Array {
  const rowBytes = width * plane.BYTES_PER_ELEMENT;
  return new Uint8Array(plane.buffer, plane.byteOffset + from * rowBytes, rows * rowBytes);
}
