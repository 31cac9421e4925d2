import { cothKh } from '../physics/dispersion.ts';
import { waveIndex } from '../waves/lattice.ts';
import type { CascadeFacts } from './cascade-facts.ts';
import type { FieldValues } from './field-values.ts';
import type { SeenFrame } from './frame-reader.ts';

/**
 * The surface of one frame as its displacement (or height) files give it, differentiated in double precision.
 *
 * Only wavenumbers at which the cascade may hold a wave are differentiated: beyond them files hold rounding alone.
 * Where there is no displacement map, strain follows from the height by D = i khat coth(kh) horizontalScale h.
 */
export interface Surface {
  /** Slope and strain: Float64Array N*N each, row 0 south; lent until the next frame. */
  readonly Sx: Float64Array;
  readonly Sy: Float64Array;
  readonly Dxx: Float64Array;
  readonly Dyy: Float64Array;
  readonly Dxy: Float64Array;
  /** Horizontal displacement that the height calls for, m; the same. */
  readonly east: Float64Array;
  readonly north: Float64Array;
  readonly noise: SurfaceNoise;
}

/** Mean square errors of a surface's fields, from the rounding of the files they come from. */
interface SurfaceNoise {
  readonly Sx: number;
  readonly Sy: number;
  readonly Dxx: number;
  readonly Dyy: number;
  readonly Dxy: number;
  /** Covariance of the errors of Dxx and Dyy: not 0 where both come from the height. */
  readonly DxxDyy: number;
  readonly east: number;
  readonly north: number;
}

/** The height of a frame, from whichever map holds it. */
export function heightOf(frame: SeenFrame): FieldValues | null {
  return frame.field('displacement-up') ?? frame.field('height');
}

/** One wave that a cascade may hold. */
export interface BandWave {
  readonly i: number;
  readonly kx: number;
  readonly ky: number;
  /** horizontalScale coth(kh) / k, m: D = i k q h. */
  readonly q: number;
}

/** Calls `body` for every wave that a cascade may hold: cells that its band touches, without k = 0 and Nyquist. */
export function forEachBandWave(facts: CascadeFacts, body: (wave: BandWave) => void): void {
  const { dkRadPerM: dk, kMinRadPerM, kMaxRadPerM, manifest, water } = facts;
  const N = facts.cascade.resolution;
  const reach = dk * Math.SQRT1_2;
  for (let iy = 0; iy < N; iy++) {
    if (iy === N / 2) continue;
    const ky = dk * waveIndex(iy, N);
    for (let ix = 0; ix < N; ix++) {
      if (ix === N / 2 || (ix === 0 && iy === 0)) continue;
      const kx = dk * waveIndex(ix, N);
      const k = Math.sqrt(kx * kx + ky * ky);
      if (k + reach < kMinRadPerM || k - reach > kMaxRadPerM) continue;
      body({ i: iy * N + ix, kx, ky, q: (manifest.sea.horizontalScale * cothKh(k, water.depthM)) / k });
    }
  }
}

/** Differentiates one frame after another into the same arrays; null for a frame without height. */
export function surfaceMaker(facts: CascadeFacts): (frame: SeenFrame) => Surface | null {
  const N = facts.cascade.resolution;
  const real = (): Float64Array => new Float64Array(N * N);
  const complex = (): Float64Array => new Float64Array(2 * N * N);
  const [H, E, F, pair] = [complex(), complex(), complex(), complex()];
  const fields = {
    Sx: real(),
    Sy: real(),
    Dxx: real(),
    Dyy: real(),
    Dxy: real(),
    east: real(),
    north: real(),
  };
  const waves: BandWave[] = [];
  forEachBandWave(facts, (wave) => waves.push(wave));
  const means = bandMeans(waves, N);
  const transform = facts.transform();

  /** Fills two real fields from the spectra i (ax X) and i (by Y), with factors by wave. */
  const fillPair = (
    a: Float64Array,
    b: Float64Array | null,
    spectrumOf: (wave: BandWave) => PairFactors,
  ): void => {
    pair.fill(0);
    for (const wave of waves) {
      const { X, x, Y, y } = spectrumOf(wave);
      const { i } = wave;
      // i x X + i (i y Y)
      pair[2 * i] = -x * X[2 * i + 1] - y * Y[2 * i];
      pair[2 * i + 1] = x * X[2 * i] - y * Y[2 * i + 1];
    }
    transform.synthesise(pair);
    for (let i = 0; i < a.length; i++) a[i] = pair[2 * i];
    if (b !== null) for (let i = 0; i < b.length; i++) b[i] = pair[2 * i + 1];
  };

  return (frame) => {
    const height = heightOf(frame);
    if (height === null) return null;
    const east = frame.field('displacement-east');
    const north = frame.field('displacement-north');
    transform.fillCoefficients(H, height.values, null);
    fillPair(fields.Sx, fields.Sy, ({ kx, ky }) => ({ X: H, x: kx, Y: H, y: ky }));
    fillPair(fields.east, fields.north, ({ kx, ky, q }) => ({ X: H, x: kx * q, Y: H, y: ky * q }));
    if (east !== null && north !== null) {
      transform.fillCoefficients(E, east.values, null);
      transform.fillCoefficients(F, north.values, null);
    } else {
      for (const { i, kx, ky, q } of waves) {
        E[2 * i] = -kx * q * H[2 * i + 1];
        E[2 * i + 1] = kx * q * H[2 * i];
        F[2 * i] = -ky * q * H[2 * i + 1];
        F[2 * i + 1] = ky * q * H[2 * i];
      }
    }
    fillPair(fields.Dxx, fields.Dyy, ({ kx, ky }) => ({ X: E, x: kx, Y: F, y: ky }));
    // The mean of the two ways to the shear: i ky E and i kx F, added in place of E.
    for (const { i, kx, ky } of waves) {
      E[2 * i] = 0.5 * (ky * E[2 * i] + kx * F[2 * i]);
      E[2 * i + 1] = 0.5 * (ky * E[2 * i + 1] + kx * F[2 * i + 1]);
    }
    fillPair(fields.Dxy, null, () => ({ X: E, x: 1, Y: E, y: 0 }));
    return { ...fields, noise: surfaceNoise(means, height, east, north) };
  };
}

interface PairFactors {
  readonly X: Float64Array;
  readonly x: number;
  readonly Y: Float64Array;
  readonly y: number;
}

/** Means over all N*N waves, those off the band counting 0, of products of wavenumbers: how white noise comes through. */
interface BandMeans {
  /** Share of the waves that are in the band. */
  readonly share: number;
  readonly xx: number;
  readonly yy: number;
  readonly qx: number;
  readonly qy: number;
  readonly qxx: number;
  readonly qyy: number;
  readonly qxy: number;
}

function bandMeans(waves: readonly BandWave[], N: number): BandMeans {
  const mean = (f: (wave: BandWave) => number): number =>
    waves.reduce((sum, wave) => sum + f(wave), 0) / (N * N);
  return {
    share: waves.length / (N * N),
    xx: mean(({ kx }) => kx * kx),
    yy: mean(({ ky }) => ky * ky),
    qx: mean(({ kx, q }) => (kx * q) ** 2),
    qy: mean(({ ky, q }) => (ky * q) ** 2),
    qxx: mean(({ kx, q }) => (kx * kx * q) ** 2),
    qyy: mean(({ ky, q }) => (ky * ky * q) ** 2),
    qxy: mean(({ kx, ky, q }) => (kx * ky * q) ** 2),
  };
}

/**
 * What rounding, white in space, does to the derivatives: an operator g(k) takes a mean square error e to
 *
 *     e (1/N^2) sum over the band of |g(k)|^2
 *
 * Errors of different channels are independent, and those of a slope and a strain of the same channel cancel by parity.
 */
function surfaceNoise(
  { share, xx, yy, qx, qy, qxx, qyy, qxy }: BandMeans,
  height: FieldValues,
  east: FieldValues | null,
  north: FieldValues | null,
): SurfaceNoise {
  // Clipping's error is all in the band.
  const error = ({ rounding: { meanSquare, clipping } }: FieldValues): number =>
    meanSquare + clipping / share;
  const h = error(height);
  const called = { Sx: h * xx, Sy: h * yy, east: h * qx, north: h * qy };
  if (east === null || north === null) {
    return { ...called, Dxx: h * qxx, Dyy: h * qyy, Dxy: h * qxy, DxxDyy: h * qxy };
  }
  const [e, n] = [error(east), error(north)];
  return { ...called, Dxx: e * xx, Dyy: n * yy, Dxy: (e * yy + n * xx) / 4, DxxDyy: 0 };
}
