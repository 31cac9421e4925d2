import {
  statisticsClipped,
  statisticsFaults,
  statisticsMax,
  statisticsMin,
  statisticsSquares,
  statisticsSum,
} from './layout';

/*
 * Values become samples, and the statistics of what was stored are taken in the same pass.
 *
 * Statistics are vectors in memory, updated by every call: the host starts them, reads them and adds their lanes. Sums of
 * codes are whole numbers counted from the middle code, exact in any order; sums of halves and floats are float64 in two
 * lanes, in the order of the values: the same on every machine.
 *
 * Loops are `do ... while`: V8 moves constants out of such a loop, and builds them anew in every turn of any other
 * (codes took 1.7 ns a value in a `for`, 0.7 ns in this). A value is at fault where v - v is not 0.
 */

/** 1.5 x 2^23: added to a float32 within 2^22 of 0 it leaves the nearest whole number, ties to even, in the low bits. */
const WHOLE: f32 = 12582912;
/** Bits of WHOLE. */
const WHOLE_BITS: i32 = 0x4b400000;

/**
 * Stores codes of 8 or 16 bits, each in two bytes.
 *
 *     code = nearest whole number to value * gain + offset, clamped to 0 .. largest
 *
 * Rounding through WHOLE is one operation; `trunc_sat` takes seven on x86. Whole numbers beyond 16 bits are clamped by
 * the narrowing, however large: float32 bits grow with the number.
 *
 * @param out `count` codes
 * @param values `count` values; a multiple of 8, at most 2^16
 * @param offsets one vector, with `offsetStep` 0; or `count` offsets, with 16
 * @param largest largest code, 255 or 65535; others are clamped and counted
 * @param statistics sums of code - (largest + 1) / 2 and of its square (i64), least and largest code (u16), clipped
 *   (u32), and anything but zero where a value was not finite
 */
export function storeCodes(
  out: usize,
  values: usize,
  count: usize,
  gain: f32,
  offsets: usize,
  offsetStep: usize,
  largest: i32,
  statistics: usize,
): void {
  const g = f32x4.splat(gain);
  const whole = f32x4.splat(WHOLE);
  const wholeBits = i32x4.splat(WHOLE_BITS);
  const beyond = i32x4.splat(~largest);
  const zero = i32x4.splat(0);
  const lowHalf = i32x4.splat(0xffff);
  const top = i16x8.splat(<i16>largest);
  const middle = i16x8.splat(<i16>((largest + 1) >> 1));
  let least = v128.load(statistics, statisticsMin);
  let most = v128.load(statistics, statisticsMax);
  let faults = v128.load(statistics, statisticsFaults);
  let within = zero;
  let sum = zero;
  let squaresLow = zero;
  let squaresHigh = zero;
  const end = values + (count << 2);
  do {
    const v0 = v128.load(values);
    const v1 = v128.load(values, 16);
    const x0 = f32x4.add(f32x4.mul(v0, g), v128.load(offsets));
    const x1 = f32x4.add(f32x4.mul(v1, g), v128.load(offsets + offsetStep));
    faults = v128.or(faults, v128.or(f32x4.sub(v0, v0), f32x4.sub(v1, v1)));
    const n0 = i32x4.sub(f32x4.add(x0, whole), wholeBits);
    const n1 = i32x4.sub(f32x4.add(x1, whole), wholeBits);
    within = i32x4.add(within, i32x4.eq(v128.and(n0, beyond), zero));
    within = i32x4.add(within, i32x4.eq(v128.and(n1, beyond), zero));
    const codes = i16x8.min_u(i16x8.narrow_i32x4_u(n0, n1), top);
    v128.store(out, codes);
    least = i16x8.min_u(least, codes);
    most = i16x8.max_u(most, codes);
    const centred = i16x8.sub(codes, middle);
    sum = i32x4.add(sum, i32x4.extadd_pairwise_i16x8_s(centred));
    const squares = i32x4.dot_i16x8_s(centred, centred);
    squaresLow = i32x4.add(squaresLow, v128.and(squares, lowHalf));
    squaresHigh = i32x4.add(squaresHigh, i32x4.shr_u(squares, 16));
    values += 32;
    offsets += offsetStep << 1;
    out += 16;
  } while (values < end);
  addWide(statistics + statisticsSum, sum, 0);
  addWide(statistics + statisticsSquares, squaresLow, 0);
  addWide(statistics + statisticsSquares, squaresHigh, 16);
  // `within` counts down by one for each code within the range.
  const clipped = i32x4.add(within, i32x4.splat(<i32>(count >> 2)));
  v128.store(statistics, i32x4.add(v128.load(statistics, statisticsClipped), clipped), statisticsClipped);
  v128.store(statistics, least, statisticsMin);
  v128.store(statistics, most, statisticsMax);
  v128.store(statistics, faults, statisticsFaults);
}

/** Adds four 32-bit numbers times 2^shift to two of 64 bits in memory. */
function addWide(to: usize, numbers: v128, shift: i32): void {
  const wide = i64x2.add(i64x2.extend_low_i32x4_s(numbers), i64x2.extend_high_i32x4_s(numbers));
  v128.store(to, i64x2.add(v128.load(to), i64x2.shl(wide, shift)));
}

/** Bits of 65520, from where numbers round to an infinite half; of 2^-14, the least normal half. */
const HALF_OVERFLOW = 0x477ff000;
const LEAST_NORMAL_HALF = 0x38800000;

/**
 * Stores halves, rounded to nearest, ties to even; subnormal halves are kept.
 *
 * Just under half a step, or exactly half where the result would be odd, is added to the bits of a float32; then its low
 * 13 bits go and its exponent moves by 112. A subnormal half counts steps of 2^-24, which is what adding 1/2 leaves in
 * a float32's low bits. Source: IEEE 754-2019, 3.4 and 4.3.1.
 *
 * @param out `count` halves
 * @param values `count` values; a multiple of 4
 * @param statistics sums of the halves' values and of their squares (f64), least and largest (f32), and anything
 *   but zero where a value has no finite half
 */
export function storeHalves(
  out: usize,
  values: usize,
  count: usize,
  gain: f32,
  shift: f32,
  statistics: usize,
): void {
  const g = f32x4.splat(gain);
  const s = f32x4.splat(shift);
  const half = f32x4.splat(0.5);
  let sum = v128.load(statistics, statisticsSum);
  let squares = v128.load(statistics, statisticsSquares);
  let least = v128.load(statistics, statisticsMin);
  let most = v128.load(statistics, statisticsMax);
  let faults = v128.load(statistics, statisticsFaults);
  const end = values + (count << 2);
  do {
    const x = f32x4.add(f32x4.mul(v128.load(values), g), s);
    const magnitude = f32x4.abs(x);
    const sign = v128.xor(x, magnitude);
    faults = v128.or(faults, i32x4.ge_s(magnitude, i32x4.splat(HALF_OVERFLOW)));
    const isSubnormal = i32x4.lt_s(magnitude, i32x4.splat(LEAST_NORMAL_HALF));
    const odd = v128.and(i32x4.shr_u(magnitude, 13), i32x4.splat(1));
    const carried = i32x4.add(magnitude, i32x4.add(odd, i32x4.splat(0xfff)));
    const normal = i32x4.shr_u(i32x4.sub(carried, i32x4.splat(112 << 23)), 13);
    const stepped = f32x4.add(magnitude, half);
    const bits = v128.bitselect(i32x4.sub(stepped, half), normal, isSubnormal);
    const signed = v128.or(bits, i32x4.shr_u(sign, 16));
    v128.store64_lane(out, i16x8.narrow_i32x4_u(signed, signed), 0);
    const kept = v128.and(carried, i32x4.splat(~0x1fff));
    const rounded = v128.or(v128.bitselect(f32x4.sub(stepped, half), kept, isSubnormal), sign);
    const low = f64x2.promote_low_f32x4(rounded);
    const high = f64x2.promote_low_f32x4(v128.shuffle<f64>(rounded, rounded, 1, 0));
    sum = f64x2.add(sum, f64x2.add(low, high));
    squares = f64x2.add(squares, f64x2.add(f64x2.mul(low, low), f64x2.mul(high, high)));
    least = f32x4.pmin(least, rounded);
    most = f32x4.pmax(most, rounded);
    values += 16;
    out += 8;
  } while (values < end);
  v128.store(statistics, sum, statisticsSum);
  v128.store(statistics, squares, statisticsSquares);
  v128.store(statistics, least, statisticsMin);
  v128.store(statistics, most, statisticsMax);
  v128.store(statistics, faults, statisticsFaults);
}

/**
 * Stores floats. Arguments and statistics as for halves.
 *
 * @param out `count` floats
 */
export function storeFloats(
  out: usize,
  values: usize,
  count: usize,
  gain: f32,
  shift: f32,
  statistics: usize,
): void {
  const g = f32x4.splat(gain);
  const s = f32x4.splat(shift);
  let sum = v128.load(statistics, statisticsSum);
  let squares = v128.load(statistics, statisticsSquares);
  let least = v128.load(statistics, statisticsMin);
  let most = v128.load(statistics, statisticsMax);
  let faults = v128.load(statistics, statisticsFaults);
  const end = values + (count << 2);
  do {
    const x = f32x4.add(f32x4.mul(v128.load(values), g), s);
    v128.store(out, x);
    faults = v128.or(faults, f32x4.sub(x, x));
    const low = f64x2.promote_low_f32x4(x);
    const high = f64x2.promote_low_f32x4(v128.shuffle<f64>(x, x, 1, 0));
    sum = f64x2.add(sum, f64x2.add(low, high));
    squares = f64x2.add(squares, f64x2.add(f64x2.mul(low, low), f64x2.mul(high, high)));
    least = f32x4.pmin(least, x);
    most = f32x4.pmax(most, x);
    values += 16;
    out += 16;
  } while (values < end);
  v128.store(statistics, sum, statisticsSum);
  v128.store(statistics, squares, statisticsSquares);
  v128.store(statistics, least, statisticsMin);
  v128.store(statistics, most, statisticsMax);
  v128.store(statistics, faults, statisticsFaults);
}
