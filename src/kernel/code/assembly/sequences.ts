import { beginByteCounts, countBytes, endByteCounts } from './byte-counts';
import { DISTANCE_COUNTS, END_OF_BLOCK, LITERAL_COUNTS } from './workspace';

/*
 * A block seen as sequences: some bytes as they are ("literals"), then a match, a repeat of earlier bytes; the last
 * sequence has no match. One sequence is one u64: literals | match length << 32 | distance << 48.
 */

let end: usize = 0;

/** Begins a list of sequences at an address. */
export function beginSequences(at: usize): void {
  end = at;
}

/** Appends a sequence; length 0 for no match. */
export function addSequence(literals: usize, length: usize, distance: usize): void {
  store<u64>(end, <u64>literals | ((<u64>length) << 32) | ((<u64>distance) << 48));
  end += 8;
}

/** The parts of the sequence at an address. */
export function literalsOf(sequence: usize): usize {
  return load<u32>(sequence);
}
export function lengthOf(sequence: usize): usize {
  return load<u16>(sequence, 4);
}
export function distanceOf(sequence: usize): usize {
  return load<u16>(sequence, 6);
}

/**
 * Counts the symbols that the sequences of a block need, its end included.
 * @param sequences the list
 * @param from the first byte of the block
 * @returns bits beside the codes: the extra bits of lengths and distances
 */
export function countSequences(sequences: usize, from: usize): usize {
  clearSymbolCounts();
  beginByteCounts();
  let extraBits: usize = 0;
  for (let s = sequences; ; s += 8) {
    const literals = literalsOf(s);
    countBytes(from, from + literals);
    const length = lengthOf(s);
    if (length === 0) break;
    from += literals + length;
    const distance = distanceOf(s);
    increment(LITERAL_COUNTS, lengthSymbol(length));
    increment(DISTANCE_COUNTS, distanceSymbol(distance));
    extraBits += lengthExtraBits(length) + distanceExtraBits(distance);
  }
  endByteCounts(1);
  return extraBits;
}

/** Counts of a block without matches, but for its bytes: one end of block, no lengths, no distances. */
export function clearSymbolCounts(): void {
  memory.fill(LITERAL_COUNTS + 4 * END_OF_BLOCK, 0, 4 * 32);
  memory.fill(DISTANCE_COUNTS, 0, 4 * 32);
  store<u32>(LITERAL_COUNTS + 4 * END_OF_BLOCK, 1);
}

function increment(counts: usize, symbol: usize): void {
  const place = counts + ((<usize>symbol) << 2);
  store<u32>(place, load<u32>(place) + 1);
}

/*
 * Symbols of lengths and distances. Source: RFC 1951, section 3.2.5: beyond the first few, each power of two is cut
 * into four (lengths) or two (distances) equal parts, and the extra bits say where in the part; but the longest length
 * has a symbol of its own.
 */

/** The longest match that can be said. */
export const LONGEST_MATCH: usize = 258;

/** Symbol of a match length of 3..258. */
export function lengthSymbol(length: usize): usize {
  if (length === LONGEST_MATCH) return 285;
  const extra = lengthExtraBits(length);
  return 257 + (extra << 2) + ((length - 3) >> extra);
}

export function lengthExtraBits(length: usize): usize {
  if (length < 11 || length === LONGEST_MATCH) return 0;
  return 29 - clz(length - 3);
}

/** Symbol of a distance of 1..32768. */
export function distanceSymbol(distance: usize): usize {
  const extra = distanceExtraBits(distance);
  return (extra << 1) + ((distance - 1) >> extra);
}

export function distanceExtraBits(distance: usize): usize {
  return distance < 5 ? 0 : 30 - clz(distance - 1);
}
