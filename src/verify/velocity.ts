import { oppositeIndex } from '../waves/lattice.ts';
import type { CascadeFacts } from './cascade-facts.ts';
import type { MeasuredWaves } from './measured-waves.ts';
import { type BandWave, forEachBandWave } from './surface.ts';
import type { Prediction } from './surface-shape.ts';

/**
 * Velocity of any frame from the waves that the loop of height frames shows, the time derivative of the loop as written:
 *
 *     w(k) = -i omega Z(k) e^{-i phi(k)} + i omega' conj Z(-k) e^{+i phi(-k)},   u(k) = i khat coth(kh) horizontalScale w(k)
 *
 * with omega = 2 pi m / T of each. Its error is that of Z, the rounding of the height averaged over the loop.
 */
export function velocityMaker(
  facts: CascadeFacts,
  { amplitude: Z, turns, frameCount, periodS, rounding }: MeasuredWaves,
): (frame: number) => readonly [Prediction, Prediction, Prediction] {
  const N = facts.cascade.resolution;
  const transform = facts.transform();
  const omegaOfTurn = (2 * Math.PI) / periodS;
  const band: BandWave[] = [];
  forEachBandWave(facts, (wave) => band.push(wave));
  const opposite = (i: number): number => oppositeIndex(Math.floor(i / N), N) * N + oppositeIndex(i % N, N);
  // White noise of mean square e in every frame leaves e / (N^2 frames) in each |Z|^2.
  const noise = rounding / (N * N * frameCount);
  const squares = { east: 0, north: 0, up: 0 };
  for (const { i, kx, ky, q } of band) {
    const w = noise * omegaOfTurn * omegaOfTurn * (turns[i] ** 2 + turns[opposite(i)] ** 2);
    squares.up += w;
    squares.east += w * (kx * q) ** 2;
    squares.north += w * (ky * q) ** 2;
  }

  return (frame) => {
    const rate = new Float64Array(2 * N * N);
    const pair = new Float64Array(2 * N * N);
    for (const { i, kx, ky, q } of band) {
      const j = opposite(i);
      const [wRe, wIm] = rateOf(Z, turns, i, j, frame, frameCount, omegaOfTurn);
      rate[2 * i] = wRe;
      rate[2 * i + 1] = wIm;
      // i kx q w + i (i ky q w)
      pair[2 * i] = -q * (kx * wIm + ky * wRe);
      pair[2 * i + 1] = q * (kx * wRe - ky * wIm);
    }
    transform.synthesise(rate);
    transform.synthesise(pair);
    const up = Float64Array.from({ length: N * N }, (_, i) => rate[2 * i]);
    const east = Float64Array.from({ length: N * N }, (_, i) => pair[2 * i]);
    const north = Float64Array.from({ length: N * N }, (_, i) => pair[2 * i + 1]);
    return [
      { values: east, errorSquare: squares.east },
      { values: north, errorSquare: squares.north },
      { values: up, errorSquare: squares.up },
    ];
  };
}

/** w(k) of wave i at a frame; where k and -k stand, Z holds both and counts once. */
function rateOf(
  Z: Float64Array,
  turns: Int32Array,
  i: number,
  j: number,
  frame: number,
  frameCount: number,
  omegaOfTurn: number,
): readonly [re: number, im: number] {
  const omega = turns[i] * omegaOfTurn;
  const omegaOpposite = turns[j] * omegaOfTurn;
  const phi = (2 * Math.PI * ((turns[i] * frame) % frameCount)) / frameCount;
  const psi = (2 * Math.PI * ((turns[j] * frame) % frameCount)) / frameCount;
  const standing = (turns[i] + turns[j]) % frameCount === 0;
  const share = standing ? 0.5 : 1;
  // Z e^{-i phi}, conj Z(-k) e^{+i psi}
  const aRe = share * (Z[2 * i] * Math.cos(phi) + Z[2 * i + 1] * Math.sin(phi));
  const aIm = share * (Z[2 * i + 1] * Math.cos(phi) - Z[2 * i] * Math.sin(phi));
  const bRe = share * (Z[2 * j] * Math.cos(psi) + Z[2 * j + 1] * Math.sin(psi));
  const bIm = share * (Z[2 * j] * Math.sin(psi) - Z[2 * j + 1] * Math.cos(psi));
  return [omega * aIm - omegaOpposite * bIm, omegaOpposite * bRe - omega * aRe];
}
