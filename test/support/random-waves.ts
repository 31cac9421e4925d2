import type { WaveAmplitudes } from '../../src/waves/wave-amplitudes.ts';

/** Numbers in -1/2 .. 1/2 from a linear congruential generator: whole numbers only, the same everywhere. */
export function noise(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32 - 0.5;
  };
}

export interface RandomWavesOptions {
  readonly resolution: number;
  /** Waves up to this many lattice steps from 0; the Nyquist row and column stay empty. */
  readonly reach?: number;
  /** Whether k and -k turn differently. */
  readonly current?: boolean;
  readonly frameCount?: number;
  readonly patchLengthM?: number;
  readonly seed?: number;
  /** Amplitude north-south against east-west, 0 for waves that run along the x axis only. */
  readonly breadth?: number;
}

/**
 * Waves with a falling spectrum, more of them eastward, made with exactly rounded operations only, so that the same
 * bits come out on every machine.
 */
export function randomWaves(options: RandomWavesOptions): WaveAmplitudes {
  const { resolution: N, current = false, frameCount = 48, patchLengthM = 100, breadth = 1 } = options;
  const reach = options.reach ?? N / 4 - 1;
  const next = noise(options.seed ?? 1);
  const amplitude = new Float64Array(2 * N * N);
  const turns = new Int32Array(N * N);
  for (let iy = 0, i = 0; iy < N; iy++) {
    const ny = iy < N / 2 ? iy : iy - N;
    for (let ix = 0; ix < N; ix++, i++) {
      const nx = ix < N / 2 ? ix : ix - N;
      const n = Math.sqrt(nx * nx + ny * ny);
      if (n === 0 || n > reach || nx === -N / 2 || ny === -N / 2) continue;
      const scale = ((nx > 0 ? 1 : 0.3) * (ny === 0 ? 1 : breadth)) / (n * n * Math.sqrt(n));
      amplitude[2 * i] = scale * next();
      amplitude[2 * i + 1] = scale * next();
      const drift = current ? Math.round(0.3 * nx + 0.2 * ny) : 0;
      turns[i] = 1 + Math.floor(2 * Math.sqrt(n)) + drift;
    }
  }
  return { lattice: { patchLengthM, resolution: N }, frameCount, periodS: 8, amplitude, turns };
}
