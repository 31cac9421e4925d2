import {
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
  planWorkStrip,
  STRIP_PAD,
  STRIP_ROW,
} from './layout';
import {
  columnFirst4,
  columnFirst4Inner,
  columnFirst8,
  columnFirst8Inner,
  columnLast,
  columnMiddle,
  rowFirst4,
  rowFirst4Inner,
  rowFirst8,
  rowFirst8Inner,
  rowLast,
  rowMiddle,
} from './stages';

/** Rows of a column that the first cache surely holds: 256 rows of a strip are 32 kB. */
const CACHED_ROWS: usize = 256;

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

export function transformColumns(plan: usize, strips: usize, inner: bool): void {
  const N = word(plan, planSize);
  const work = word(plan, planWorkStrip);
  const radix = word(plan, planRadix);
  const twiddles = word(plan, planColumnTwiddles);
  const L = N / radix;
  const apart = L * STRIP_ROW;
  for (
    let strip = strips, end = strips + (N >> 4) * (N * STRIP_ROW + STRIP_PAD);
    strip < end;
    strip += N * STRIP_ROW + STRIP_PAD
  ) {
    if (radix === 4) {
      if (inner) columnFirst4Inner(strip, work, apart, twiddles);
      else columnFirst4(strip, work, apart, twiddles);
    } else if (inner) columnFirst8Inner(strip, work, apart, twiddles);
    else columnFirst8(strip, work, apart, twiddles);
    let order = word(plan, planColumnOrder);
    for (let block = work, blocksEnd = work + N * STRIP_ROW; block < blocksEnd; block += apart) {
      transformBlock(block, L, twiddles + 8 * L * (radix - 1), order, strip, (N * STRIP_ROW) >> 2);
      order += L;
    }
  }
}

function transformBlock(
  block: usize,
  rows: usize,
  twiddles: usize,
  order: usize,
  strip: usize,
  apart: usize,
): void {
  if (rows > CACHED_ROWS) {
    const quarter = rows >> 2;
    columnMiddle(block, quarter * STRIP_ROW, twiddles);
    for (let i: usize = 0; i < 4; i++) {
      transformBlock(
        block + i * quarter * STRIP_ROW,
        quarter,
        twiddles + 6 * rows,
        order + i * quarter,
        strip,
        apart,
      );
    }
    return;
  }
  const end = block + rows * STRIP_ROW;
  for (let L = rows; L > 4; L >>= 2) {
    for (let p = block; p < end; p += L * STRIP_ROW) columnMiddle(p, (L >> 2) * STRIP_ROW, twiddles);
    twiddles += 6 * L;
  }
  columnLast(block, end, order, strip, apart);
}

function word(plan: usize, offset: usize): usize {
  return load<u32>(plan + offset);
}
