/**
 * A two-dimensional inverse transform, unscaled:
 *
 *     z(ix, iy) = sum over (nx, ny) of Z(nx, ny) e^{+2 pi i (nx ix + ny iy) / N}
 *
 * An engine owns work buffers, so it serves one caller at a time.
 */
export interface TransformEngine {
  readonly resolution: number;
  /**
   * Transforms in place. `data` is a Float64Array of 2*N*N, interleaved re, im, row-major: [ny][nx] in transform order
   * before, [iy][ix] after.
   */
  inverse(data: Float64Array): void;
}
