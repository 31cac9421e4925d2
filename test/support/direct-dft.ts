/**
 * The transform that an engine promises, summed term by term: z(x, y) = sum of Z(nx, ny) e^{+2 pi i (nx x + ny y) / N}.
 * Angles are taken modulo a whole turn before the cosine, so that each term is right to an ulp.
 *
 * @param data Float64Array 2*N*N, interleaved re, im, row-major [ny][nx]; read only
 * @returns Float64Array 2*N*N, [iy][ix], the caller's
 */
export function directInverse(data: Float64Array, N: number): Float64Array {
  const cosine = Float64Array.from({ length: N }, (_, j) => Math.cos((2 * Math.PI * j) / N));
  const sine = Float64Array.from({ length: N }, (_, j) => Math.sin((2 * Math.PI * j) / N));
  const rows = new Float64Array(2 * N * N);
  for (let ny = 0; ny < N; ny++) {
    for (let x = 0; x < N; x++) {
      for (let nx = 0; nx < N; nx++) addTurned(rows, ny * N + x, data, ny * N + nx, (nx * x) % N);
    }
  }
  const out = new Float64Array(2 * N * N);
  for (let y = 0; y < N; y++) {
    for (let x = 0; x < N; x++) {
      for (let ny = 0; ny < N; ny++) addTurned(out, y * N + x, rows, ny * N + x, (ny * y) % N);
    }
  }
  return out;

  function addTurned(to: Float64Array, i: number, from: Float64Array, j: number, turn: number): void {
    const [re, im] = [from[2 * j], from[2 * j + 1]];
    to[2 * i] += re * cosine[turn] - im * sine[turn];
    to[2 * i + 1] += re * sine[turn] + im * cosine[turn];
  }
}
