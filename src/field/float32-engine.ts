import { roundedUp64 } from '../kernel/alignment.ts';
import { stripsBytes } from '../kernel/wave/layout.ts';
import { transformPlanBytes, writeTransformPlan } from '../kernel/wave/transform-plan.ts';
import { LARGEST_MEMORY, type WaveKernel, waveKernel } from '../kernel/wave/wave-kernel.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import { blockBytes } from './float32-blocks.ts';
import { heldPairs, isMoving, pairStore, pairsOf } from './float32-pairs.ts';
import type { SampledValue, SampleStatistics, SamplesRequest } from './float32-requests.ts';
import { sampler } from './float32-samples.ts';
import { type Float32Waves, float32Waves, keptBytesPerVector } from './float32-waves.ts';
import type { FieldName } from './frame-fields.ts';
import { discHalfPlane } from './half-plane.ts';
import type { SynthesisOptions } from './synthesis.ts';

/** Fields of one frame: Float32Array of N*N each, row-major [iy][ix], row 0 in the south, values at texel centres. */
export type Float32Fields = Partial<Readonly<Record<FieldName, Float32Array>>>;

/**
 * Makes the frames of one cascade. A frame stays until the next `turnTo` or `frame` of any synthesis of the same
 * engine: they share their work memory.
 */
export interface Float32Synthesis {
  /** Turns the waves to frame n, any integer; n + N gives the same bits as n. What follows is of this frame. */
  turnTo(n: number): void;
  /**
   * Fills samples of maps, up to eight in one pass over the fields. Transforms are made when first needed and kept for
   * the frame's other maps.
   * @returns statistics by request and channel
   */
  samples(requests: readonly SamplesRequest[]): readonly (readonly SampleStatistics[])[];
  /** Largest magnitude of values over the tile, of J - 1 for `jacobian`; NaN where one is not a number. */
  largest(values: readonly SampledValue[]): readonly number[];
  /** One value of the frame over the tile, J - 1 for `jacobian`: a new Float32Array N*N, row 0 in the south. */
  values(value: SampledValue): Float32Array;
  /** Turns to frame n and copies all its fields. The arrays are the synthesis's own: the next call overwrites them. */
  frame(n: number): Float32Fields;
}

/** The engine of one thread: one kernel, whose memory all its cascades share. */
export interface Float32Engine {
  synthesis(waves: WaveAmplitudes, options: SynthesisOptions): Float32Synthesis;
  /** Bytes of the kernel's memory now. */
  readonly memoryBytes: number;
}

/**
 * The fast engine: float32 in WebAssembly SIMD.
 *
 * Fields agree with the float64 engine within 1e-6 of the largest field of their kind (lengths; slopes and strains;
 * speeds). The same bytes on every processor: no relaxed SIMD, no fused multiply-add, sums in fixed order
 * (test/unit/field/float32-engine.test.ts).
 *
 * @param memoryLimit bytes the kernel's memory may reach
 */
export function float32Engine(memoryLimit: number = LARGEST_MEMORY): Float32Engine {
  const kernel = waveKernel();
  const transformPlans = new Map<number, number>();
  const transformPlan = (N: number): number => {
    const made = transformPlans.get(N);
    if (made !== undefined) return made;
    const address = kernel.keep(transformPlanBytes(N));
    writeTransformPlan(kernel.buffer, address, N);
    transformPlans.set(N, address);
    return address;
  };
  let borrower: object | null = null;

  return {
    synthesis(waves, options) {
      borrower = null;
      const N = waves.lattice.resolution;
      const pairs = pairsOf(options.fields);
      const moving = pairs.some(isMoving);
      const plan = transformPlan(N);
      const turned = float32Waves(kernel, waves, { ...options, moving });
      const parts = lentParts(N, turned, moving, pairs.length, memoryLimit - kernel.keptBytes);
      const self = {};
      let base = 0;
      const store = pairStore(
        kernel.program,
        options.fields,
        () => ({ plan, waves: turned, height: base + parts.height, rate: base + parts.rate }),
        () => parts.strips.map((offset) => base + offset),
      );
      const { samples, largest, fillValues } = sampler(kernel, store, N);
      const requireFrame = () => {
        if (borrower !== self)
          throw new Error('another cascade has used the work memory since this frame was made');
      };
      const turnTo = (n: number) => {
        base = kernel.lend(parts.bytes);
        borrower = self;
        store.forget();
        turned.fillPhases(((n % waves.frameCount) + waves.frameCount) % waves.frameCount);
        evolve(kernel, turned, base + parts.height, moving ? base + parts.rate : null);
      };
      const planes = new Map<FieldName, Float32Array>();
      return {
        turnTo,
        samples(requests) {
          requireFrame();
          const address = base + parts.block;
          // With room for all pairs no request takes another's fields away.
          if (parts.strips.length === pairs.length) return samples(requests, address);
          return requests.flatMap((request) => samples([request], address));
        },
        largest(values) {
          requireFrame();
          return largest(values, base + parts.block);
        },
        values(value) {
          requireFrame();
          const out = new Float32Array(N * N);
          fillValues(out, value, base + parts.block);
          return out;
        },
        frame(n) {
          turnTo(n);
          for (const field of options.fields) {
            const plane = planes.get(field) ?? new Float32Array(N * N);
            planes.set(field, plane);
            fillValues(plane, field, base + parts.block);
          }
          return Object.fromEntries(planes);
        },
      };
    },
    get memoryBytes() {
      return kernel.memoryBytes;
    },
  };
}

function evolve({ program }: WaveKernel, waves: Float32Waves, height: number, rate: number | null): void {
  const { coefficients, turns, phases, omega, plane } = waves;
  const count = plane.vectors;
  if (waves.still) {
    program.evolveStill(height, coefficients, turns, phases, count);
    if (rate !== null) program.evolveStillRate(rate, coefficients, turns, phases, omega, count);
  } else {
    program.evolveMoving(height, coefficients, turns, phases, count);
    if (rate !== null) program.evolveMovingRate(rate, coefficients, turns, phases, omega, count);
  }
}

/** What a frame needs of the work memory, as offsets from its beginning. */
interface LentParts {
  /** h and its rate of change: a complex vector for each vector of waves. */
  readonly height: number;
  readonly rate: number;
  readonly block: number;
  /** One place for each pair held at a time. */
  readonly strips: readonly number[];
  readonly bytes: number;
}

function lentParts(
  N: number,
  { plane }: Pick<Float32Waves, 'plane'>,
  moving: boolean,
  pairs: number,
  room: number,
): LentParts {
  const spectrumBytes = roundedUp64(32 * plane.vectors);
  const block = spectrumBytes * (moving ? 2 : 1);
  const firstStrips = block + blockBytes(N);
  const pairBytes = roundedUp64(stripsBytes(N));
  const held = heldPairs(pairs, N, room - firstStrips);
  const strips = Array.from({ length: held }, (_, p) => firstStrips + p * pairBytes);
  return { height: 0, rate: spectrumBytes, block, strips, bytes: firstStrips + held * pairBytes };
}

/** Bytes of one thread's kernel for a cascade. */
export interface KernelBytes {
  /** The waves and the transform's tables: each cascade has its own. */
  readonly kept: number;
  /** Work memory of a frame: the largest of the cascades counts. */
  readonly lent: number;
}

/**
 * Memory that a cascade takes in one thread's kernel, before there are waves.
 *
 * @param resolution N
 * @param fields the fields its maps are made from
 * @param waves largest |n| of its waves, lattice steps, and whether a current makes k and -k turn differently
 * @throws RangeError where the kernel cannot hold it
 */
export function kernelBytes(
  resolution: number,
  fields: ReadonlySet<FieldName>,
  waves: { readonly reach: number; readonly current: boolean },
): KernelBytes {
  const N = resolution;
  const pairs = pairsOf(fields);
  const moving = pairs.some(isMoving);
  const plane = discHalfPlane(N, waves.reach);
  const kept =
    plane.vectors * keptBytesPerVector(!waves.current, moving) + transformPlanBytes(N) + 4 * N + ROW_WORK;
  const { bytes } = lentParts(N, { plane }, moving, pairs.length, LARGEST_MEMORY - kept);
  return { kept, lent: bytes };
}

/** Row planes, spans, phases and rounding to cache lines; the phases of a loop of 10,000 frames are 40 kB. */
const ROW_WORK = 192 * 1024;
