/*
 * PNG's filters: each byte less a prediction from the bytes of the pixel to the left (a), above (b) and above left (c).
 * Source: PNG (Third Edition), W3C, section 9.
 *
 * Before each row stand 16 zeros, in place of the pixel to the left of the first; above the first row stands one of
 * zeros. Rows are made in whole vectors: up to 15 bytes behind each row are read, and behind `out` written.
 */

export const NONE: usize = 0;
export const SUB: usize = 1;
export const UP: usize = 2;
/** Never the shortest on a sea, and not written. */
export const AVERAGE: usize = 3;
export const PAETH: usize = 4;

/**
 * A filtered row: the filter's type, then the differences.
 *
 * @param out receives 1 + bytes bytes
 * @param pixelBytes bytes of one pixel, at most 8
 */
export function fillFilteredRow(
  out: usize,
  row: usize,
  above: usize,
  bytes: usize,
  pixelBytes: usize,
  filter: usize,
): void {
  store<u8>(out, <u8>filter);
  out++;
  const end = row + bytes;
  switch (filter) {
    case SUB:
      for (; row < end; row += 16, out += 16) {
        v128.store(out, i8x16.sub(v128.load(row), v128.load(row - pixelBytes)));
      }
      break;
    case UP:
      for (; row < end; row += 16, above += 16, out += 16) {
        v128.store(out, i8x16.sub(v128.load(row), v128.load(above)));
      }
      break;
    case PAETH:
      for (; row < end; row += 16, above += 16, out += 16) {
        const a = v128.load(row - pixelBytes);
        const b = v128.load(above);
        const c = v128.load(above - pixelBytes);
        v128.store(out, i8x16.sub(v128.load(row), paethPredictor(a, b, c)));
      }
      break;
    default:
      memory.copy(out, row, bytes);
  }
}

/**
 * Of a, b and c the nearest to p = a + b - c, a before b before c where they are equally near.
 *
 * With low = min(a, b) and high = max(a, b): p is as far from low as c is from high, high - c, and as far from high as
 * c from low, c - low; from c it is the difference of the two. So where c is between them the nearest is low if
 * 2 (high - c) <= c - low, high if 2 (c - low) <= high - c, and c otherwise. Where c is not between, it is high for c
 * below and low for c above, and the same comparisons say so, for differences that stop at 0. Equal distances: low and
 * high are never equally near unless equal, or c is nearer than both.
 */
function paethPredictor(a: v128, b: v128, c: v128): v128 {
  const low = i8x16.min_u(a, b);
  const high = i8x16.max_u(a, b);
  const fromLow = i8x16.sub_sat_u(c, low);
  const toHigh = i8x16.sub_sat_u(high, c);
  const isLow = i8x16.le_u(i8x16.add_sat_u(toHigh, toHigh), fromLow);
  const isHigh = i8x16.le_u(i8x16.add_sat_u(fromLow, fromLow), toHigh);
  return v128.bitselect(low, v128.bitselect(high, c, isHigh), isLow);
}
