import { smoothstep } from './band.ts';

/**
 * Whole turns a wave makes in one loop, signed (positive: its phase runs toward +k).
 *
 *     m = round((sigma + k.U) T / 2 pi)
 *
 * Where this is 0 though the wave is merely longer than the loop (sigma T / 2 pi < 1/2), it turns once, in its own
 * sense; a wave that the current holds in place stays at 0.
 *
 * @param omegaRadPerS absolute angular frequency sigma + k.U, rad/s, signed
 * @param sigmaRadPerS intrinsic angular frequency, rad/s, positive
 * @param periodS length of the loop, s
 */
export function turnsPerLoop(omegaRadPerS: number, sigmaRadPerS: number, periodS: number): number {
  const perTurn = periodS / (2 * Math.PI);
  const m = Math.round(omegaRadPerS * perTurn);
  if (m !== 0) return m;
  if (sigmaRadPerS * perTurn < 0.5) return omegaRadPerS < 0 ? -1 : 1;
  return 0;
}

/** Waves fade out between this share of N/2 turns and N/2 turns. */
const FADE_FROM = 0.9;

/**
 * Share of a wave's energy that N frames can show: 1 up to 0.9 * N/2 turns, falling smoothly to 0 at N/2 turns.
 * Faster waves would appear to run backwards.
 */
export function shownShare(turns: number, frameCount: number): number {
  const x = Math.abs(turns) / (frameCount / 2);
  return x >= 1 ? 0 : 1 - smoothstep((x - FADE_FROM) / (1 - FADE_FROM));
}
