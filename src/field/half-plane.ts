import { oppositeIndex } from '../waves/lattice.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';

/** Waves in a vector. */
export const LANES = 4;

/**
 * Which waves of the half plane ny >= 0 a kernel has to make: h(-k) = conj h(k) gives the rest.
 *
 * Waves come in vectors of four, row by row: from nx = 0 eastward, then the vectors that end at nx = -1. A band leaves
 * most of the lattice empty (the default one, a disc of half the Nyquist radius, 4 of 5 cells), so rows are as long as
 * they need to be. Rows never grow: a row is as long as the longest beyond it.
 */
export interface HalfPlane {
  /** Rows ny = 0, 1 ... with waves; at least 1. */
  readonly rows: number;
  /** Vectors eastward of row ny at [2 ny], westward at [2 ny + 1]; Uint32Array of 2 * rows. */
  readonly spans: Uint32Array;
  /** Vectors of all rows. */
  readonly vectors: number;
  /** Whether all waves lie below half the Nyquist index, |nx|, |ny| < N/4. */
  readonly inner: boolean;
}

/** The half plane of some waves: of each row, everything between its outermost waves k or -k. */
export function occupiedHalfPlane({ amplitude: A, lattice }: WaveAmplitudes): HalfPlane {
  const N = lattice.resolution;
  const half = N / 2;
  const east = new Int32Array(half).fill(-1);
  const west = new Int32Array(half);
  const isWave = (i: number): boolean => A[2 * i] !== 0 || A[2 * i + 1] !== 0;
  for (let iy = 0; iy < N; iy++) {
    if (iy === half) continue;
    const row = iy * N;
    let e = half - 1;
    while (e >= 0 && !isWave(row + e)) e--;
    let w = half - 1;
    while (w > 0 && !isWave(row + N - w)) w--;
    const ny = Math.min(iy, N - iy);
    if (iy < half) {
      east[ny] = Math.max(east[ny], e);
      west[ny] = Math.max(west[ny], w);
    }
    if (iy === 0 || iy > half) {
      // Opposites: what lies east here lies west there, but for nx = 0.
      const opposite = w > 0 ? w : isWave(row) ? 0 : -1;
      east[ny] = Math.max(east[ny], opposite);
      west[ny] = Math.max(west[ny], e);
    }
  }
  return halfPlane(N, east, west);
}

/**
 * The half plane of a disc of waves |n| <= radius, for sizes before there are waves.
 * @param radius in lattice steps
 */
export function discHalfPlane(N: number, radius: number): HalfPlane {
  const reach = Int32Array.from({ length: N / 2 }, (_, ny) =>
    ny > radius ? -1 : Math.min(N / 2 - 1, Math.floor(Math.sqrt(radius * radius - ny * ny))),
  );
  return halfPlane(
    N,
    reach,
    reach.map((n) => Math.max(0, n)),
  );
}

/**
 * @param east largest nx >= 0 of each row, -1 for none
 * @param west largest -nx > 0 of each row, 0 for none
 */
function halfPlane(N: number, east: Int32Array, west: Int32Array): HalfPlane {
  const half = N / 2;
  let rows = half;
  while (rows > 1 && east[rows - 1] < 0 && west[rows - 1] === 0) rows--;
  const spans = new Uint32Array(2 * rows);
  let widestEast = -1;
  let widestWest = 0;
  let vectors = 0;
  for (let ny = rows - 1; ny >= 0; ny--) {
    widestEast = Math.max(widestEast, east[ny]);
    widestWest = Math.max(widestWest, west[ny]);
    spans[2 * ny] = Math.ceil((widestEast + 1) / LANES);
    spans[2 * ny + 1] = Math.ceil(widestWest / LANES);
    vectors += spans[2 * ny] + spans[2 * ny + 1];
  }
  const inner = rows <= N / 4 && widestEast < N / 4 && widestWest < N / 4;
  return { rows, spans, vectors, inner };
}

/** Calls `visit` with the lattice index of every wave of a half plane and of its opposite, in the kernel's order. */
export function forEachWave(
  plane: HalfPlane,
  N: number,
  visit: (w: number, ix: number, iy: number, i: number, j: number) => void,
): void {
  let w = 0;
  for (let iy = 0; iy < plane.rows; iy++) {
    const jRow = oppositeIndex(iy, N) * N;
    const east = LANES * plane.spans[2 * iy];
    const west = LANES * plane.spans[2 * iy + 1];
    for (let s = 0; s < east + west; s++, w++) {
      const ix = s < east ? s : N - west + (s - east);
      visit(w, ix, iy, iy * N + ix, jRow + oppositeIndex(ix, N));
    }
  }
}
