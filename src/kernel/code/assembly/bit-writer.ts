import { LENGTH_BITS, LENGTH_MASK } from './canonical-code';

/*
 * The stream of bits: first bit lowest in the first byte (RFC 1951, section 3.1.1).
 *
 * Up to 7 bits wait in `bits` between calls. Every flush stores eight bytes and steps over the whole ones of them, so
 * the memory up to 8 bytes behind the stream is overwritten; no branch asks whether there is something to store.
 */

/** Bits that can be appended before a flush, beside the 7 that may wait. */
export const MOST_BITS: u64 = 56;

let bits: u64 = 0;
let bitCount: u64 = 0;
let cursor: usize = 0;

/** Begins a stream at an address. */
export function beginBits(at: usize): void {
  bits = 0;
  bitCount = 0;
  cursor = at;
}

/** Where the next whole byte goes. */
export function bitCursor(): usize {
  return cursor;
}

/** The bits that wait, and how many. */
export function waitingBits(): u64 {
  return bits;
}
export function waitingCount(): u64 {
  return bitCount;
}

/** Goes on where a loop that kept all three in registers has come to. */
export function resumeBits(waiting: u64, count: u64, at: usize): void {
  bits = waiting;
  bitCount = count;
  cursor = at;
}

let markedBits: u64 = 0;
let markedCount: u64 = 0;
let markedCursor: usize = 0;

/** Remembers the end of the stream. */
export function markBits(): void {
  markedBits = bits;
  markedCount = bitCount;
  markedCursor = cursor;
}

/** Takes back what was appended since it was remembered. */
export function rewindBits(): void {
  bits = markedBits;
  bitCount = markedCount;
  cursor = markedCursor;
}

/** Appends the lowest `count` bits of a value that has no others; at most MOST_BITS. */
export function putBits(value: u64, count: u64): void {
  bits |= value << bitCount;
  bitCount += count;
  store<u64>(cursor, bits);
  cursor += <usize>(bitCount >> 3);
  bits >>= bitCount & 56;
  bitCount &= 7;
}

/** Appends a packed code. */
export function putCode(packed: u32): void {
  putBits(packed >> LENGTH_BITS, packed & LENGTH_MASK);
}

/** Fills the last byte with zeros. */
export function alignToByte(): void {
  if (bitCount > 0) putBits(0, 8 - bitCount);
}

/** Copies whole bytes into an aligned stream. */
export function putBytes(from: usize, length: usize): void {
  memory.copy(cursor, from, length);
  cursor += length;
}
