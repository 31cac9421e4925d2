import { roundedUp64 } from '../alignment.ts';
import type { Radix } from './butterflies.ts';
import { COMPLEX_VECTOR, STRIP_ROW, STRIP_VECTORS, stripBytes, TRANSFORM_PLAN } from './layout.ts';

/*
 * A transform plan: the tables of one size, written once into a kernel's memory. They depend on the size alone.
 */

/** Radices of the stages of a transform of N values, first to last. */
export function stageRadices(N: number): readonly Radix[] {
  const bits = Math.log2(N);
  const first: Radix = bits % 2 === 0 ? 4 : 8;
  return [first, ...new Array<Radix>((bits - Math.log2(first)) / 2).fill(4)];
}

/** Bytes of a plan with its tables and work space; a multiple of 64. */
export function transformPlanBytes(N: number): number {
  const parts = planParts(N);
  return parts[parts.length - 1];
}

/**
 * Writes a plan.
 *
 * @param memory the kernel's memory
 * @param address where the plan goes, a multiple of 64; `transformPlanBytes(N)` bytes from there are its own
 * @param N size, a power of two, 16 .. 8192
 */
export function writeTransformPlan(memory: ArrayBuffer, address: number, N: number): void {
  const [rowTwiddles, columnTwiddles, rowOrder, columnOrder, workRow, workRows] = planParts(N).map(
    (offset) => address + offset,
  );
  const floats = new Float32Array(memory);
  const words = new Uint32Array(memory);
  floats.set(rowTwiddleTable(N), rowTwiddles / 4);
  floats.set(columnTwiddleTable(N), columnTwiddles / 4);
  words.set(rowOrderTable(N), rowOrder / 4);
  words.set(columnOrderTable(N), columnOrder / 4);
  const p = TRANSFORM_PLAN;
  const values: readonly (readonly [offset: number, value: number])[] = [
    [p.planSize, N],
    [p.planRadix, stageRadices(N)[0]],
    [p.planRowTwiddles, rowTwiddles],
    [p.planRowOrder, rowOrder],
    [p.planRowOrderEnd, rowOrder + N / 4],
    [p.planQuarter1, vectorInStrips(N / 16, N)],
    [p.planQuarter2, vectorInStrips(N / 8, N)],
    [p.planQuarter3, vectorInStrips((3 * N) / 16, N)],
    [p.planColumnTwiddles, columnTwiddles],
    [p.planColumnOrder, columnOrder],
    [p.planWorkRow, workRow],
    [p.planWorkRows, workRows],
  ];
  for (const [offset, value] of values) words[(address + offset) / 4] = value;
}

/** Offsets of the tables and work space behind a plan's words, and of its end. */
function planParts(N: number): number[] {
  const twiddles = stageRadices(N)
    .slice(0, -1)
    .reduce((sum, r, s, radices) => {
      const L = radices.slice(0, s).reduce((left, done) => left / done, N);
      return sum + (L / r) * (r - 1);
    }, 0);
  const sizes = [8 * twiddles, 8 * twiddles, N / 4, N, 8 * N, N * STRIP_ROW];
  const offsets: number[] = [TRANSFORM_PLAN.planBytes];
  for (const size of sizes) offsets.push(roundedUp64(offsets[offsets.length - 1] + size));
  return offsets;
}

/**
 * e^{2 pi i j k / L} for each stage but the last, by j and then by output k = 1 .. r - 1, four j in a vector.
 * Float32Array of complex vectors.
 */
function rowTwiddleTable(N: number): Float32Array {
  const table: number[] = [];
  forEachTwiddledStage(N, (L, r) => {
    for (let j = 0; j < L / r; j += 4) {
      for (let k = 1; k < r; k++) {
        const angles = [j, j + 1, j + 2, j + 3].map((lane) => (2 * Math.PI * lane * k) / L);
        table.push(...angles.map(Math.cos), ...angles.map(Math.sin));
      }
    }
  });
  return Float32Array.from(table);
}

/** The same values, interleaved re, im: Float32Array of complex numbers. */
function columnTwiddleTable(N: number): Float32Array {
  const table: number[] = [];
  forEachTwiddledStage(N, (L, r) => {
    for (let j = 0; j < L / r; j++) {
      for (let k = 1; k < r; k++) {
        const angle = (2 * Math.PI * j * k) / L;
        table.push(Math.cos(angle), Math.sin(angle));
      }
    }
  });
  return Float32Array.from(table);
}

function forEachTwiddledStage(N: number, visit: (L: number, radix: Radix) => void): void {
  let L = N;
  for (const radix of stageRadices(N).slice(0, -1)) {
    visit(L, radix);
    L /= radix;
  }
}

/**
 * For each vector of results in the first quarter of a row, the byte in the work row where the four vectors begin from
 * which the last stage makes it; they lie a first stage's sub-row apart. Uint32Array of N / 16.
 */
function rowOrderTable(N: number): Uint32Array {
  const [first, ...rest] = stageRadices(N);
  const middle = rest.slice(0, -1);
  const subRow = N / first;
  const order = new Uint32Array(N / 16);
  for (let group = 0; group < first / 4; group++) {
    for (let block = 0; block < subRow / 4; block++) {
      const result = (digitReversal(block, middle) * first) / 4 + group;
      order[result] = (4 * group * subRow + 4 * block) * (COMPLEX_VECTOR / 4);
    }
  }
  return order;
}

/**
 * For each block of four work rows, the byte in the strip where its first result's row begins.
 * Uint32Array of N / 4.
 */
function columnOrderTable(N: number): Uint32Array {
  const radices = stageRadices(N).slice(0, -1);
  return Uint32Array.from({ length: N / 4 }, (_, block) => digitReversal(block, radices) * STRIP_ROW);
}

/**
 * The index whose digits are those of `index` in reverse: decimation in frequency leaves result
 * k = d1 + r1 (d2 + r2 (d3 + ...)) at position ((d1 r2 + d2) r3 + d3) ...
 */
export function digitReversal(index: number, radices: readonly number[]): number {
  let rest = index;
  let reversed = 0;
  for (const radix of [...radices].reverse()) {
    reversed = reversed * radix + (rest % radix);
    rest = Math.floor(rest / radix);
  }
  return reversed;
}

/** Where complex vector v of a row lies behind that row's first vector, bytes. */
function vectorInStrips(v: number, N: number): number {
  return Math.floor(v / STRIP_VECTORS) * stripBytes(N) + (v % STRIP_VECTORS) * COMPLEX_VECTOR;
}
