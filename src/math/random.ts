/**
 * Counter-based random numbers: a number is a function of (counter, key) and nothing else, so any order of evaluation,
 * on any number of threads, gives the same numbers.
 *
 * Contributor notes: the high half of a 32 x 32 bit product is put together from four 16-bit products in int32
 * arithmetic. It never leaves int32, where exact products in doubles need a division and a floor each; BigInt is some
 * fifty times slower.
 */

/** Four 32-bit words, 0 .. 2^32 - 1 each (any integer is taken modulo 2^32). */
export type Counter = readonly [number, number, number, number];

/** Two 32-bit words, 0 .. 2^32 - 1 each. */
export type Key = readonly [number, number];

const MULTIPLIER_0 = 0xd2511f53;
const MULTIPLIER_1 = 0xcd9e8d57;
// Golden ratio and sqrt(3) - 1, as 32-bit fractions: the Weyl sequence of the round keys.
const WEYL_0 = 0x9e3779b9;
const WEYL_1 = 0xbb67ae85;
const ROUNDS = 10;

const TWO_PI = 2 * Math.PI;
const TWO_TO_MINUS_53 = 2 ** -53;

/**
 * The Philox 4x32-10 bijection: four random 32-bit words of a counter and a key.
 * Source: Salmon et al. 2011. Check: the known-answer vectors of its reference distribution,
 * test/published/random.test.ts.
 *
 * @param out Uint32Array of 4, written; owned by the caller
 */
export function philox4x32(counter: Counter, key: Key, out: Uint32Array): void {
  let c0 = counter[0] | 0;
  let c1 = counter[1] | 0;
  let c2 = counter[2] | 0;
  let c3 = counter[3] | 0;
  let k0 = key[0] | 0;
  let k1 = key[1] | 0;
  for (let round = 0; round < ROUNDS; round += 1) {
    const high0 = productHigh(MULTIPLIER_0, c0);
    const low0 = Math.imul(MULTIPLIER_0, c0);
    const high1 = productHigh(MULTIPLIER_1, c2);
    const low1 = Math.imul(MULTIPLIER_1, c2);
    c0 = high1 ^ c1 ^ k0;
    c1 = low1;
    c2 = high0 ^ c3 ^ k1;
    c3 = low0;
    k0 = (k0 + WEYL_0) | 0;
    k1 = (k1 + WEYL_1) | 0;
  }
  out[0] = c0;
  out[1] = c1;
  out[2] = c2;
  out[3] = c3;
}

const words = new Uint32Array(4);

/**
 * Two independent standard normal numbers, from two 53-bit uniforms of one Philox block.
 *
 *     r = sqrt(-2 ln u), u in (0, 1];  out = r cos(2 pi v), r sin(2 pi v)
 *
 * Source: Box & Muller 1958. Range: |out| <= 8.58. Check: moments and distribution, test/unit/math/random.test.ts.
 *
 * @param out Float64Array of 2, written; owned by the caller
 */
export function fillGaussianPair(out: Float64Array, counter: Counter, key: Key): void {
  philox4x32(counter, key, words);
  // u = 0 has no logarithm: count from the upper end.
  const r = Math.sqrt(-2 * Math.log(1 - fraction53(words[0], words[1])));
  const angle = TWO_PI * fraction53(words[2], words[3]);
  out[0] = r * Math.cos(angle);
  out[1] = r * Math.sin(angle);
}

/** A uniform number in [0, 1), a multiple of 2^-53. */
export function uniform(counter: Counter, key: Key): number {
  philox4x32(counter, key, words);
  return fraction53(words[0], words[1]);
}

/**
 * A 32-bit key word of a name: the FNV-1a hash of its UTF-8 bytes.
 * Source: Fowler, Noll & Vo (from memory). Check: its published vectors, test/published/random.test.ts.
 *
 * @returns 0 .. 2^32 - 1
 */
export function key32(text: string): number {
  let hash = 0x811c9dc5;
  for (const byte of new TextEncoder().encode(text)) hash = Math.imul(hash ^ byte, 0x01000193);
  return hash >>> 0;
}

/** Bits 32 .. 63 of the product of two unsigned 32-bit words, as an int32. */
function productHigh(a: number, b: number): number {
  const aHigh = a >>> 16;
  const aLow = a & 0xffff;
  const bHigh = b >>> 16;
  const bLow = b & 0xffff;
  const lowLow = Math.imul(aLow, bLow);
  const highLow = Math.imul(aHigh, bLow);
  const lowHigh = Math.imul(aLow, bHigh);
  const carry = ((lowLow >>> 16) + (highLow & 0xffff) + (lowHigh & 0xffff)) >>> 16;
  return (Math.imul(aHigh, bHigh) + (highLow >>> 16) + (lowHigh >>> 16) + carry) | 0;
}

function fraction53(high: number, low: number): number {
  return ((high >>> 5) * 0x4000000 + (low >>> 6)) * TWO_TO_MINUS_53;
}
