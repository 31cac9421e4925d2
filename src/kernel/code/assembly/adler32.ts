/** The largest prime below 2^16. */
const BASE: u32 = 65521;

/** Vectors after which the 16-bit sums of columns could overflow: 257 * 255 is 65535. */
const VECTORS: usize = 256;

/**
 * The checksum of zlib, carried on: a = 1 + the sum of the bytes, b = the sum of all values of a, both modulo 65521.
 * Source: RFC 1950, sections 2.2 and 8.2.
 *
 * For a run of n bytes d[0..n): a' = a + sum of d, b' = b + n a + sum of (n - i) d[i]. With vectors of 16 the last sum
 * is 16 times the sum of what stood before each vector, and 16 - column times the sum of each column.
 *
 * @param checksum 1 for the first bytes, what was returned for those before
 */
export function adler32(checksum: u32, from: usize, to: usize): u32 {
  let a: u32 = checksum & 0xffff;
  let b: u32 = checksum >> 16;
  while (to - from >= 16) {
    const vectors = min((to - from) >> 4, VECTORS);
    let low = i16x8.splat(0);
    let high = i16x8.splat(0);
    let sum = i32x4.splat(0);
    let before = i32x4.splat(0);
    const end = from + (vectors << 4);
    for (; from < end; from += 16) {
      const d = v128.load(from);
      before = i32x4.add(before, sum);
      low = i16x8.add(low, i16x8.extend_low_i8x16_u(d));
      high = i16x8.add(high, i16x8.extend_high_i8x16_u(d));
      sum = i32x4.add(sum, i32x4.extadd_pairwise_i16x8_u(i16x8.extadd_pairwise_i8x16_u(d)));
    }
    const columns = i32x4.add(
      weighted(low, i16x8(16, 15, 14, 13, 12, 11, 10, 9)),
      weighted(high, i16x8(8, 7, 6, 5, 4, 3, 2, 1)),
    );
    const bytes = (<u32>vectors) << 4;
    b = (b + a * bytes + 16 * total(before) + total(columns)) % BASE;
    a = (a + total(sum)) % BASE;
  }
  for (; from < to; from++) {
    a = (a + load<u8>(from)) % BASE;
    b = (b + a) % BASE;
  }
  return (b << 16) | a;
}

/** Products of unsigned 16-bit sums and small weights, added in fours: 32-bit sums of sums. */
function weighted(sums: v128, weights: v128): v128 {
  return i32x4.add(i32x4.extmul_low_i16x8_u(sums, weights), i32x4.extmul_high_i16x8_u(sums, weights));
}

function total(lanes: v128): u32 {
  return (
    i32x4.extract_lane(lanes, 0) +
    i32x4.extract_lane(lanes, 1) +
    i32x4.extract_lane(lanes, 2) +
    i32x4.extract_lane(lanes, 3)
  );
}
