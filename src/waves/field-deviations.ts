import { cothKh } from '../physics/dispersion.ts';
import { oppositeIndex, waveIndex, wavenumberStep } from './lattice.ts';
import type { WaveAmplitudes } from './wave-amplitudes.ts';

/** Standard deviations of the linear fields over a tile and its loop: m, m/s or dimensionless. */
export interface FieldDeviations {
  readonly height: number;
  readonly displacementEast: number;
  readonly displacementNorth: number;
  readonly velocityEast: number;
  readonly velocityNorth: number;
  readonly velocityUp: number;
  readonly slopeEast: number;
  readonly slopeNorth: number;
  /** Mean of slopeEast * slopeNorth: what a turn of the axes needs. */
  readonly slopeProduct: number;
  readonly strainEastEast: number;
  readonly strainNorthNorth: number;
  readonly strainEastNorth: number;
  /** Of the trace of the strain, which is J - 1 to first order. */
  readonly compression: number;
}

/**
 * Standard deviations of the fields a loop will show, from its waves and exactly (Parseval): the mean over texels and
 * frames of |g(k) h(k)|^2, where waves k and -k in opposite phase (m(k) + m(-k) a multiple of N) add a cross term.
 *
 * @param waves the cascade's waves
 * @param depthM water depth, m; `Infinity` for deep
 * @param horizontalScale factor on the horizontal displacement
 */
export function fieldDeviations(
  waves: WaveAmplitudes,
  depthM: number,
  horizontalScale: number,
): FieldDeviations {
  const { amplitude: A, turns, frameCount } = waves;
  const N = waves.lattice.resolution;
  const dk = wavenumberStep(waves.lattice);
  const omegaOfTurn = (2 * Math.PI) / waves.periodS;
  const sum = new Float64Array(13);
  for (let iy = 0, i = 0; iy < N; iy++) {
    const ky = dk * waveIndex(iy, N);
    for (let ix = 0; ix < N; ix++, i++) {
      const re = A[2 * i];
      const im = A[2 * i + 1];
      if (re === 0 && im === 0) continue;
      const kx = dk * waveIndex(ix, N);
      const j = oppositeIndex(iy, N) * N + oppositeIndex(ix, N);
      const omega = turns[i] * omegaOfTurn;
      const square = 2 * (re * re + im * im);
      let height = square;
      let rate = square * omega * omega;
      if ((turns[i] + turns[j]) % frameCount === 0) {
        const cross = 2 * (re * A[2 * j] - im * A[2 * j + 1]);
        height += cross;
        rate -= cross * omega * turns[j] * omegaOfTurn;
      }
      const q = (horizontalScale * cothKh(Math.hypot(kx, ky), depthM)) / Math.hypot(kx, ky);
      sum[0] += height;
      sum[1] += height * (kx * q) ** 2;
      sum[2] += height * (ky * q) ** 2;
      sum[3] += rate * (kx * q) ** 2;
      sum[4] += rate * (ky * q) ** 2;
      sum[5] += rate;
      sum[6] += height * kx * kx;
      sum[7] += height * ky * ky;
      sum[8] += height * (kx * kx * q) ** 2;
      sum[9] += height * (ky * ky * q) ** 2;
      sum[10] += height * (kx * ky * q) ** 2;
      sum[11] += height * ((kx * kx + ky * ky) * q) ** 2;
      sum[12] += height * kx * ky;
    }
  }
  const [height, displacementEast, displacementNorth, velocityEast, velocityNorth, velocityUp] = sum.map(
    Math.sqrt,
  );
  const [slopeEast, slopeNorth, strainEastEast, strainNorthNorth, strainEastNorth, compression] = sum
    .subarray(6, 12)
    .map(Math.sqrt);
  return {
    height,
    displacementEast,
    displacementNorth,
    velocityEast,
    velocityNorth,
    velocityUp,
    slopeEast,
    slopeNorth,
    slopeProduct: sum[12],
    strainEastEast,
    strainNorthNorth,
    strainEastNorth,
    compression,
  };
}
