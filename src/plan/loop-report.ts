import { absoluteAngularFrequency, angularFrequency } from '../physics/dispersion.ts';
import type { Current, Water } from '../physics/water.ts';
import { loopSeconds } from '../sea/loop-length.ts';
import type { Loop } from '../sea/sea.ts';
import { bandWeight } from '../waves/band.ts';
import type { LatticeTally } from '../waves/lattice-tally.ts';
import { type RadialTable, radialIntegral, wavevectorDensity } from '../waves/radial-table.ts';
import { turnsPerLoop } from '../waves/turns.ts';
import type { CascadeLayout } from './cascade-layout.ts';
import type { CascadeLoopReport, LoopReport, LoopSuggestion } from './plan.ts';

/** Suggested lengths lie within this factor of the asked one, and within a few times it for a truer loop. */
const NEAR = 1.15;
const FAR = 4;
/** A suggestion must cut the error to this share of what it is. */
const WORTHWHILE = 0.8;

/** What quantising every wave to whole turns does to the motion, over all cascades and each alone. */
export function loopReport(
  layouts: readonly CascadeLayout[],
  tallies: readonly (readonly LatticeTally[])[],
  tables: readonly RadialTable[],
  loop: Loop,
  water: Water,
  current: Current,
): LoopReport {
  const cascades = layouts.map((layout, c) => cascadeLoopReport(`c${c}`, layout, tallies[c]));
  const all = tallies.flatMap((list, c) => {
    // Slopes of different tiles are counted in units of each tile's own wavenumber step.
    const dk2 = ((2 * Math.PI) / layouts[c].patchLengthM) ** 2;
    return list.map((tally) => ({ tally, dk2 }));
  });
  const total = (value: (tally: LatticeTally, dk2: number) => number): number =>
    all.reduce((sum, { tally, dk2 }) => sum + value(tally, dk2), 0);
  const m0 = total((tally) => tally.variance);
  const slope = total((tally, dk2) => tally.slope * dk2);
  const samples = frequencySamples(tables, water, current);
  const seconds = loopSeconds(loop);
  return {
    seconds,
    askedSeconds: loop.askedSeconds,
    frequencyError: Math.sqrt(total((tally) => tally.frequencyError) / m0),
    slopeFrequencyError: Math.sqrt(total((tally, dk2) => tally.slopeFrequencyError * dk2) / slope),
    longerThanLoop: total((tally) => tally.longerThanLoop) / m0,
    aboveHalfFrames: total((tally) => tally.aboveHalfFrames) / m0,
    blendingLoss: total((tally) => tally.blendingLoss) / m0,
    slopeBlendingLoss: total((tally, dk2) => tally.slopeBlendingLoss * dk2) / slope,
    peakSpeedError: peakSpeedError(layouts, tables, water, current),
    suggestions: loopSuggestions(samples, loop),
    cascades,
  };
}

function cascadeLoopReport(
  id: string,
  layout: CascadeLayout,
  tallies: readonly LatticeTally[],
): CascadeLoopReport {
  const total = (value: (tally: LatticeTally) => number): number =>
    tallies.reduce((sum, tally) => sum + value(tally), 0);
  const m0 = total((tally) => tally.variance) || 1;
  const slope = total((tally) => tally.slope) || 1;
  return {
    id,
    seconds: loopSeconds(layout.loop),
    frameCount: layout.loop.frameCount,
    frequencyError: Math.sqrt(total((tally) => tally.frequencyError) / m0),
    slopeFrequencyError: Math.sqrt(total((tally) => tally.slopeFrequencyError) / slope),
    longerThanLoop: total((tally) => tally.longerThanLoop) / m0,
    aboveHalfFrames: total((tally) => tally.aboveHalfFrames) / m0,
    blendingLoss: total((tally) => tally.blendingLoss) / m0,
    slopeBlendingLoss: total((tally) => tally.slopeBlendingLoss) / slope,
  };
}

/**
 * Relative speed error of the wave at the peak of the highest system, travelling in its mean direction, in the loop of
 * the cascade that holds most of it.
 */
function peakSpeedError(
  layouts: readonly CascadeLayout[],
  tables: readonly RadialTable[],
  water: Water,
  current: Current,
): number {
  const energies = tables.map((table) => radialIntegral(table, () => 1));
  const { spectrum } = tables[energies.indexOf(Math.max(...energies))];
  const { towardRad } = spectrum.system;
  const k = spectrum.peakWavenumberRadPerM;
  const holder = layouts.reduce((a, b) => (bandWeight(k, b.band) > bandWeight(k, a.band) ? b : a));
  const seconds = loopSeconds(holder.loop);
  const omega = absoluteAngularFrequency(k * Math.cos(towardRad), k * Math.sin(towardRad), water, current);
  const m = turnsPerLoop(omega, spectrum.omegaPeakRadPerS, seconds);
  return ((2 * Math.PI * m) / seconds - omega) / spectrum.omegaPeakRadPerS;
}

/** Parallel Float64Arrays: absolute and intrinsic frequency (rad/s) and variance (any unit) of sampled waves. */
interface FrequencySamples {
  readonly omega: Float64Array;
  readonly sigma: Float64Array;
  readonly variance: Float64Array;
}

/** Waves of the continuous spectrum, by frequency alone in still water and by direction as well on a current. */
function frequencySamples(tables: readonly RadialTable[], water: Water, current: Current): FrequencySamples {
  const still = current.eastMps === 0 && current.northMps === 0;
  const angles = still ? 1 : 36;
  const omega: number[] = [];
  const sigma: number[] = [];
  const variance: number[] = [];
  for (const table of tables) {
    const { wavenumber, density } = table;
    const peak = density.reduce((a, E, i) => Math.max(a, E * wavenumber[i]), 0);
    for (let i = 0; i < wavenumber.length; i += 8) {
      const k = wavenumber[i];
      if (density[i] * k < 1e-5 * peak) continue;
      for (let a = 0; a < angles; a++) {
        const theta = (2 * Math.PI * a) / angles;
        const [kEast, kNorth] = [k * Math.cos(theta), k * Math.sin(theta)];
        sigma.push(angularFrequency(k, water));
        omega.push(still ? sigma[sigma.length - 1] : absoluteAngularFrequency(kEast, kNorth, water, current));
        variance.push(still ? density[i] * k : wavevectorDensity(table, kEast, kNorth) * k * k);
      }
    }
  }
  return {
    omega: Float64Array.from(omega),
    sigma: Float64Array.from(sigma),
    variance: Float64Array.from(variance),
  };
}

/** Energy-weighted rms relative error of frequency for a loop of this length, from sampled waves. */
function sampledFrequencyError(samples: FrequencySamples, seconds: number): number {
  const { omega, sigma, variance } = samples;
  let sum = 0;
  let total = 0;
  for (let i = 0; i < omega.length; i++) {
    const m = turnsPerLoop(omega[i], sigma[i], seconds);
    const error = ((2 * Math.PI * m) / seconds - omega[i]) / sigma[i];
    sum += variance[i] * error * error;
    total += variance[i];
  }
  return Math.sqrt(sum / total);
}

/**
 * Loop lengths, in whole frames, that distort the motion less: the best near the asked one, and the shortest longer
 * one that is clearly better still.
 */
function loopSuggestions(samples: FrequencySamples, loop: Loop): readonly LoopSuggestion[] {
  const [numerator, denominator] = loop.frameRate;
  const asked = sampledFrequencyError(samples, loopSeconds(loop));
  const suggestion = (frameCount: number): LoopSuggestion => {
    const seconds = (frameCount * denominator) / numerator;
    return { seconds, frameCount, frequencyError: sampledFrequencyError(samples, seconds) };
  };
  const found: LoopSuggestion[] = [];
  const lengths = frameCounts(loop.frameCount / NEAR, loop.frameCount * NEAR).map(suggestion);
  const near = lengths.reduce((a, b) => (b.frequencyError < a.frequencyError ? b : a));
  if (near.frequencyError < WORTHWHILE * asked) found.push(near);
  const goal = asked > 0.1 ? 0.1 : asked / 2;
  for (const frameCount of frameCounts(loop.frameCount * NEAR, loop.frameCount * FAR)) {
    const longer = suggestion(frameCount);
    if (longer.frequencyError < goal) {
      found.push(longer);
      break;
    }
  }
  return found;
}

/** At most about 80 whole numbers from a to b. */
function frameCounts(a: number, b: number): readonly number[] {
  const first = Math.max(2, Math.ceil(a));
  const step = Math.max(1, Math.round((b - first) / 80));
  const counts: number[] = [];
  for (let n = first; n <= Math.floor(b); n += step) counts.push(n);
  return counts.length > 0 ? counts : [first];
}
