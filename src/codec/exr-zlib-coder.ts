import type { Plane } from '../image/image.ts';
import { concatenation } from './bytes.ts';
import { packedBlock } from './exr-block.ts';
import { int32LE, uint64LE } from './exr-bytes.ts';
import { LINES_PER_BLOCK, ZIP_COMPRESSION } from './exr-header.ts';

/**
 * An OpenEXR file by Node's zlib: `head`, the offset table, the blocks.
 * @param planes channels in the order of the file
 */
export function exrByZlib(
  head: Uint8Array,
  planes: readonly Plane[],
  width: number,
  height: number,
): Uint8Array {
  // Blocks of scan lines: y of the first line, size, pixels -------------------------------------------
  const linesPerBlock = LINES_PER_BLOCK[ZIP_COMPRESSION];
  const blocks: Uint8Array[][] = [];
  for (let y = 0; y < height; y += linesPerBlock) {
    const pixels = packedBlock(planes, width, y * width, Math.min(linesPerBlock, height - y));
    blocks.push([int32LE(y), int32LE(pixels.length), pixels]);
  }

  // Offset table: where in the file each block begins -------------------------------------------------
  const offsets: Uint8Array[] = [];
  let offset = head.length + 8 * blocks.length;
  for (const [y, size, pixels] of blocks) {
    offsets.push(uint64LE(offset));
    offset += y.length + size.length + pixels.length;
  }

  return concatenation([head, ...offsets, ...blocks.flat()]);
}
