import { alignToByte, bitCursor, markBits, putBits, putBytes, putCode, rewindBits } from './bit-writer';
import { codedBits, keepCodes, putBlockHead, restoreCodes } from './block-codes';
import { countLongBlock, isNoise } from './byte-counts';
import { fillPairCodes } from './canonical-code';
import { beginMatches, findMatches } from './matches';
import { findRuns } from './runs';
import {
  addSequence,
  beginSequences,
  clearSymbolCounts,
  countSequences,
  lengthOf,
  literalsOf,
} from './sequences';
import { putPairs, putSequences, putShortPairs } from './symbol-writer';
import {
  END_OF_BLOCK,
  LARGEST_BLOCK,
  LITERAL_CODES,
  MATCH_SEQUENCES,
  PAIR_CODES,
  RUN_SEQUENCES,
  SEARCHED_BLOCK,
} from './workspace';

/*
 * DEFLATE for the noise of a sea, in which there is next to nothing to find: codes for single bytes, made anew for each
 * block, runs where they pay, and a search for matches only where the caller says so.
 * Source: RFC 1951.
 *
 * Measured on one core of a Xeon at 2.95 GHz, medians of processor time, MB/s of raw samples and percent of them, whole
 * PNG pixels here (rows, filter, choice of it, codes, checksum) against deflate alone on rows filtered before:
 *
 *                                here        zlib 1      zlib 6     zlib RLE    Huffman only   libdeflate 1
 *     displacement 16 bits   620  85.2    39  ----   37  85.5   109  85.4    111  85.4     xx
 *
 * Tried and lost: see the notes of each file.
 */

/** What bytes are like, and so what is tried on them beside codes of their own and runs. */
export const ANY: usize = 0;
/** Perhaps noise, to be stored at once. */
export const PERHAPS_NOISE: usize = 1;
/** With repeats worth a search; of pairs of bytes, the second of which mostly follows from the first. */
export const REPETITIVE: usize = 2;
export const REPETITIVE_PAIRS: usize = 3;

/** Bytes in the longest stored piece: its length is written in 16 bits. */
const LONGEST_STORED: usize = 0xffff;

/** Where fewer than one byte in this many is in a run, runs are left alone. */
const BYTES_PER_RUN_BYTE: usize = 32;

/** Literals from which on a table of pairs pays for itself, and from which on a part of them is counted for all. */
const MANY_LITERALS: usize = 0x10000;

/** Bits that searches have saved since that was last forgotten. */
let savedBits: usize = 0;

export function beginSearches(): void {
  savedBits = 0;
}

export function bitsSaved(): usize {
  return savedBits;
}

/**
 * Appends some bytes to the stream as blocks of equal size.
 * @param start the first byte of the stream that is still in the memory before `from`
 * @param kind one of the above
 * @param isLast whether the stream ends with them
 */
export function putCompressed(start: usize, from: usize, to: usize, kind: usize, isLast: bool): void {
  const largest = kind >= REPETITIVE ? SEARCHED_BLOCK : LARGEST_BLOCK;
  if (kind >= REPETITIVE) beginMatches();
  const blocks = max<usize>(1, (to - from + largest - 1) / largest);
  for (let left = blocks; left > 0; left--) {
    const end = left === 1 ? to : from + (((to - from) / left) & ~1);
    putBlock(start, from, end, kind, isLast && left === 1);
    from = end;
  }
}

/** Bits that a block of some bytes would take, in whichever way is shortest without a search. */
export function leastBits(from: usize, to: usize): usize {
  return min(runBits(from, to), storedBits(to - from));
}

/** Appends one block, in whichever way is shortest. */
function putBlock(start: usize, from: usize, to: usize, kind: usize, isLast: bool): void {
  if (kind === PERHAPS_NOISE && isNoise(from, to)) {
    putStored(from, to, isLast);
    return;
  }
  let sequences = RUN_SEQUENCES;
  let bits = runBits(from, to);
  if (kind >= REPETITIVE) {
    keepCodes();
    findMatches(start, from, to, kind === REPETITIVE_PAIRS);
    const searchedBits = codedBits(countSequences(MATCH_SEQUENCES, from), to - from);
    if (searchedBits < bits) {
      savedBits += bits - searchedBits;
      bits = searchedBits;
      sequences = MATCH_SEQUENCES;
    } else {
      restoreCodes();
    }
  }
  if (bits >= storedBits(to - from)) putStored(from, to, isLast);
  else putCoded(sequences, from, to, bits, isLast);
}

/**
 * Finds the runs of a block and makes codes for it.
 * @returns bits that the block will take; close, where only a part was counted
 */
function runBits(from: usize, to: usize): usize {
  const bytes = to - from;
  const repeated = findRuns(from, to);
  if (repeated * BYTES_PER_RUN_BYTE < bytes) {
    beginSequences(RUN_SEQUENCES);
    addSequence(bytes, 0, 0);
    if (bytes >= MANY_LITERALS) {
      clearSymbolCounts();
      countLongBlock(from, to);
      return codedBits(0, bytes);
    }
  }
  return codedBits(countSequences(RUN_SEQUENCES, from), bytes);
}

/** Appends a block by the codes made last. */
function putCoded(sequences: usize, from: usize, to: usize, bits: usize, isLast: bool): void {
  markBits();
  const begin = bitCursor();
  putBlockHead(isLast);
  const literals = literalsOf(sequences);
  if (lengthOf(sequences) > 0 || literals < MANY_LITERALS) {
    putSequences(sequences, from);
  } else {
    fillPairCodes(PAIR_CODES, LITERAL_CODES);
    if (bits < 5 * literals) putShortPairs(from, to);
    else putPairs(from, to);
  }
  putCode(load<u32>(LITERAL_CODES + 4 * END_OF_BLOCK));
  // Counts of a part can be wrong about the whole; the block is then taken back.
  if ((bitCursor() - begin) << 3 > storedBits(to - from)) {
    rewindBits();
    putStored(from, to, isLast);
  }
}

function storedBits(bytes: usize): usize {
  const pieces = max<usize>(1, (bytes + LONGEST_STORED - 1) / LONGEST_STORED);
  return (bytes + 5 * pieces) << 3;
}

function putStored(from: usize, to: usize, isLast: bool): void {
  do {
    const bytes = min(to - from, LONGEST_STORED);
    putBits(isLast && from + bytes === to ? 1 : 0, 3);
    alignToByte();
    putBits(bytes | ((bytes ^ 0xffff) << 16), 32);
    putBytes(from, bytes);
    from += bytes;
  } while (from < to);
}
