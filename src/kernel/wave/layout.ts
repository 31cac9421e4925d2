/*
 * Sizes and offsets that the kernels and the programs round them share: the build hands them to AssemblyScript as the
 * module `layout`, so each is written once, here.
 */

/** A complex vector: four real parts, then four imaginary parts of float32, bytes. */
export const COMPLEX_VECTOR = 32;

/**
 * A line is a cache line of a strip: the values of 8 neighbouring columns in one row, as two complex vectors of a
 * spectrum, or 8 values of one field and 8 of its partner.
 */
export const LINE = 64;
export const LINE_VECTORS: number = LINE / COMPLEX_VECTOR;

/**
 * A strip holds 16 neighbouring columns row by row, each row two lines, so that a pass down the columns stays within a
 * few memory pages and a whole strip in the second cache.
 */
export const STRIP_ROW: number = 2 * LINE;
export const STRIP_VECTORS: number = STRIP_ROW / COMPLEX_VECTOR;
export const STRIP_COLUMNS: number = 4 * STRIP_VECTORS;

/**
 * Bytes between strips that keep equal rows of all strips out of one cache set: without them a row of a 1024-wide
 * spectrum falls into a single set.
 */
export const STRIP_PAD = 64;

/** Strip length in memory for N rows, bytes. */
export function stripBytes(N: number): number {
  return N * STRIP_ROW + STRIP_PAD;
}

/** All strips of one spectrum or pair of fields of N x N, bytes. */
export function stripsBytes(N: number): number {
  return (N / STRIP_COLUMNS) * stripBytes(N);
}

/** Where a transform plan keeps what; each a 32-bit unsigned number, bytes from the plan's address. */
export const TRANSFORM_PLAN = {
  /** N. */
  planSize: 0,
  /** Radix of the first stage. */
  planRadix: 4,
  /** Address of the row twiddles, stage by stage: for each vector along the sub-row the r - 1 complex vectors. */
  planRowTwiddles: 8,
  /** Address and end of the order of the last row stage. */
  planRowOrder: 12,
  planRowOrderEnd: 16,
  /** Where the second, third and fourth quarter of a row's results go, bytes behind the first. */
  planQuarter1: 20,
  planQuarter2: 24,
  planQuarter3: 28,
  /** Address of the column twiddles, stage by stage: for each row of the sub-column the r - 1 complex values. */
  planColumnTwiddles: 32,
  /** Address of the order of the last column stage. */
  planColumnOrder: 36,
  /** Address of a work row: N complex values. */
  planWorkRow: 40,
  /** Address of work rows of columns: up to a strip. */
  planWorkRows: 44,
  planBytes: 64,
} as const;

/**
 * Bytes of one plane of a row in the making: real or imaginary parts of up to 8192 values and one more, and some pad
 * against cache sets.
 */
export const ROW_PLANE: number = 4 * 8192 + 128;

/** Where the waves of a cascade keep what; each a 32-bit unsigned number, bytes from the address of the words. */
export const WAVES_PLAN = {
  /** N. */
  wavesResolution: 0,
  /** Rows ny = 0, 1 ... that hold waves. */
  wavesRows: 4,
  /** 1 where all waves lie below half the Nyquist index. */
  wavesInner: 8,
  /** Address of the spans: by row, vectors from nx = 0 on and vectors up to nx = -1; they never widen. */
  wavesSpans: 12,
  /** Address of the wavenumbers by index, float32 N. */
  wavesWavenumbers: 16,
  /** Address of four row planes. */
  wavesRowPlanes: 20,
  wavesBytes: 64,
} as const;

/** Where the statistics of a channel keep what; each a vector, bytes from their address. */
export const STATISTICS = {
  statisticsSum: 0,
  statisticsSquares: 16,
  statisticsMin: 32,
  statisticsMax: 48,
  statisticsClipped: 64,
  statisticsFaults: 80,
  statisticsBytes: 128,
} as const;
