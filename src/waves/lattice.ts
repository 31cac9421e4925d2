/**
 * The discrete wavevectors of a square tile: k = (2 pi / L)(nx, ny), -N/2 <= nx, ny < N/2.
 *
 * Arrays over the lattice have N*N entries, row-major [iy][ix] in transform order: index i holds n = i for i < N/2
 * and n = i - N otherwise. The entries n = 0 and n = -N/2 (the Nyquist row and column, where i k is not Hermitian)
 * carry nothing.
 */
export interface Lattice {
  readonly patchLengthM: number;
  /** N, a power of two. */
  readonly resolution: number;
}

/** Spacing of the lattice, 2 pi / L, rad/m. */
export function wavenumberStep(lattice: Lattice): number {
  return (2 * Math.PI) / lattice.patchLengthM;
}

/** Nyquist wavenumber along an axis, pi N / L, rad/m. */
export function nyquistWavenumber(lattice: Lattice): number {
  return (Math.PI * lattice.resolution) / lattice.patchLengthM;
}

/** Signed wave index n of array index i, for N texels. */
export function waveIndex(i: number, N: number): number {
  return i < N / 2 ? i : i - N;
}

/** Array index of the opposite wave index, for N texels: of n, -n; the Nyquist index maps to itself. */
export function oppositeIndex(i: number, N: number): number {
  return i === 0 ? 0 : N - i;
}
