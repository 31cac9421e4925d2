import { waveIndex, wavenumberStep } from '../waves/lattice.ts';
import type { MeasuredWaves } from './measured-waves.ts';

/** Moments of the waves that a loop shows. */
export interface WaveMoments {
  /** Variance, m^2, and variance times frequency squared, m^2 (rad/s)^2. */
  readonly m0: number;
  readonly m2: number;
  /** Slope variance along and across the wind. */
  readonly alongWind: number;
  readonly acrossWind: number;
  /** Variance by frequency, in turns per loop; and the loop's length, s. */
  readonly byTurns: ReadonlyMap<number, number>;
  readonly periodS: number;
}

/** @param windTowardRad direction the wind blows toward, rad counter-clockwise from east */
export function waveMoments(waves: MeasuredWaves, windTowardRad: number): WaveMoments {
  const { variance, turns, lattice, periodS } = waves;
  const N = lattice.resolution;
  const dk = wavenumberStep(lattice);
  const [c, s] = [Math.cos(windTowardRad), Math.sin(windTowardRad)];
  const byTurns = new Map<number, number>();
  let [m0, m2, alongWind, acrossWind] = [0, 0, 0, 0];
  for (let i = 0; i < variance.length; i++) {
    const E = variance[i];
    if (E === 0) continue;
    const kx = dk * waveIndex(i % N, N);
    const ky = dk * waveIndex(Math.floor(i / N), N);
    const m = Math.abs(turns[i]);
    const omega = (2 * Math.PI * m) / periodS;
    m0 += E;
    m2 += E * omega * omega;
    alongWind += E * (kx * c + ky * s) ** 2;
    acrossWind += E * (ky * c - kx * s) ** 2;
    byTurns.set(m, (byTurns.get(m) ?? 0) + E);
  }
  return { m0, m2, alongWind, acrossWind, byTurns, periodS };
}

/**
 * Peak period by the fourth power of the spectrum, which one tall line of a random spectrum does not throw about as it
 * does the largest value:
 *
 *     fp = sum of f E^4 / sum of E^4
 *
 * Source: Young 1995 (from memory). Cascades are put together by frequency, in steps of the longest loop's turn.
 *
 * @returns s; null without waves
 */
export function peakPeriodS(cascades: readonly WaveMoments[]): number | null {
  const longest = Math.max(...cascades.map(({ periodS }) => periodS));
  const E = new Map<number, number>();
  for (const { byTurns, periodS } of cascades) {
    for (const [m, variance] of byTurns) {
      const bin = Math.round((m * longest) / periodS);
      E.set(bin, (E.get(bin) ?? 0) + variance);
    }
  }
  let [moment, sum] = [0, 0];
  for (const [bin, variance] of E) {
    moment += (bin / longest) * variance ** 4;
    sum += variance ** 4;
  }
  return moment > 0 ? sum / moment : null;
}
