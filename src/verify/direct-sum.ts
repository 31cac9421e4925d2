import { cothKh } from '../physics/dispersion.ts';
import { waveIndex } from '../waves/lattice.ts';
import type { CascadeFacts } from './cascade-facts.ts';

/** Every linear field at one texel, SI. */
export interface TexelValues {
  readonly height: number;
  readonly east: number;
  readonly north: number;
  readonly heightRate: number;
  readonly eastRate: number;
  readonly northRate: number;
  readonly Sx: number;
  readonly Sy: number;
  readonly Dxx: number;
  readonly Dyy: number;
  readonly Dxy: number;
}

/**
 * The fields of a frame at single texels, as the sum of all waves drawn anew from the manifest: for each wave
 * a cos(theta - alpha) = 2 Re A e^{i theta} with theta = k.x - 2 pi m n / N,
 *
 *     eta = 2 Re A e^{i theta},   D = -2 coth(kh) khat horizontalScale Im A e^{i theta},
 *     d/dt = multiply by -i omega,   d/dx = multiply by i kx,   omega = 2 pi m / T.
 *
 * @param facts the cascade
 * @param frame index of the frame, 0 for the first
 * @returns fields at texel (ix, iy), counted from the south-west
 */
export function directSum(facts: CascadeFacts, frame: number): (ix: number, iy: number) => TexelValues {
  const { amplitudes } = facts.waves();
  const { amplitude: A, turns, frameCount, periodS } = amplitudes;
  const N = facts.cascade.resolution;
  const { dkRadPerM: dk, water, manifest } = facts;
  const omegaOfTurn = (2 * Math.PI) / periodS;
  return (ix, iy) => {
    const sum = {
      height: 0,
      east: 0,
      north: 0,
      heightRate: 0,
      eastRate: 0,
      northRate: 0,
      Sx: 0,
      Sy: 0,
      Dxx: 0,
      Dyy: 0,
      Dxy: 0,
    };
    for (let row = 0, i = 0; row < N; row++) {
      const ny = waveIndex(row, N);
      for (let column = 0; column < N; column++, i++) {
        if (A[2 * i] === 0 && A[2 * i + 1] === 0) continue;
        const nx = waveIndex(column, N);
        const across = (nx * ix + ny * iy) % N;
        const turned = (turns[i] * frame) % frameCount;
        const theta = 2 * Math.PI * (across / N - turned / frameCount);
        const [c, s] = [Math.cos(theta), Math.sin(theta)];
        const re = 2 * (A[2 * i] * c - A[2 * i + 1] * s);
        const im = 2 * (A[2 * i] * s + A[2 * i + 1] * c);
        const [kx, ky] = [dk * nx, dk * ny];
        const k = Math.sqrt(kx * kx + ky * ky);
        const q = (manifest.sea.horizontalScale * cothKh(k, water.depthM)) / k;
        const omega = turns[i] * omegaOfTurn;
        sum.height += re;
        sum.east -= kx * q * im;
        sum.north -= ky * q * im;
        sum.heightRate += omega * im;
        sum.eastRate += omega * kx * q * re;
        sum.northRate += omega * ky * q * re;
        sum.Sx -= kx * im;
        sum.Sy -= ky * im;
        sum.Dxx -= kx * kx * q * re;
        sum.Dyy -= ky * ky * q * re;
        sum.Dxy -= kx * ky * q * re;
      }
    }
    return sum;
  };
}
