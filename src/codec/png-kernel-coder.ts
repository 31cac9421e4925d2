import { crc32 } from 'node:zlib';
import type { Plane } from '../image/image.ts';
import type { CodeKernel, ImageMemory } from '../kernel/code/code-kernel.ts';
import { copyOf } from './bytes.ts';
import { availableKernel, rowBytesOf } from './coder.ts';
import { chunk } from './png-chunks.ts';

/** Bytes of each filter's sample: a part of the image, but between these. */
const SAMPLED_PART = 1 / 32;
const SMALLEST_SAMPLE = 4096;
const LARGEST_SAMPLE = 16384;

/** Groups of rows in the sample, evenly spread. */
const SAMPLED_GROUPS = 8;

const IDAT: Uint8Array = new TextEncoder().encode('IDAT');
const END: Uint8Array = chunk('IEND', new Uint8Array(0));

/** Bytes of a chunk before its data, and of its check sum behind them. */
const CHUNK_HEAD_BYTES = 8;
const CHECKSUM_BYTES = 4;

/**
 * A PNG file by the kernel: `head`, the pixels in one IDAT chunk, IEND.
 *
 * The whole file is made in the kernel's memory, so that it is copied once. Planes go in band by band, as much as one
 * block of the stream holds: what the kernel reads is still in the cache, and only the file takes memory.
 */
export function pngByKernel(
  head: Uint8Array,
  planes: readonly Plane[],
  width: number,
  height: number,
): Uint8Array {
  const kernel = availableKernel();
  const { program } = kernel;
  const sampleBytes = planes[0].BYTES_PER_ELEMENT;
  const rowBytes = width * planes.length * sampleBytes;
  const bandRows = Math.min(height, Math.max(1, Math.floor(program.LARGEST_BLOCK.value / (rowBytes + 1))));
  const memory = kernel.layOut(
    program.pngScratchBytes(rowBytes),
    planes.length,
    bandRows * width * sampleBytes,
  );
  // What is not compressible is stored, 5 bytes dearer for each 65535; one block may grow before it is taken back.
  const mostPixelBytes = Math.ceil(height * (rowBytes + 1) * 1.001) + program.LARGEST_BLOCK.value + 65536;
  kernel.reserve(memory.file + head.length + mostPixelBytes);
  const bytes = kernel.bytes();

  function copyRows(from: number, rows: number): void {
    for (const [c, plane] of planes.entries()) {
      bytes.set(rowBytesOf(plane, width, from, rows), memory.planes + c * memory.step);
    }
  }

  // Pixels ----------------------------------------------------------------------------------------------
  program.beginPng(memory.scratch, width, planes.length, sampleBytes);
  sample(kernel, memory, copyRows, rowBytes, height);
  const pixels = memory.file + head.length + CHUNK_HEAD_BYTES;
  program.clearRowAbove();
  program.beginPixels(pixels);
  for (let y = 0; y < height; y += bandRows) {
    const rows = Math.min(bandRows, height - y);
    copyRows(y, rows);
    program.putRows(memory.planes, memory.step, rows, y + rows === height);
  }
  const pixelsEnd = program.endPixels() >>> 0;

  // What stands around them -----------------------------------------------------------------------------
  const numbers = new DataView(bytes.buffer);
  bytes.set(head, memory.file);
  numbers.setUint32(memory.file + head.length, pixelsEnd - pixels);
  bytes.set(IDAT, pixels - IDAT.length);
  numbers.setUint32(pixelsEnd, crc32(bytes.subarray(pixels - IDAT.length, pixelsEnd)));
  bytes.set(END, pixelsEnd + CHECKSUM_BYTES);
  return copyOf(bytes.subarray(memory.file, pixelsEnd + CHECKSUM_BYTES + END.length));
}

/** Shows the kernel some groups of rows, each with the row above it, or all rows where there are few. */
function sample(
  { program }: CodeKernel,
  { planes, step }: ImageMemory,
  copyRows: (from: number, rows: number) => void,
  rowBytes: number,
  height: number,
): void {
  const wanted = Math.min(LARGEST_SAMPLE, Math.max(SMALLEST_SAMPLE, height * rowBytes * SAMPLED_PART));
  const groupRows = Math.max(1, Math.floor(wanted / SAMPLED_GROUPS / rowBytes));
  if (SAMPLED_GROUPS * groupRows >= height) {
    for (let y = 0; y < height; y += groupRows) {
      const rows = Math.min(groupRows, height - y);
      copyRows(y, rows);
      program.sampleRows(planes, step, rows);
    }
    return;
  }
  for (let g = 0; g < SAMPLED_GROUPS; g++) {
    const y = Math.floor(((g + 0.5) * height) / SAMPLED_GROUPS - groupRows / 2);
    if (y > 0) {
      copyRows(y - 1, 1);
      program.setRowAbove(planes, step);
    }
    copyRows(y, groupRows);
    program.sampleRows(planes, step, groupRows);
  }
}
