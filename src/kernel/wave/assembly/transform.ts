import {
  LINE,
  planColumnOrder,
  planColumnTwiddles,
  planQuarter1,
  planQuarter2,
  planQuarter3,
  planRadix,
  planRowOrder,
  planRowOrderEnd,
  planRowTwiddles,
  planSize,
  planWorkRow,
  planWorkRows,
  STRIP_PAD,
  STRIP_ROW,
} from './layout';
import {
  columnFirst4By8,
  columnFirst4By16,
  columnFirst4InnerBy8,
  columnFirst4InnerBy16,
  columnFirst8By8,
  columnFirst8By16,
  columnFirst8InnerBy8,
  columnFirst8InnerBy16,
  columnLastBy8,
  columnLastBy16,
  columnMiddleBy8,
  columnMiddleBy16,
  rowFirst4,
  rowFirst4Inner,
  rowFirst8,
  rowFirst8Inner,
  rowLast,
  rowMiddle,
} from './stages';

/**
 * Transforms one row of a spectrum into a row of the strips.
 *
 * @param plan transform plan
 * @param re, im addresses of the row's N real and imaginary parts, float32
 * @param strips strips of the spectrum
 * @param row its row, 0 .. N - 1
 * @param inner whether the middle half of the row is zero; it is not read
 */
export function transformRow(
  plan: usize,
  re: usize,
  im: usize,
  strips: usize,
  row: usize,
  inner: bool,
): void {
  const N = word(plan, planSize);
  const work = word(plan, planWorkRow);
  const radix = word(plan, planRadix);
  let twiddles = word(plan, planRowTwiddles);
  const apart = (N << 2) / radix;
  if (radix === 4) {
    if (inner) rowFirst4Inner(re, im, work, apart, twiddles);
    else rowFirst4(re, im, work, apart, twiddles);
  } else if (inner) rowFirst8Inner(re, im, work, apart, twiddles);
  else rowFirst8(re, im, work, apart, twiddles);
  twiddles += 2 * apart * (radix - 1);
  for (let L = N / radix; L > 4; L >>= 2) {
    rowMiddle(work, 8 * N, 8 * L, twiddles);
    twiddles += 6 * L;
  }
  rowLast(
    work,
    2 * apart,
    word(plan, planRowOrder),
    word(plan, planRowOrderEnd),
    strips + row * STRIP_ROW,
    N * STRIP_ROW + STRIP_PAD,
    word(plan, planQuarter1),
    word(plan, planQuarter2),
    word(plan, planQuarter3),
  );
}

/**
 * Transforms all columns of the strips and leaves the real and imaginary parts there as two fields.
 *
 * A short column is done in lines of 8 columns, a long one in whole rows of 16. Sub-columns are finished one by one, so
 * that all stages but the first two of a long column run in the first cache.
 *
 * Contributor notes: lines of 256 are 16 kB and stay in the first cache beside the strip they come from, 0.83 of the
 * time of whole rows; at 1024 they take 1.15 times as long, as every second line is asked of a slower memory. Strips of
 * 8 columns scatter a row over twice as many memory pages: 1.2 times slower at 1024. Writing fields as N x N planes,
 * each line in another memory page, takes 1.3 to 1.8 times as long at 1024.
 */
export function transformColumns(plan: usize, strips: usize, inner: bool): void {
  const N = word(plan, planSize);
  const bytes = N * STRIP_ROW + STRIP_PAD;
  for (let strip = strips, end = strips + (N >> 4) * bytes; strip < end; strip += bytes) {
    if (N > LONGEST_BY_8) {
      transformStrip(plan, strip, STRIP_ROW, inner);
    } else {
      transformStrip(plan, strip, LINE, inner);
      transformStrip(plan, strip + LINE, LINE, inner);
    }
  }
}

/** Longest columns that are done in lines. */
const LONGEST_BY_8: usize = 256;

/** Work bytes that the first cache surely holds. */
const CACHED_BYTES: usize = 32768;

/** @param workRow bytes of a work row: a line for 8 columns or a strip's row for 16 */
function transformStrip(plan: usize, strip: usize, workRow: usize, inner: bool): void {
  const N = word(plan, planSize);
  const work = word(plan, planWorkRows);
  const radix = word(plan, planRadix);
  const twiddles = word(plan, planColumnTwiddles);
  const L = N / radix;
  const apart = L * workRow;
  transformFirst(strip, work, apart, twiddles, radix, workRow, inner);
  let order = word(plan, planColumnOrder);
  for (let block = work, end = work + N * workRow; block < end; block += apart) {
    transformBlock(block, L, workRow, twiddles + 8 * L * (radix - 1), order, strip, (N * STRIP_ROW) >> 2);
    order += L;
  }
}

/** Transforms one sub-column of L work rows. */
function transformBlock(
  block: usize,
  L: usize,
  workRow: usize,
  twiddles: usize,
  order: usize,
  strip: usize,
  apart: usize,
): void {
  if (L * workRow > CACHED_BYTES) {
    const quarter = L >> 2;
    transformMiddle(block, quarter * workRow, twiddles, workRow);
    for (let i: usize = 0; i < 4; i++) {
      const next = block + i * quarter * workRow;
      transformBlock(next, quarter, workRow, twiddles + 6 * L, order + i * quarter, strip, apart);
    }
    return;
  }
  const end = block + L * workRow;
  for (let l = L; l > 4; l >>= 2) {
    for (let p = block; p < end; p += l * workRow) transformMiddle(p, (l >> 2) * workRow, twiddles, workRow);
    twiddles += 6 * l;
  }
  if (workRow === LINE) columnLastBy8(block, end, order, strip, apart);
  else columnLastBy16(block, end, order, strip, apart);
}

function transformFirst(
  strip: usize,
  work: usize,
  apart: usize,
  twiddles: usize,
  radix: usize,
  workRow: usize,
  inner: bool,
): void {
  if (workRow === LINE) {
    if (radix === 4) {
      if (inner) columnFirst4InnerBy8(strip, work, apart, twiddles);
      else columnFirst4By8(strip, work, apart, twiddles);
    } else if (inner) columnFirst8InnerBy8(strip, work, apart, twiddles);
    else columnFirst8By8(strip, work, apart, twiddles);
  } else if (radix === 4) {
    if (inner) columnFirst4InnerBy16(strip, work, apart, twiddles);
    else columnFirst4By16(strip, work, apart, twiddles);
  } else if (inner) columnFirst8InnerBy16(strip, work, apart, twiddles);
  else columnFirst8By16(strip, work, apart, twiddles);
}

function transformMiddle(p: usize, apart: usize, twiddles: usize, workRow: usize): void {
  if (workRow === LINE) columnMiddleBy8(p, apart, twiddles);
  else columnMiddleBy16(p, apart, twiddles);
}

function word(plan: usize, offset: usize): usize {
  return load<u32>(plan + offset);
}
