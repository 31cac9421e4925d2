import { cothKh } from '../physics/dispersion.ts';
import { oppositeIndex, waveIndex, wavenumberStep } from '../waves/lattice.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import type { FieldName, FrameFields } from './frame-fields.ts';
import type { TransformEngine } from './transform-engine.ts';

/** What a synthesis needs besides the waves. */
export interface SynthesisOptions {
  readonly depthM: number;
  readonly horizontalScale: number;
  /** Fields wanted; the transforms of the others are left out. */
  readonly fields: ReadonlySet<FieldName>;
}

/** Makes the fields of any frame of a cascade's loop, one at a time. */
export interface Synthesis {
  /** Frame n of the loop; n may be any integer, and n + N gives the same bits as n. */
  frame(n: number): FrameFields;
}

/**
 * Two real fields a and b that share a complex transform as a + i b. Like goes with like; the one odd pair is height
 * with shear.
 */
const PAIRS: readonly (readonly [FieldName, FieldName])[] = [
  ['displacementEast', 'displacementNorth'],
  ['height', 'strainEastNorth'],
  ['slopeEast', 'slopeNorth'],
  ['strainEastEast', 'strainNorthNorth'],
  ['velocityEast', 'velocityNorth'],
  ['velocityUp', 'velocityUp'],
];

/**
 * The moving surface of one cascade: wave amplitudes turned to a frame, and the inverse transforms of every field.
 *
 *     h(k)  = A(k) e^{-i phi(k)} + conj A(-k) e^{+i phi(-k)}
 *     D(k)  = i khat coth(kh) h(k)          horizontal displacement of linear theory, Airy
 *     h'(k) = -i omega_m A e^{-i phi} + i omega_m' conj A(-k) e^{+i phi'}
 *
 * with phi = 2 pi m n / N taken as the integer (m n mod N) from a table: frame N is frame 0 to the bit.
 */
export function synthesis(
  waves: WaveAmplitudes,
  engine: TransformEngine,
  options: SynthesisOptions,
): Synthesis {
  const N = waves.lattice.resolution;
  const dk = wavenumberStep(waves.lattice);
  const pairs = PAIRS.filter(([a, b]) => options.fields.has(a) || options.fields.has(b));
  const moving = pairs.some(([a]) => a.startsWith('velocity'));
  const heightSpectrum = new Float64Array(2 * N * N);
  const rateSpectrum = moving ? new Float64Array(2 * N * N) : null;
  const packed = new Float64Array(2 * N * N);
  const buffers = new Map<FieldName, Float64Array>();
  for (const name of options.fields) buffers.set(name, new Float64Array(N * N));
  const q = horizontalGain(waves, options.depthM, options.horizontalScale);
  const cosine = new Float64Array(waves.frameCount);
  const sine = new Float64Array(waves.frameCount);
  for (let j = 0; j < waves.frameCount; j++) {
    cosine[j] = Math.cos((2 * Math.PI * j) / waves.frameCount);
    sine[j] = Math.sin((2 * Math.PI * j) / waves.frameCount);
  }

  return {
    frame(n) {
      const turned = { waves, frame: n, cosine, sine };
      fillSpectra(heightSpectrum, rateSpectrum, turned);
      for (const [a, b] of pairs) {
        const source = a.startsWith('velocity') ? (rateSpectrum ?? heightSpectrum) : heightSpectrum;
        fillPair(packed, source, a, q, N, dk);
        engine.inverse(packed);
        fillParts(buffers.get(a), a === b ? undefined : buffers.get(b), packed);
      }
      return Object.fromEntries(buffers) as FrameFields;
    },
  };
}

/** scale * coth(kh) / k over the lattice, m: D = i k q h. Float64Array N*N, 0 where there is no wave. */
function horizontalGain(waves: WaveAmplitudes, depthM: number, scale: number): Float64Array {
  const N = waves.lattice.resolution;
  const dk = wavenumberStep(waves.lattice);
  const q = new Float64Array(N * N);
  for (let iy = 0, i = 0; iy < N; iy++) {
    for (let ix = 0; ix < N; ix++, i++) {
      const k = dk * Math.hypot(waveIndex(ix, N), waveIndex(iy, N));
      if (k > 0) q[i] = (scale * cothKh(k, depthM)) / k;
    }
  }
  return q;
}

interface TurnedWaves {
  readonly waves: WaveAmplitudes;
  readonly frame: number;
  /** cos and sin of 2 pi j / N; Float64Array of N frames each. */
  readonly cosine: Float64Array;
  readonly sine: Float64Array;
}

/** Fills h(k) and, where wanted, its rate h'(k): interleaved re, im, lattice order. */
function fillSpectra(h: Float64Array, rate: Float64Array | null, turned: TurnedWaves): void {
  const { amplitude: A, turns, frameCount, periodS, lattice } = turned.waves;
  const { cosine, sine } = turned;
  const N = lattice.resolution;
  const omegaOfTurn = (2 * Math.PI) / periodS;
  const frame = ((turned.frame % frameCount) + frameCount) % frameCount;
  for (let iy = 0, i = 0; iy < N; iy++) {
    const jRow = oppositeIndex(iy, N) * N;
    for (let ix = 0; ix < N; ix++, i++) {
      const j = jRow + oppositeIndex(ix, N);
      const m = turns[i];
      const mOpposite = turns[j];
      const phi = phaseIndex(m, frame, frameCount);
      const phiOpposite = phaseIndex(mOpposite, frame, frameCount);
      // A e^{-i phi}
      const aRe = A[2 * i] * cosine[phi] + A[2 * i + 1] * sine[phi];
      const aIm = A[2 * i + 1] * cosine[phi] - A[2 * i] * sine[phi];
      // conj A(-k) e^{+i phi'}
      const bRe = A[2 * j] * cosine[phiOpposite] + A[2 * j + 1] * sine[phiOpposite];
      const bIm = A[2 * j] * sine[phiOpposite] - A[2 * j + 1] * cosine[phiOpposite];
      h[2 * i] = aRe + bRe;
      h[2 * i + 1] = aIm + bIm;
      if (rate !== null) {
        const omega = m * omegaOfTurn;
        const omegaOpposite = mOpposite * omegaOfTurn;
        rate[2 * i] = omega * aIm - omegaOpposite * bIm;
        rate[2 * i + 1] = omegaOpposite * bRe - omega * aRe;
      }
    }
  }
}

/** m n mod N, in 0..N-1. The product stays far below 2^53. */
function phaseIndex(m: number, n: number, N: number): number {
  const r = (m * n) % N;
  return r < 0 ? r + N : r;
}

/** Fills the spectrum of a + i b of one pair, named by its first field. */
function fillPair(
  out: Float64Array,
  h: Float64Array,
  first: FieldName,
  q: Float64Array,
  N: number,
  dk: number,
): void {
  for (let iy = 0, i = 0; iy < N; iy++) {
    const ky = dk * waveIndex(iy, N);
    for (let ix = 0; ix < N; ix++, i++) {
      const kx = dk * waveIndex(ix, N);
      const re = h[2 * i];
      const im = h[2 * i + 1];
      // gRe + i gIm multiplies h; a real field with transform g h pairs with another as g_a + i g_b.
      let gRe = 1;
      let gIm = 0;
      switch (first) {
        case 'displacementEast':
        case 'velocityEast': // i kx q + i (i ky q)
          gRe = -ky * q[i];
          gIm = kx * q[i];
          break;
        case 'height': // 1 + i (i ky)(i kx q)
          gIm = -kx * ky * q[i];
          break;
        case 'slopeEast': // i kx + i (i ky)
          gRe = -ky;
          gIm = kx;
          break;
        case 'strainEastEast': // (i kx)(i kx q) + i (i ky)(i ky q)
          gRe = -kx * kx * q[i];
          gIm = -ky * ky * q[i];
          break;
        default: // velocityUp alone
          break;
      }
      out[2 * i] = gRe * re - gIm * im;
      out[2 * i + 1] = gRe * im + gIm * re;
    }
  }
}

/** Splits a transformed pair into its real and imaginary parts. */
function fillParts(re: Float64Array | undefined, im: Float64Array | undefined, packed: Float64Array): void {
  if (re !== undefined) for (let i = 0; i < re.length; i++) re[i] = packed[2 * i];
  if (im !== undefined) for (let i = 0; i < im.length; i++) im[i] = packed[2 * i + 1];
}
