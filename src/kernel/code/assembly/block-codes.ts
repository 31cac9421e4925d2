import { putBits } from './bit-writer';
import { preparedHeaderBits, putHeader } from './block-header';
import { fillCanonicalCode, LONGEST_CODE } from './canonical-code';
import { fillCodeLengths } from './code-lengths';
import {
  DISTANCE_CODES,
  DISTANCE_COUNTS,
  DISTANCE_LENGTHS,
  DISTANCE_SYMBOLS,
  KEPT_LENGTHS,
  LITERAL_CODES,
  LITERAL_COUNTS,
  LITERAL_LENGTHS,
  LITERAL_SYMBOLS,
  SPARE_LENGTHS,
} from './workspace';

/*
 * The codes of a block: made for what was counted, weighed against the fixed ones, kept while others are tried.
 */

/** Bytes in the largest block for which the fixed codes are considered: their header is shorter by at most 160 bytes. */
const LARGEST_FIXED: usize = 1024;

/** Bytes of the lengths of both alphabets, which lie one behind the other. */
const LENGTHS_BYTES: usize = 320;

/** Whether the codes are the fixed ones; and those that are kept. */
let fixed: bool = false;
let keptFixed: bool = false;

/**
 * Makes codes for the counts: the best there are, or the fixed ones where these cost less with their header.
 *
 * @param extraBits bits of the block beside its codes
 * @param bytes what the block holds
 * @returns bits of the block
 */
export function codedBits(extraBits: usize, bytes: usize): usize {
  // Two distance codes at least, as other encoders write: a reader may refuse fewer.
  for (let s: usize = 0; s < 8; s += 4) {
    if (load<u32>(DISTANCE_COUNTS + s) === 0) store<u32>(DISTANCE_COUNTS + s, 1);
  }
  fillCodeLengths(LITERAL_LENGTHS, LITERAL_COUNTS, LITERAL_SYMBOLS, LONGEST_CODE);
  fillCodeLengths(DISTANCE_LENGTHS, DISTANCE_COUNTS, DISTANCE_SYMBOLS, LONGEST_CODE);
  const ownBits = preparedHeaderBits() + extraBits + symbolBits();
  fixed = false;
  if (bytes > LARGEST_FIXED) return ownBits;

  memory.copy(SPARE_LENGTHS, LITERAL_LENGTHS, LENGTHS_BYTES);
  fillFixedLengths();
  const fixedBits = <usize>3 + extraBits + symbolBits();
  fixed = fixedBits < ownBits;
  if (fixed) return fixedBits;
  memory.copy(LITERAL_LENGTHS, SPARE_LENGTHS, LENGTHS_BYTES);
  return ownBits;
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

/** Keeps the codes made last while others are tried. */
export function keepCodes(): void {
  keptFixed = fixed;
  memory.copy(KEPT_LENGTHS, LITERAL_LENGTHS, LENGTHS_BYTES);
}

/** Goes back to the codes that were kept. */
export function restoreCodes(): void {
  fixed = keptFixed;
  memory.copy(LITERAL_LENGTHS, KEPT_LENGTHS, LENGTHS_BYTES);
  preparedHeaderBits();
}

/** Begins a block with the codes made last, and readies them for its symbols. */
export function putBlockHead(isLast: bool): void {
  if (fixed) putBits((isLast ? 1 : 0) | (1 << 1), 3);
  else putHeader(isLast);
  fillCanonicalCode(LITERAL_CODES, LITERAL_LENGTHS, LITERAL_SYMBOLS);
  fillCanonicalCode(DISTANCE_CODES, DISTANCE_LENGTHS, DISTANCE_SYMBOLS);
}
