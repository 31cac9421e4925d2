import { absoluteAngularFrequency, angularFrequency } from '../physics/dispersion.ts';
import type { Current, Water } from '../physics/water.ts';
import { type Lattice, oppositeIndex, waveIndex, wavenumberStep } from '../waves/lattice.ts';
import { turnsPerLoop } from '../waves/turns.ts';
import type { FieldValues } from './field-values.ts';
import type { PlaneTransform } from './plane-transform.ts';

/**
 * The waves that a loop of height frames shows: each frame transformed in space, and projected in time onto the whole
 * number of turns that the dispersion relation gives each wave,
 *
 *     Z(k) = 1/N sum over n of h(k, n) e^{+i 2 pi m(k) n / N},
 *
 * which is A(k) where m(k) + m(-k) is no multiple of N, and A(k) + conj A(-k) where it is.
 */
export interface MeasuredWaves {
  readonly lattice: Lattice;
  readonly frameCount: number;
  readonly periodS: number;
  /** Z(k), m; Float64Array 2*N*N, interleaved re, im, lattice order. */
  readonly amplitude: Float64Array;
  /** m(k) by the dispersion relation; Int32Array N*N. */
  readonly turns: Int32Array;
  /** Variance of each wave, m^2; Float64Array N*N. Waves k and -k that stand share theirs evenly. */
  readonly variance: Float64Array;
  /** Sum of `variance`: what lies on the dispersion shell. */
  readonly onShell: number;
  /** Mean of eta^2 over texels and frames, and mean of eta: m^2 and m. */
  readonly meanSquare: number;
  readonly mean: number;
  /** Mean square of the error of the height as stored, by rounding and clipping, m^2. */
  readonly rounding: number;
}

/** Adds up a loop's height frames, in any order. */
export interface WaveProjection {
  readonly add: (index: number, height: FieldValues) => void;
  /** Number of frames added. */
  readonly frames: () => number;
  readonly waves: () => MeasuredWaves;
}

/** Whole turns per loop of every wave of a tile by the dispersion relation; Int32Array N*N, lattice order. */
export function dispersionTurns(
  lattice: Lattice,
  water: Water,
  current: Current,
  periodS: number,
): Int32Array {
  const N = lattice.resolution;
  const dk = wavenumberStep(lattice);
  const turns = new Int32Array(N * N);
  for (let iy = 0, i = 0; iy < N; iy++) {
    const ny = waveIndex(iy, N);
    for (let ix = 0; ix < N; ix++, i++) {
      const nx = waveIndex(ix, N);
      if (nx === 0 && ny === 0) continue;
      const sigma = angularFrequency(dk * Math.sqrt(nx * nx + ny * ny), water);
      turns[i] = turnsPerLoop(absoluteAngularFrequency(nx * dk, ny * dk, water, current), sigma, periodS);
    }
  }
  return turns;
}

/**
 * @param lattice the tile
 * @param turns see `dispersionTurns`
 * @param transform of the tile's resolution
 */
export function waveProjection(
  lattice: Lattice,
  frameCount: number,
  periodS: number,
  turns: Int32Array,
  transform: PlaneTransform,
): WaveProjection {
  const N = lattice.resolution;
  const amplitude = new Float64Array(2 * N * N);
  const F = new Float64Array(2 * N * N);
  const waiting = new Float64Array(N * N);
  let waitingIndex = -1;
  let [frames, sum, squares, rounding] = [0, 0, 0, 0];
  const cosine = Float64Array.from({ length: frameCount }, (_, j) =>
    Math.cos((2 * Math.PI * j) / frameCount),
  );
  const sine = Float64Array.from({ length: frameCount }, (_, j) => Math.sin((2 * Math.PI * j) / frameCount));
  // m modulo N, so that every product with a frame number is positive.
  const residue = Int32Array.from(turns, (m) => ((m % frameCount) + frameCount) % frameCount);

  /** Two real frames a and b went through one transform as a + i b: h_a = (F(k) + conj F(-k)) / 2, h_b alike. */
  const addPair = (a: number, b: number): void => {
    for (let iy = 0, i = 0; iy < N; iy++) {
      const jRow = oppositeIndex(iy, N) * N;
      for (let ix = 0; ix < N; ix++, i++) {
        const j = jRow + oppositeIndex(ix, N);
        const aRe = 0.5 * (F[2 * i] + F[2 * j]);
        const aIm = 0.5 * (F[2 * i + 1] - F[2 * j + 1]);
        const phi = (residue[i] * a) % frameCount;
        amplitude[2 * i] += aRe * cosine[phi] - aIm * sine[phi];
        amplitude[2 * i + 1] += aRe * sine[phi] + aIm * cosine[phi];
        if (b < 0) continue;
        const bRe = 0.5 * (F[2 * i + 1] + F[2 * j + 1]);
        const bIm = 0.5 * (F[2 * j] - F[2 * i]);
        const psi = (residue[i] * b) % frameCount;
        amplitude[2 * i] += bRe * cosine[psi] - bIm * sine[psi];
        amplitude[2 * i + 1] += bRe * sine[psi] + bIm * cosine[psi];
      }
    }
  };

  return {
    add(index, { values, rounding: { meanSquare, clipping } }) {
      frames++;
      rounding += meanSquare + clipping;
      let frameSum = 0;
      let frameSquares = 0;
      for (let i = 0; i < values.length; i++) {
        frameSum += values[i];
        frameSquares += values[i] * values[i];
      }
      sum += frameSum;
      squares += frameSquares;
      if (waitingIndex < 0) {
        waiting.set(values);
        waitingIndex = index;
        return;
      }
      transform.fillCoefficients(F, waiting, values);
      addPair(waitingIndex, index);
      waitingIndex = -1;
    },
    frames: () => frames,
    waves() {
      if (waitingIndex >= 0) {
        transform.fillCoefficients(F, waiting, null);
        addPair(waitingIndex, -1);
        waitingIndex = -1;
      }
      for (let i = 0; i < amplitude.length; i++) amplitude[i] /= frames;
      const variance = waveVariances(amplitude, turns, N, frameCount);
      const texels = frames * N * N;
      return {
        lattice,
        frameCount,
        periodS,
        amplitude,
        turns,
        variance,
        onShell: variance.reduce((total, share) => total + share, 0),
        meanSquare: squares / texels,
        mean: sum / texels,
        rounding: rounding / frames,
      };
    },
  };
}

/** 2 |Z|^2, or |Z|^2 each where k and -k stand: their sum is then the pair's variance. */
function waveVariances(Z: Float64Array, turns: Int32Array, N: number, frameCount: number): Float64Array {
  const variance = new Float64Array(N * N);
  for (let iy = 0, i = 0; iy < N; iy++) {
    if (iy === N / 2) {
      i += N;
      continue;
    }
    for (let ix = 0; ix < N; ix++, i++) {
      if (ix === N / 2 || i === 0) continue;
      const j = oppositeIndex(iy, N) * N + oppositeIndex(ix, N);
      const square = Z[2 * i] * Z[2 * i] + Z[2 * i + 1] * Z[2 * i + 1];
      variance[i] = isStanding(turns, i, j, frameCount) ? square : 2 * square;
    }
  }
  return variance;
}

/** Whether the frames cannot tell wave i from its opposite j, because their phases stay opposite at every frame. */
export function isStanding(turns: Int32Array, i: number, j: number, frameCount: number): boolean {
  return (turns[i] + turns[j]) % frameCount === 0;
}
