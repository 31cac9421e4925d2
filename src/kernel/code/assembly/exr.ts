import { ANY, beginSearches, bitsSaved, PERHAPS_NOISE, REPETITIVE, REPETITIVE_PAIRS } from './deflate';
import { beginZlib, endZlib, putZlib } from './zlib-stream';

/*
 * One block of OpenEXR's ZIP compression: the bytes of the samples split into even and odd, each byte replaced by its
 * difference from the one before, then zlib.
 *
 * A sample has two or four bytes, so a block is a row of little-endian 16-bit words, the even bytes their low halves
 * and the odd ones their high halves. Low halves are noise; what can be won is in the high ones. So the halves become
 * blocks of their own, and only the high one is searched for matches: percent of raw at 512 x 512, half floats,
 *
 *                            zlib 6   literals and runs   high half searched
 *     displacement c0 / c1   67.8 / 79.4     66.3 / 78.6       65.9 / 77.2
 *     slope        c0 / c1   78.2 / 81.0     78.6 / 81.7       78.0 / 80.9
 */

/** Bytes up to which a block is not worth two headers. */
const SMALL: usize = 2048;

/**
 * The search takes twice the time of all else together, so it goes on in an image only while it has saved this part of
 * what was written: 1 in so many.
 */
const LEAST_SAVED: u64 = 57;

let searching: bool = true;
let savedBits: u64 = 0;
let writtenBits: u64 = 0;

/** Begins an image. */
export function beginExr(): void {
  searching = true;
  savedBits = 0;
  writtenBits = 0;
}

/** Room for whole vectors behind each part of the scratch memory. */
const MARGIN: usize = 64;

/** Bytes of memory that a block needs beside its samples and its stream. */
export function exrScratchBytes(bytes: usize): usize {
  return 2 * (bytes + 2 * MARGIN);
}

/**
 * Writes a block.
 *
 * @param out receives the stream; room for twice the block and 1 KiB
 * @param planes the block's rows in the plane of the first channel of the file
 * @param step bytes from one plane to the next
 * @param rowBytes bytes of a row of one plane
 * @param scratch exrScratchBytes of the whole block
 * @returns bytes written; the block as it is, where compression does not make it smaller
 */
export function putExrBlock(
  out: usize,
  planes: usize,
  step: usize,
  channels: usize,
  rowBytes: usize,
  rows: usize,
  inPairs: bool,
  scratch: usize,
): usize {
  const bytes = rowBytes * channels * rows;
  const half = bytes >> 1;
  const low = scratch;
  const high = low + half + MARGIN;
  const differences = high + half + MARGIN;

  let o: usize = 0;
  for (let y: usize = 0; y < rows; y++) {
    for (let c: usize = 0; c < channels; c++) {
      splitWords(low + o, high + o, planes + c * step + y * rowBytes, rowBytes >> 1);
      o += rowBytes >> 1;
    }
  }
  // Differences from 128 keep the first byte as it is.
  fillDifferences(differences, low, half, 128);
  fillDifferences(differences + half, high, half, load<u8>(low + half - 1));

  beginZlib(out);
  beginSearches();
  if (bytes <= SMALL) {
    putZlib(differences, differences, differences + bytes, REPETITIVE, true);
  } else {
    const repetitive = inPairs ? REPETITIVE_PAIRS : REPETITIVE;
    putZlib(differences, differences, differences + half, PERHAPS_NOISE, false);
    putZlib(differences, differences + half, differences + bytes, searching ? repetitive : ANY, true);
  }
  const length = endZlib() - out;
  savedBits += bitsSaved();
  writtenBits += (<u64>length) << 3;
  if (savedBits * LEAST_SAVED < writtenBits) searching = false;
  if (length < bytes) return length;
  putPlain(out, planes, step, channels, rowBytes, rows);
  return bytes;
}

/** The low and the high bytes of some words; writes up to 15 bytes behind each, and reads up to 31 behind the words. */
function splitWords(low: usize, high: usize, words: usize, count: usize): void {
  const lowMask = i16x8.splat(0xff);
  const end = low + count;
  for (; low < end; low += 16, high += 16, words += 32) {
    const first = v128.load(words);
    const second = v128.load(words, 16);
    v128.store(low, i8x16.narrow_i16x8_u(v128.and(first, lowMask), v128.and(second, lowMask)));
    v128.store(high, i8x16.narrow_i16x8_u(i16x8.shr_u(first, 8), i16x8.shr_u(second, 8)));
  }
}

/** Each byte less the one before it, plus 128; writes up to 15 bytes behind. */
function fillDifferences(out: usize, bytes: usize, count: usize, previous: u8): void {
  const middle = i8x16.splat(-128);
  const end = bytes + count;
  const first = load<u8>(bytes) - previous + 128;
  const begin = out;
  for (; bytes < end; bytes += 16, out += 16) {
    v128.store(out, i8x16.add(i8x16.sub(v128.load(bytes), v128.load(bytes - 1)), middle));
  }
  store<u8>(begin, first);
}

function putPlain(
  out: usize,
  planes: usize,
  step: usize,
  channels: usize,
  rowBytes: usize,
  rows: usize,
): void {
  for (let y: usize = 0; y < rows; y++) {
    for (let c: usize = 0; c < channels; c++, out += rowBytes)
      memory.copy(out, planes + c * step + y * rowBytes, rowBytes);
  }
}
