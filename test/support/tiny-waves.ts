import { float64Engine } from '../../src/field/float64-engine.ts';
import { FIELD_NAMES, type FieldName, type FrameFields } from '../../src/field/frame-fields.ts';
import { synthesis } from '../../src/field/synthesis.ts';
import { SEA_WATER_DEFAULTS } from '../../src/physics/water.ts';
import { jonswapAlpha } from '../../src/spectrum/jonswap.ts';
import type { Band } from '../../src/waves/band.ts';
import type { CascadeRequest, SeaWavesRequest } from '../../src/waves/cascade-waves.ts';
import { type Lattice, nyquistWavenumber } from '../../src/waves/lattice.ts';
import type { WaveAmplitudes } from '../../src/waves/wave-amplitudes.ts';
import type { WaveSystem } from '../../src/waves/wave-system.ts';
import { scattered } from './image-scenes.ts';

/** eta = a cos(k.x - 2 pi m t / T + phase), x from the centre of texel (0, 0). */
export interface HandWave {
  readonly nx: number;
  readonly ny: number;
  readonly amplitudeM: number;
  readonly phaseRad?: number;
  readonly turns: number;
}

export interface HandLoop {
  readonly frameCount: number;
  readonly periodS: number;
}

/** A tile that carries the given waves and no other. */
export function handWaves(lattice: Lattice, loop: HandLoop, waves: readonly HandWave[]): WaveAmplitudes {
  const N = lattice.resolution;
  const amplitude = new Float64Array(2 * N * N);
  const turns = new Int32Array(N * N);
  for (const { nx, ny, amplitudeM, phaseRad = 0, turns: m } of waves) {
    const i = ((ny + N) % N) * N + ((nx + N) % N);
    amplitude[2 * i] += (amplitudeM / 2) * Math.cos(phaseRad);
    amplitude[2 * i + 1] += (amplitudeM / 2) * Math.sin(phaseRad);
    turns[i] = m;
  }
  return { lattice, ...loop, amplitude, turns };
}

/** Waves at every wavevector of a tile, steep and in no order: k and -k turn differently, some run backwards, some stand. */
export function scatteredWaves(lattice: Lattice, loop: HandLoop, seed: number): WaveAmplitudes {
  const N = lattice.resolution;
  const waves: HandWave[] = [];
  for (let ny = 1 - N / 2; ny < N / 2; ny++) {
    for (let nx = 1 - N / 2; nx < N / 2; nx++) {
      if (nx === 0 && ny === 0) continue;
      const at = 4 * ((seed * N + ny + N) * N + nx + N);
      waves.push({
        nx,
        ny,
        amplitudeM: (scattered(at) * lattice.patchLengthM) / (100 * (nx * nx + ny * ny)),
        phaseRad: 2 * Math.PI * scattered(at + 1),
        turns: Math.round((scattered(at + 2) - 0.3) * 0.6 * loop.frameCount),
      });
    }
  }
  return handWaves(lattice, loop, waves);
}

/** All fields of one frame, copied out of the synthesis. */
export function frameFields(
  waves: WaveAmplitudes,
  frame: number,
  depthM = Infinity,
  horizontalScale = 1,
  fields: readonly FieldName[] = FIELD_NAMES,
): Required<FrameFields> {
  const engine = float64Engine(waves.lattice.resolution);
  const made = synthesis(waves, engine, { depthM, horizontalScale, fields: new Set(fields) }).frame(frame);
  return Object.fromEntries(Object.entries(made).map(([name, field]) => [name, field.slice()])) as never;
}

/** A JONSWAP system with cos-2s spreading, by what one says of a sea. */
export function jonswapSystem(
  name: string,
  significantHeightM: number,
  peakPeriodS: number,
  changes: { readonly towardRad?: number; readonly gamma?: number; readonly s?: number } = {},
): WaveSystem {
  const { towardRad = 0, gamma = 3.3, s = 10 } = changes;
  const omegaPeakRadPerS = (2 * Math.PI) / peakPeriodS;
  const alpha = jonswapAlpha(significantHeightM, omegaPeakRadPerS, gamma, SEA_WATER_DEFAULTS.gravityMps2);
  return {
    name,
    towardRad,
    spectrum: { form: 'jonswap', alpha, omegaPeakRadPerS, peakEnhancement: gamma, energyFactor: 1 },
    spreading: { form: 'cos-2s', s, omegaPeakRadPerS, swellNarrowing: 0 },
    againstShare: 1,
  };
}

/** The band of a lone tile: no lower limit, ending at half of Nyquist with the standard fade. */
export function loneBand(lattice: Lattice): Band {
  return { low: null, high: { kRadPerM: (0.5 * nyquistWavenumber(lattice)) / 1.25, fade: 1.25 } };
}

/** A lone cascade: 64 texels over 60 m, 48 frames of 6 s. */
export function loneCascade(changes: Partial<CascadeRequest> = {}): CascadeRequest {
  const lattice = { patchLengthM: changes.patchLengthM ?? 60, resolution: changes.resolution ?? 64 };
  return { ...lattice, band: loneBand(lattice), frameCount: 48, periodS: 6, ...changes };
}

/** A wind sea of 0.5 m and 3 s going east on still, deep water; one lone cascade, Gaussian, height left as drawn. */
export function seaRequest(changes: Partial<SeaWavesRequest> = {}): SeaWavesRequest {
  return {
    water: SEA_WATER_DEFAULTS,
    current: { eastMps: 0, northMps: 0 },
    systems: [jonswapSystem('wind sea', 0.5, 3)],
    gains: [],
    cascades: [loneCascade()],
    seed: 1,
    amplitudes: 'gaussian',
    matchHeight: false,
    ...changes,
  };
}

/** Root mean square. */
export function rms(values: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i] * values[i];
  return Math.sqrt(sum / values.length);
}

/** Largest |a - b|. */
export function largestDifference(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let largest = 0;
  for (let i = 0; i < a.length; i++) largest = Math.max(largest, Math.abs(a[i] - b[i]));
  return largest;
}
