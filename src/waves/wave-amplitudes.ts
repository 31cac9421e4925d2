import { fillGaussianPair, key32, uniform } from '../math/random.ts';
import { absoluteAngularFrequency, angularFrequency } from '../physics/dispersion.ts';
import type { Current, Water } from '../physics/water.ts';
import type { Band } from './band.ts';
import { cellVariances } from './cell-variance.ts';
import { type Lattice, oppositeIndex, waveIndex, wavenumberStep } from './lattice.ts';
import { addToTally, emptyTally, type LatticeTally } from './lattice-tally.ts';
import type { RadialTable } from './radial-table.ts';
import { shownShare, turnsPerLoop } from './turns.ts';

/**
 * The discrete waves of a cascade: what a loop is made from. Read-only once made; backed by shared memory, so that
 * every thread reads the same copy.
 *
 * With phi = 2 pi m(k) n / N at frame n, and x measured from the centre of texel (0, 0):
 *
 *     h(k) = A(k) e^{-i phi(k)} + conj A(-k) e^{+i phi(-k)},   eta(x) = sum over k of h(k) e^{i k.x}
 *
 * so that a wave moves toward +k and the variance of eta is the sum of 2 |A|^2.
 */
export interface WaveAmplitudes {
  readonly lattice: Lattice;
  /** Number N of frames in the loop. */
  readonly frameCount: number;
  readonly periodS: number;
  /** A(k), m; Float64Array 2*N*N, interleaved re, im, lattice order. */
  readonly amplitude: Float64Array;
  /** m(k), whole signed turns per loop; Int32Array N*N, lattice order. */
  readonly turns: Int32Array;
}

export interface WaveAmplitudesRequest {
  readonly tables: readonly RadialTable[];
  /** m0 of each system in the band, m^2, in the order of `tables`. */
  readonly bandVariances: readonly number[];
  readonly lattice: Lattice;
  readonly band: Band;
  readonly water: Water;
  readonly current: Current;
  readonly frameCount: number;
  readonly periodS: number;
  /** 0 .. 2^32 - 1. */
  readonly seed: number;
  readonly amplitudes: 'gaussian' | 'deterministic';
  readonly matchHeight: boolean;
}

export interface CascadeWaves {
  readonly amplitudes: WaveAmplitudes;
  /** What the lattice made of each system, in the order of `tables`. */
  readonly tallies: readonly LatticeTally[];
  /** Variance all waves are expected to have, after the fade of waves too fast for the frames, m^2. */
  readonly expectedVariance: number;
  /** Variance of this realisation before `matchHeight`, m^2. */
  readonly drawnVariance: number;
}

/** Key of the phases of a `deterministic` sea, which belong to the sum of all systems. */
const SUM_OF_SYSTEMS = '';

/**
 * Draws the wave amplitudes of one cascade.
 *
 *     gaussian:       A = sqrt(P)/2 (xi_r + i xi_i) of each system, summed: E[2 |A|^2] = P
 *     deterministic:  A = sqrt(P/2) e^{i alpha}, P summed over systems
 *
 * with P the cell integral of Psi. Source: superposition of independent waves with Rayleigh amplitudes and uniform
 * phases, Longuet-Higgins 1952 (from memory). The random numbers are keyed by (seed, system, patch length, nx, ny):
 * the same patch at twice the resolution carries the same waves and more.
 */
export function waveAmplitudes(request: WaveAmplitudesRequest): CascadeWaves {
  const { lattice, water, current, frameCount, periodS, seed } = request;
  const N = lattice.resolution;
  const dk = wavenumberStep(lattice);
  const amplitude = new Float64Array(new SharedArrayBuffer(16 * N * N));
  const turns = new Int32Array(new SharedArrayBuffer(4 * N * N));
  const gaussian = request.amplitudes === 'gaussian';
  const summed = gaussian ? null : new Float64Array(N * N);
  const [patchLow, patchHigh] = float64Words(lattice.patchLengthM);
  const tallies: LatticeTally[] = [];
  const pair = new Float64Array(2);
  let expectedVariance = 0;

  request.tables.forEach((table, s) => {
    const { name } = table.spectrum.system;
    const cells = cellVariances(table, lattice, request.band, request.bandVariances[s]);
    const tally = emptyTally(name, cells.zeroCell);
    tallies.push(tally);
    const key: [number, number] = [seed, key32(name)];
    const counter: [number, number, number, number] = [0, 0, patchLow, patchHigh];
    for (let iy = 0, i = 0; iy < N; iy++) {
      const ny = waveIndex(iy, N);
      for (let ix = 0; ix < N; ix++, i++) {
        const P = cells.variance[i];
        if (P === 0) continue;
        const nx = waveIndex(ix, N);
        const sigma = angularFrequency(dk * Math.sqrt(nx * nx + ny * ny), water);
        const omega = absoluteAngularFrequency(nx * dk, ny * dk, water, current);
        const m = turnsPerLoop(omega, sigma, periodS);
        turns[i] = m;
        const shown = shownShare(m, frameCount) * P;
        addToTally(tally, { variance: P, shown, nx, ny, sigma, omega, turns: m, periodS, frameCount });
        expectedVariance += shown;
        if (summed !== null) {
          summed[i] += shown;
          continue;
        }
        counter[0] = nx >>> 0;
        counter[1] = ny >>> 0;
        fillGaussianPair(pair, counter, key);
        const scale = Math.sqrt(shown) / 2;
        amplitude[2 * i] += scale * pair[0];
        amplitude[2 * i + 1] += scale * pair[1];
      }
    }
  });

  if (summed !== null) fillRandomPhases(amplitude, summed, lattice, seed);
  referToTexelCentre(amplitude, N);
  const drawn: WaveAmplitudes = { lattice, frameCount, periodS, amplitude, turns };
  const drawnVariance = loopVariance(drawn);
  if (request.matchHeight && drawnVariance > 0) {
    const factor = Math.sqrt(expectedVariance / drawnVariance);
    for (let i = 0; i < amplitude.length; i++) amplitude[i] *= factor;
  }
  return { amplitudes: drawn, tallies, expectedVariance, drawnVariance };
}

/**
 * Variance of the written loop, m^2: the mean of eta^2 over texels and frames. Waves k and -k whose phases stay
 * opposite at every frame (m(k) + m(-k) a multiple of N) form a standing pattern and add a cross term.
 */
export function loopVariance(waves: WaveAmplitudes): number {
  const { amplitude: A, turns } = waves;
  const N = waves.lattice.resolution;
  let sum = 0;
  for (let iy = 0, i = 0; iy < N; iy++) {
    for (let ix = 0; ix < N; ix++, i++) {
      const re = A[2 * i];
      const im = A[2 * i + 1];
      if (re === 0 && im === 0) continue;
      const j = oppositeIndex(iy, N) * N + oppositeIndex(ix, N);
      sum += 2 * (re * re + im * im);
      if ((turns[i] + turns[j]) % waves.frameCount === 0) sum += 2 * (re * A[2 * j] - im * A[2 * j + 1]);
    }
  }
  return sum;
}

function fillRandomPhases(out: Float64Array, variance: Float64Array, lattice: Lattice, seed: number): void {
  const N = lattice.resolution;
  const [patchLow, patchHigh] = float64Words(lattice.patchLengthM);
  const key: [number, number] = [seed, key32(SUM_OF_SYSTEMS)];
  for (let i = 0; i < variance.length; i++) {
    if (variance[i] === 0) continue;
    const nx = waveIndex(i % N, N);
    const ny = waveIndex(Math.floor(i / N), N);
    const alpha = 2 * Math.PI * uniform([nx >>> 0, ny >>> 0, patchLow, patchHigh], key);
    const modulus = Math.sqrt(variance[i] / 2);
    out[2 * i] = modulus * Math.cos(alpha);
    out[2 * i + 1] = modulus * Math.sin(alpha);
  }
}

/**
 * Moves the origin of phase from the tile's south-west corner to the centre of its first texel, half a texel east and
 * north: A e^{i pi (nx + ny) / N}. Fields then hold texel-centre values with no further work.
 */
function referToTexelCentre(amplitude: Float64Array, N: number): void {
  for (let iy = 0, i = 0; iy < N; iy++) {
    for (let ix = 0; ix < N; ix++, i++) {
      const re = amplitude[2 * i];
      const im = amplitude[2 * i + 1];
      if (re === 0 && im === 0) continue;
      const angle = (Math.PI * (waveIndex(ix, N) + waveIndex(iy, N))) / N;
      const c = Math.cos(angle);
      const s = Math.sin(angle);
      amplitude[2 * i] = re * c - im * s;
      amplitude[2 * i + 1] = re * s + im * c;
    }
  }
}

/** The two 32-bit words of a double, least significant first. */
function float64Words(value: number): readonly [number, number] {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, value, true);
  return [view.getUint32(0, true), view.getUint32(4, true)];
}
