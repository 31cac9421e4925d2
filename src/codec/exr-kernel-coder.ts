import type { Plane } from '../image/image.ts';
import { copyOf } from './bytes.ts';
import { availableKernel, rowBytesOf } from './coder.ts';
import { LINES_PER_BLOCK, ZIP_COMPRESSION } from './exr-header.ts';

/** Bytes of an entry of the offset table, and of the two numbers before the pixels of a block. */
const OFFSET_BYTES = 8;
const BLOCK_HEAD_BYTES = 8;

/**
 * An OpenEXR file by the kernel: `head`, the offset table, the blocks. The whole file is made in the kernel's memory,
 * so that it is copied once; planes go in block by block.
 *
 * @param planes channels in the order of the file
 */
export function exrByKernel(
  head: Uint8Array,
  planes: readonly Plane[],
  width: number,
  height: number,
): Uint8Array {
  const kernel = availableKernel();
  const { program } = kernel;
  const sampleBytes = planes[0].BYTES_PER_ELEMENT;
  const rowBytes = width * sampleBytes;
  const blockRows = Math.min(height, LINES_PER_BLOCK[ZIP_COMPRESSION]);
  const blockBytes = blockRows * rowBytes * planes.length;
  const memory = kernel.layOut(program.exrScratchBytes(blockBytes), planes.length, blockRows * rowBytes);
  const table = memory.file + head.length;
  const blockCount = Math.ceil(height / blockRows);
  const firstBlock = table + OFFSET_BYTES * blockCount;
  // No block is longer in the file than its samples, but while it is written one may be twice as long.
  const mostBytes = height * rowBytes * planes.length + BLOCK_HEAD_BYTES * blockCount + blockBytes + 65536;
  kernel.reserve(firstBlock + mostBytes);
  const bytes = kernel.bytes();
  const numbers = new DataView(bytes.buffer);

  bytes.set(head, memory.file);
  program.beginExr();
  let block = firstBlock;
  for (let b = 0; b < blockCount; b++) {
    const y = b * blockRows;
    const rows = Math.min(blockRows, height - y);
    for (const [c, plane] of planes.entries()) {
      bytes.set(rowBytesOf(plane, width, y, rows), memory.planes + c * memory.step);
    }
    const pixels = block + BLOCK_HEAD_BYTES;
    const length = program.putExrBlock(
      pixels,
      memory.planes,
      memory.step,
      planes.length,
      rowBytes,
      rows,
      sampleBytes === 4,
      memory.scratch,
    );
    numbers.setInt32(block, y, true);
    numbers.setInt32(block + 4, length, true);
    numbers.setBigUint64(table + OFFSET_BYTES * b, BigInt(block - memory.file), true);
    block = pixels + length;
  }
  return copyOf(bytes.subarray(memory.file, block));
}
