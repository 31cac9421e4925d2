import { FIELD_NAMES, type FieldName } from '../../src/field/frame-fields.ts';
import type { WaveAmplitudes } from '../../src/waves/wave-amplitudes.ts';

type Fields = Record<FieldName, Float64Array>;

/**
 * Every field of a frame as the plain sum of its waves, in real numbers, with no transform. A wave of amplitude
 * a = 2 |A| has the phase theta = k.x - omega t + arg A, with x from the centre of texel (0, 0):
 *
 *     height a cos theta;  displacement -a s coth(kh) khat sin theta;  and their derivatives in x and t
 *
 * @param frame may be fractional: the loop in continuous time
 * @param depthM `Infinity` for deep water
 * @param scale s, the horizontal scale
 */
export function directFields(waves: WaveAmplitudes, frame: number, depthM: number, scale: number): Fields {
  const { amplitude: A, turns, frameCount, periodS, lattice } = waves;
  const { resolution: N, patchLengthM: L } = lattice;
  const fields = Object.fromEntries(FIELD_NAMES.map((name) => [name, new Float64Array(N * N)])) as Fields;
  for (let i = 0; i < N * N; i++) {
    const a = 2 * Math.hypot(A[2 * i], A[2 * i + 1]);
    if (a === 0) continue;
    const nx = i % N < N / 2 ? i % N : (i % N) - N;
    const ny = Math.floor(i / N) < N / 2 ? Math.floor(i / N) : Math.floor(i / N) - N;
    const [kx, ky] = [(2 * Math.PI * nx) / L, (2 * Math.PI * ny) / L];
    const k = Math.hypot(kx, ky);
    const e = Math.exp(-2 * k * depthM);
    const stretch = (scale * (1 + e)) / (1 - e);
    const [sx, sy] = [(stretch * kx) / k, (stretch * ky) / k];
    const omega = (2 * Math.PI * turns[i]) / periodS;
    const start =
      Math.atan2(A[2 * i + 1], A[2 * i]) - (2 * Math.PI * ((turns[i] * frame) % frameCount)) / frameCount;
    for (let iy = 0, o = 0; iy < N; iy++) {
      for (let ix = 0; ix < N; ix++, o++) {
        const theta = start + (2 * Math.PI * (nx * ix + ny * iy)) / N;
        const [c, s] = [a * Math.cos(theta), a * Math.sin(theta)];
        fields.height[o] += c;
        fields.displacementEast[o] -= sx * s;
        fields.displacementNorth[o] -= sy * s;
        fields.slopeEast[o] -= kx * s;
        fields.slopeNorth[o] -= ky * s;
        fields.strainEastEast[o] -= sx * kx * c;
        fields.strainNorthNorth[o] -= sy * ky * c;
        fields.strainEastNorth[o] -= sx * ky * c;
        fields.velocityEast[o] += sx * omega * c;
        fields.velocityNorth[o] += sy * omega * c;
        fields.velocityUp[o] += omega * s;
      }
    }
  }
  return fields;
}
