import { alignToByte, bitCursor, markBits, putBits, putBytes, putCode, rewindBits } from './bit-writer';
import { preparedHeaderBits, putHeader } from './block-header';
import { beginByteCounts, countBytes, endByteCounts } from './byte-counts';
import { fillCanonicalCode, fillPairCodes, LONGEST_CODE } from './canonical-code';
import { fillCodeLengths } from './code-lengths';
import { beginMatches, findMatches } from './matches';
import { findRuns } from './runs';
import { addSequence, beginSequences, countSequences, literalsOf } from './sequences';
import { putPairs, putSequences, putShortPairs } from './symbol-writer';
import {
  DISTANCE_CODES,
  DISTANCE_COUNTS,
  DISTANCE_LENGTHS,
  DISTANCE_SYMBOLS,
  END_OF_BLOCK,
  LARGEST_BLOCK,
  LITERAL_CODES,
  LITERAL_COUNTS,
  LITERAL_LENGTHS,
  LITERAL_SYMBOLS,
  MATCH_SEQUENCES,
  PAIR_CODES,
  RUN_SEQUENCES,
  SAVED_LENGTHS,
  SEARCHED_BLOCK,
  SPARE_LENGTHS,
} from './workspace';

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

/** Bytes of literals from which on a table of pairs pays for itself, and from which on a quarter is counted for all. */
const MANY_LITERALS: usize = 0x10000;

/** Bytes in the largest block for which the fixed codes are considered: their header is shorter by at most 160 bytes. */
const LARGEST_FIXED: usize = 1024;

/** Whether the codes made last are the fixed ones. */
let fixed: bool = false;

let savedBits: usize = 0;

/** Forgets what searches have saved. */
export function beginSearches(): void {
  savedBits = 0;
}

/** Bits that searches have saved since. */
export function bitsSaved(): usize {
  return savedBits;
}

/** Bytes of the smallest block of which a quarter tells whether it is noise. */
const SMALLEST_NOISE: usize = 0x2000;

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

/** Appends one block, in whichever way is shortest. */
function putBlock(start: usize, from: usize, to: usize, kind: usize, isLast: bool): void {
  if (kind === PERHAPS_NOISE && isNoise(from, to)) {
    putStored(from, to, isLast);
    return;
  }
  let sequences = RUN_SEQUENCES;
  let bits = blockBits(from, to);
  if (kind >= REPETITIVE) {
    const runsFixed = fixed;
    memory.copy(SAVED_LENGTHS, LITERAL_LENGTHS, 320);
    findMatches(start, from, to, kind === REPETITIVE_PAIRS);
    const searchedBits = codedBits(countSequences(MATCH_SEQUENCES, from), to - from);
    if (searchedBits < bits) {
      savedBits += bits - searchedBits;
      bits = searchedBits;
      sequences = MATCH_SEQUENCES;
    } else {
      fixed = runsFixed;
      memory.copy(LITERAL_LENGTHS, SAVED_LENGTHS, 320);
      preparedHeaderBits();
    }
  }
  const plainBits = storedBits(to - from);
  if (bits >= plainBits) {
    putStored(from, to, isLast);
    return;
  }
  markBits();
  const begin = bitCursor();
  if (fixed) putBits((isLast ? 1 : 0) | (1 << 1), 3);
  else putHeader(isLast);
  putSymbols(sequences, from, bits);
  // Counts of a part can be wrong about the whole; the block is then taken back.
  if ((bitCursor() - begin) << 3 > plainBits) {
    rewindBits();
    putStored(from, to, isLast);
  }
}

/**
 * Whether a quarter of the bytes looks evenly spread, so that codes could save half a percent at most.
 *
 * The sum of c (c - 1) over the counts c of n bytes is n (n - 1) times the chance that two of them are equal: 1/256 for
 * noise. At 1.03/256 the collision entropy, and so the entropy, is above 7.957 bits. One standard deviation of the sum
 * is 1.1 % for 2048 bytes and falls as 1 / n.
 */
function isNoise(from: usize, to: usize): bool {
  if (to - from < SMALLEST_NOISE) return false;
  const n = <u64>((to - from) >> 2);
  beginByteCounts();
  countBytes(from, from + <usize>n);
  endByteCounts(1);
  let coincidences: u64 = 0;
  for (let s: usize = 0; s < 1024; s += 4) {
    const count = <u64>load<u32>(LITERAL_COUNTS + s);
    coincidences += count * (count - 1);
  }
  return coincidences * 25600 < n * (n - 1) * 103;
}

/** Bits that a block of these bytes would take, in whichever way is shortest. */
export function leastBits(from: usize, to: usize): usize {
  return min(blockBits(from, to), storedBits(to - from));
}

/**
 * Finds the runs of a block and makes codes for it.
 * @returns bits that the block will take; close, where only a part was counted
 */
function blockBits(from: usize, to: usize): usize {
  const bytes = to - from;
  const repeated = findRuns(from, to);
  if (repeated * BYTES_PER_RUN_BYTE >= bytes) return codedBits(countSequences(RUN_SEQUENCES, from), bytes);
  beginSequences(RUN_SEQUENCES);
  addSequence(bytes, 0, 0);
  if (bytes < MANY_LITERALS) return codedBits(countSequences(RUN_SEQUENCES, from), bytes);
  countMany(from, to);
  return codedBits(0, bytes);
}

/**
 * Counts a long block of literals. A quarter of the bytes is enough where all 256 occur in it, as the low bytes of
 * 16-bit samples see to: the codes become 0.1 % longer. Where some are missing the rest is counted too, for every byte
 * needs a code, and codes for bytes that never come would cost more (they made normals 3 % larger).
 */
function countMany(from: usize, to: usize): void {
  const quarter = (to - from) >> 2;
  memory.fill(LITERAL_COUNTS + 1024, 0, 4 * 32);
  memory.fill(DISTANCE_COUNTS, 0, 4 * 32);
  store<u32>(LITERAL_COUNTS + 4 * END_OF_BLOCK, 1);
  beginByteCounts();
  for (let part: usize = 0; part < 4; part++) {
    countBytes(from + part * quarter, from + part * quarter + (quarter >> 2));
  }
  endByteCounts(4);
  if (everyByteOccurs()) return;
  for (let part: usize = 0; part < 4; part++) {
    const end = part < 3 ? from + part * quarter + quarter : to;
    countBytes(from + part * quarter + (quarter >> 2), end);
  }
  endByteCounts(1);
}

function everyByteOccurs(): bool {
  let present: u32 = 1;
  for (let s: usize = 0; s < 1024; s += 4) present &= load<u32>(LITERAL_COUNTS + s) > 0 ? 1 : 0;
  return present === 1;
}

/**
 * Makes codes for the counts: the best there are, or those of a fixed block where these cost less with their header.
 * @returns bits of the block
 */
function codedBits(extraBits: usize, bytes: usize): usize {
  // Two distance codes at least, as other encoders write: a reader may refuse fewer.
  for (let s: usize = 0; s < 8; s += 4) {
    if (load<u32>(DISTANCE_COUNTS + s) === 0) store<u32>(DISTANCE_COUNTS + s, 1);
  }
  fillCodeLengths(LITERAL_LENGTHS, LITERAL_COUNTS, LITERAL_SYMBOLS, LONGEST_CODE);
  fillCodeLengths(DISTANCE_LENGTHS, DISTANCE_COUNTS, DISTANCE_SYMBOLS, LONGEST_CODE);
  const dynamicBits = preparedHeaderBits() + extraBits + symbolBits();
  fixed = false;
  if (bytes > LARGEST_FIXED) return dynamicBits;

  memory.copy(SPARE_LENGTHS, LITERAL_LENGTHS, 320);
  fillFixedLengths();
  const fixedBits = <usize>3 + extraBits + symbolBits();
  fixed = fixedBits < dynamicBits;
  if (!fixed) memory.copy(LITERAL_LENGTHS, SPARE_LENGTHS, 320);
  return fixed ? fixedBits : dynamicBits;
}

/** Source: RFC 1951, section 3.2.6. */
function fillFixedLengths(): void {
  memory.fill(LITERAL_LENGTHS, 8, 144);
  memory.fill(LITERAL_LENGTHS + 144, 9, 112);
  memory.fill(LITERAL_LENGTHS + 256, 7, 24);
  memory.fill(LITERAL_LENGTHS + 280, 8, 8);
  memory.fill(DISTANCE_LENGTHS, 5, DISTANCE_SYMBOLS);
}

/** Bits of all symbols that were counted. */
function symbolBits(): usize {
  let bits: usize = 0;
  for (let s: usize = 0; s < LITERAL_SYMBOLS; s++) {
    bits += load<u32>(LITERAL_COUNTS + (s << 2)) * load<u8>(LITERAL_LENGTHS + s);
  }
  for (let s: usize = 0; s < DISTANCE_SYMBOLS; s++) {
    bits += load<u32>(DISTANCE_COUNTS + (s << 2)) * load<u8>(DISTANCE_LENGTHS + s);
  }
  return bits;
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

/** Writes the symbols of a block by the codes made last. */
function putSymbols(sequences: usize, from: usize, bits: usize): void {
  fillCanonicalCode(LITERAL_CODES, LITERAL_LENGTHS, LITERAL_SYMBOLS);
  fillCanonicalCode(DISTANCE_CODES, DISTANCE_LENGTHS, DISTANCE_SYMBOLS);
  const literals = literalsOf(sequences);
  if (literals < MANY_LITERALS) {
    putSequences(sequences, from);
  } else {
    fillPairCodes(PAIR_CODES, LITERAL_CODES);
    if (bits < 5 * literals) putShortPairs(from, from + literals);
    else putPairs(from, from + literals);
  }
  putCode(load<u32>(LITERAL_CODES + 4 * END_OF_BLOCK));
}
