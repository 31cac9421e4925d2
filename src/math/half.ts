/**
 * IEEE 754 binary16 ("half") numbers as their bits: 1 sign, 5 exponent (bias 15), 10 fraction bits.
 *
 * Rounding goes from the float64 straight to 11 significant bits. Going through float32 rounds twice and is wrong next
 * to midpoints: 1 + 2^-11 + 2^-30 becomes 1 instead of 1 + 2^-10.
 */

/** float64 exponent bias minus binary16 exponent bias, in the place of the exponent once the fraction has 10 bits. */
const REBIAS = (1023 - 15) << 10;
const INFINITY_BITS = 0x7c00;
const QUIET_NAN_BITS = 0x7e00;
/** Upper word of 65520, the midpoint between the largest half (65504) and 65536: from here on halves overflow. */
const OVERFLOW_WORD = 0x40effe00;
/** Upper word of 2^-14, the least normal half. */
const LEAST_NORMAL_WORD = 0x3f100000;
/** Upper word of 2^-25, half of the least subnormal: exactly this ties to even, to 0. */
const HALF_LEAST_WORD = 0x3e600000;

const scratch = new Float64Array(1);
const scratchWords = new Uint32Array(scratch.buffer);
/** Which of the two words of a float64 in memory holds sign and exponent: 1 on little-endian machines. */
const UPPER: number = wordOfSign();

function wordOfSign(): number {
  scratch[0] = -0;
  return scratchWords[1] === 0 ? 0 : 1;
}

/**
 * The binary16 nearest to a number, ties to even.
 *
 * Subnormal halves are kept, magnitudes from 65520 up become infinite, NaN becomes the quiet NaN 0x7e00, and the sign
 * of zero stays.
 *
 * Source: IEEE 754-2019, 4.3.1 (roundTiesToEven); formats in 3.4.
 * @param value any float64
 * @returns 16 bits, 0..65535
 *
 * Exact: half.test.ts tries every half, every midpoint between two halves and the float64 neighbours of each.
 */
export function halfFromNumber(value: number): number {
  scratch[0] = value;
  return halfFromWords(scratchWords[UPPER], scratchWords[1 - UPPER]);
}

function halfFromWords(upper: number, lower: number): number {
  const sign = (upper >>> 16) & 0x8000;
  // The lower word matters only by being zero or not, and its place is far below the bit that decides the rounding.
  const word = (upper & 0x7fffffff) | (lower === 0 ? 0 : 1);
  if (word >= LEAST_NORMAL_WORD) {
    if (word >= OVERFLOW_WORD) return sign | (word > 0x7ff00000 ? QUIET_NAN_BITS : INFINITY_BITS);
    // Adding just under half a step, or exactly half when the result would be odd, carries where rounding goes up;
    // a carry out of the fraction raises the exponent, as it should.
    const odd = (word >>> 10) & 1;
    return sign | (((word + 0x1ff + odd) >>> 10) - REBIAS);
  }
  if (word <= HALF_LEAST_WORD) return sign;
  // Subnormal: the significand, 1.f with 20 fraction bits, counted in steps of 2^-24.
  const significand = (word & 0xfffff) | 0x100000;
  const shift = 20 - 24 + 1023 - (word >>> 20);
  const odd = (significand >>> shift) & 1;
  return sign | ((significand + (1 << (shift - 1)) - 1 + odd) >>> shift);
}

/**
 * The number a half stands for, exactly.
 *
 *     (-1)^s 2^(e-15) (1 + f/1024), or (-1)^s 2^-24 f for e = 0
 *
 * Source: IEEE 754-2019, 3.4.
 * @param bits 16 bits, 0..65535
 */
export function numberFromHalf(bits: number): number {
  return NUMBERS[bits & 0xffff];
}

/** The number of each of the 65536 halves: 256 kB that every decoder shares. float32 holds each exactly. */
const NUMBERS: Float32Array = numbersOfHalves();

function numbersOfHalves(): Float32Array {
  const numbers = new Float32Array(0x10000);
  for (let bits = 0; bits < 0x8000; bits++) {
    const e = bits >>> 10;
    const f = bits & 0x3ff;
    let magnitude: number;
    if (e === 0) magnitude = f * 2 ** -24;
    else if (e < 31) magnitude = 2 ** (e - 15) * (1 + f / 1024);
    else magnitude = f === 0 ? Infinity : NaN;
    numbers[bits] = magnitude;
    numbers[bits | 0x8000] = -magnitude;
  }
  return numbers;
}

/**
 * Rounds each number to a half as `halfFromNumber` does.
 * @param out halves as bits, `values.length` of them or more; the caller's
 * @param values float64 or float32, read only
 */
export function fillHalf(out: Uint16Array, values: Float64Array | Float32Array): void {
  const n = values.length;
  if (values instanceof Float64Array) {
    const words = new Uint32Array(values.buffer, values.byteOffset, 2 * n);
    for (let i = 0; i < n; i++) out[i] = halfFromWords(words[2 * i + UPPER], words[2 * i + 1 - UPPER]);
    return;
  }
  for (let i = 0; i < n; i++) out[i] = halfFromNumber(values[i]);
}

/**
 * The number of each half, exactly.
 * @param out `halves.length` numbers or more; the caller's
 * @param halves halves as bits, read only
 */
export function fillFromHalf(out: Float64Array | Float32Array, halves: Uint16Array): void {
  for (let i = 0; i < halves.length; i++) out[i] = NUMBERS[halves[i]];
}

/**
 * The distance between neighbouring halves at a magnitude: what rounding to half costs there (at most half of it).
 *
 *     2^(max(floor(log2 |v|), -14) - 10)
 *
 * @param value any number; its own unit is the result's
 * @returns the step; at a power of two the wider one above it; `Infinity` beyond the largest half, NaN for NaN
 */
export function halfStep(value: number): number {
  scratch[0] = value;
  const word = scratchWords[UPPER] & 0x7fffffff;
  if (Number.isNaN(value)) return NaN;
  if (Math.abs(value) >= 65536) return Infinity;
  const exponent = Math.max((word >>> 20) - 1023, -14);
  return 2 ** (exponent - 10);
}
