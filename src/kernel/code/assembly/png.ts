import { ANY, leastBits } from './deflate';
import { AVERAGE, fillFilteredRow, NONE, PAETH, SUB, UP } from './png-filter';
import { fillRow, fillSampleLists } from './png-rows';
import { LARGEST_BLOCK } from './workspace';
import { beginZlib, endZlib, putZlib } from './zlib-stream';

/*
 * The pixels of a PNG image, band by band: rows are made, filtered and compressed while they are in the cache.
 *
 * One filter serves a whole image. It is chosen by size: all four are tried on a few groups of rows, and coded.
 */

/** Room before a row for the pixel to the left of its first, and behind it for whole vectors. */
const MARGIN: usize = 64;

/** Bytes kept free for the sample of each filter. */
const SAMPLE_BYTES: usize = LARGEST_BLOCK / 4;

let width: usize = 0;
let channels: usize = 0;
let sampleBytes: usize = 0;
let rowBytes: usize = 0;
let row: usize = 0;
let above: usize = 0;
let block: usize = 0;
let filter: usize = NONE;
let sampled: usize = 0;

/** Bytes of memory that an image needs beside its planes and its stream. */
export function pngScratchBytes(bytesInRow: usize): usize {
  return 2 * (bytesInRow + 2 * MARGIN) + max(LARGEST_BLOCK, bytesInRow + 1) + MARGIN;
}

/** Begins an image. `scratch` is the memory it needs. */
export function beginPng(scratch: usize, pixels: usize, planes: usize, bytesInSample: usize): void {
  width = pixels;
  channels = planes;
  sampleBytes = bytesInSample;
  rowBytes = pixels * planes * bytesInSample;
  row = scratch + MARGIN;
  above = row + rowBytes + 2 * MARGIN;
  block = above + rowBytes + MARGIN;
  sampled = 0;
  fillSampleLists(planes, bytesInSample);
  memory.fill(scratch, 0, 2 * (rowBytes + 2 * MARGIN));
}

/** Makes the row above the next one that is sampled or coded. */
export function setRowAbove(planes: usize, step: usize): void {
  fillRow(above, planes, step, planeRowBytes(), channels);
}

/** Puts zeros above the next row, as above the first one of an image. */
export function clearRowAbove(): void {
  memory.fill(above, 0, rowBytes);
}

/** Adds rows to the sample, filtered by each of the filters; not more than there is room for. */
export function sampleRows(planes: usize, step: usize, rows: usize): void {
  for (let y: usize = 0; y < rows && sampled + MARGIN < SAMPLE_BYTES; y++) {
    const bytes = min(rowBytes, SAMPLE_BYTES - MARGIN - sampled);
    fillRow(row, planes + y * planeRowBytes(), step, planeRowBytes(), channels);
    fillSample(NONE, bytes);
    fillSample(SUB, bytes);
    fillSample(UP, bytes);
    fillSample(PAETH, bytes);
    sampled += bytes + 1;
    swapRows();
  }
}

function fillSample(type: usize, bytes: usize): void {
  fillFilteredRow(sampleOf(type) + sampled, row, above, bytes, channels * sampleBytes, type);
}

function sampleOf(type: usize): usize {
  return block + (type === PAETH ? 3 : type) * SAMPLE_BYTES;
}

/** Chooses the filter under which the sample is shortest, and begins the stream. Returns the filter. */
export function beginPixels(at: usize): usize {
  filter = NONE;
  let fewest = sampledBits(NONE);
  for (let type = SUB; type <= PAETH; type++) {
    if (type === AVERAGE) continue;
    const bits = sampledBits(type);
    if (bits >= fewest) continue;
    fewest = bits;
    filter = type;
  }
  beginZlib(at);
  return filter;
}

function sampledBits(type: usize): usize {
  return leastBits(sampleOf(type), sampleOf(type) + sampled);
}

/** Appends rows: as many as LARGEST_BLOCK holds filtered, or one. */
export function putRows(planes: usize, step: usize, rows: usize, isLast: bool): void {
  let out = block;
  for (let y: usize = 0; y < rows; y++) {
    fillRow(row, planes + y * planeRowBytes(), step, planeRowBytes(), channels);
    fillFilteredRow(out, row, above, rowBytes, channels * sampleBytes, filter);
    out += rowBytes + 1;
    swapRows();
  }
  putZlib(block, block, out, ANY, isLast);
}

/** Ends the stream. Returns the address behind it. */
export function endPixels(): usize {
  return endZlib();
}

function planeRowBytes(): usize {
  return width * sampleBytes;
}

function swapRows(): void {
  const swapped = above;
  above = row;
  row = swapped;
}
