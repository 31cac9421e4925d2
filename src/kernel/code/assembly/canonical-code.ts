import { LANE_COUNTS, LENGTH_COUNTS } from './workspace';

/** Bits of a packed code that hold its length; the code stands above them, in the order in which it is written. */
export const LENGTH_BITS: u32 = 7;
export const LENGTH_MASK: u32 = 127;
/** The longest code, so that a pair of codes with its length still fits 32 bits, and four codes one 64-bit word. */
export const LONGEST_CODE: usize = 12;

/** u32[256]: 2^length of each code. The counts of bytes have been added up by then. */
const POWERS: usize = LANE_COUNTS;

/**
 * The canonical code of some lengths: codes of one length are consecutive, in the order of their symbols, and begin
 * behind the shorter ones.
 * Source: RFC 1951, section 3.2.2. A code's bits are written from its highest on, into bytes from their lowest on, so
 * it is stored reversed.
 *
 * A packed code is `reversed code << 7 | length`. Shifting a 64-bit word by a packed code shifts it by the length, for
 * the count of a shift is taken modulo 64; and lengths add up when packed codes are added.
 *
 * @param codes receives u32[symbols], packed
 * @param lengths u8[symbols], each at most 15, of a prefix code
 */
export function fillCanonicalCode(codes: usize, lengths: usize, symbols: usize): void {
  memory.fill(LENGTH_COUNTS, 0, 4 * 64);
  for (let s: usize = 0; s < symbols; s++) {
    const place = LENGTH_COUNTS + ((<usize>load<u8>(lengths + s)) << 2);
    store<u32>(place, load<u32>(place) + 1);
  }
  store<u32>(LENGTH_COUNTS, 0);
  // Counts become the first code of each length.
  let first: u32 = 0;
  let shorter: u32 = 0;
  for (let length: usize = 1; length <= 15; length++) {
    const place = LENGTH_COUNTS + (length << 2);
    first = (first + shorter) << 1;
    shorter = load<u32>(place);
    store<u32>(place, first);
  }
  for (let s: usize = 0; s < symbols; s++) {
    const length = <u32>load<u8>(lengths + s);
    const place = LENGTH_COUNTS + (length << 2);
    const code = load<u32>(place);
    store<u32>(place, code + 1);
    store<u32>(codes + ((<usize>s) << 2), ((reversed16(code) >> (16 - length)) << LENGTH_BITS) | length);
  }
}

/** The low 16 bits in reverse order. */
function reversed16(bits: u32): u32 {
  let r = ((bits & 0x5555) << 1) | ((bits >> 1) & 0x5555);
  r = ((r & 0x3333) << 2) | ((r >> 2) & 0x3333);
  r = ((r & 0x0f0f) << 4) | ((r >> 4) & 0x0f0f);
  return ((r & 0x00ff) << 8) | (r >> 8);
}

/**
 * The codes of all pairs of bytes, one behind the other: `pairs[second << 8 | first]`, packed as single ones are.
 * The second code is multiplied by 2^(length of the first) in place of a shift, which SIMD has only by one count for
 * all lanes.
 *
 * @param pairs receives u32[65536]
 * @param codes u32[256], packed, none longer than LONGEST_CODE
 */
export function fillPairCodes(pairs: usize, codes: usize): void {
  for (let first: usize = 0; first < 1024; first += 4) {
    store<u32>(POWERS + first, 1 << load<u32>(codes + first));
  }
  let out = pairs;
  for (let second: usize = 0; second < 1024; second += 4) {
    const packed = load<u32>(codes + second);
    const code = i32x4.splat(packed & ~LENGTH_MASK);
    const length = i32x4.splat(packed & LENGTH_MASK);
    for (let first: usize = 0; first < 1024; first += 16, out += 16) {
      const shifted = i32x4.mul(code, v128.load(POWERS + first));
      v128.store(out, i32x4.add(i32x4.add(v128.load(codes + first), length), shifted));
    }
  }
}
