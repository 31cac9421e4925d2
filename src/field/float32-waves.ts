import { ROW_PLANE, WAVES_PLAN } from '../kernel/wave/layout.ts';
import type { WaveKernel } from '../kernel/wave/wave-kernel.ts';
import { cothKh } from '../physics/dispersion.ts';
import { waveIndex, wavenumberStep } from '../waves/lattice.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import { forEachWave, type HalfPlane, LANES, occupiedHalfPlane } from './half-plane.ts';

/** The waves of one cascade in a kernel's memory, where they stay. Addresses in bytes. */
export interface Float32Waves {
  readonly plane: HalfPlane;
  /** Whether k and -k turn alike, as without a current. */
  readonly still: boolean;
  /** Address of the words that `transformPair` reads. */
  readonly plan: number;
  readonly coefficients: number;
  readonly turns: number;
  readonly phases: number;
  /** q = horizontalScale coth(kh) / k, m. */
  readonly gain: number;
  /** Angular frequencies as quantised to the loop, rad/s; 0 where no velocity is wanted. */
  readonly omega: number;
  /** A power of two that makes the shear about as large as the height it shares a transform with; 0 for no shear. */
  readonly shearScale: number;
  /** Writes the phases of a frame, 0 .. frameCount - 1, into the kernel. */
  readonly fillPhases: (frame: number) => void;
}

export interface Float32WavesOptions {
  readonly depthM: number;
  readonly horizontalScale: number;
  /** Whether the rate of change is wanted too. */
  readonly moving: boolean;
}

/** Bytes by vector of four waves that a kernel keeps. */
export function keptBytesPerVector(still: boolean, moving: boolean): number {
  const turns = still ? 16 : 32;
  return 64 + turns + 16 + (moving ? turns : 0);
}

/** Converts a cascade's waves to float32 and hands them to a kernel. They are read once and not kept. */
export function float32Waves(
  kernel: WaveKernel,
  waves: WaveAmplitudes,
  options: Float32WavesOptions,
): Float32Waves {
  const N = waves.lattice.resolution;
  const dk = wavenumberStep(waves.lattice);
  const plane = occupiedHalfPlane(waves);
  const count = LANES * plane.vectors;
  const turns = pairedTurns(waves, plane);
  const perCell = turns.still ? 1 : 2;

  const plan = kernel.keep(WAVES_PLAN.wavesBytes);
  const spans = kernel.keep(plane.spans.byteLength);
  const wavenumbers = kernel.keep(4 * N);
  const rowPlanes = kernel.keep(4 * ROW_PLANE);
  const coefficients = kernel.keep(16 * count);
  const offsets = kernel.keep(4 * perCell * count);
  const phases = kernel.keep(8 * (turns.most - turns.least + 1));
  const gain = kernel.keep(4 * count);
  const omega = options.moving ? kernel.keep(4 * perCell * count) : 0;

  const words = new Uint32Array(kernel.buffer);
  const floats = new Float32Array(kernel.buffer);
  words.set(plane.spans, spans / 4);
  for (let i = 0; i < N; i++) floats[wavenumbers / 4 + i] = dk * waveIndex(i, N);
  words[(plan + WAVES_PLAN.wavesResolution) / 4] = N;
  words[(plan + WAVES_PLAN.wavesRows) / 4] = plane.rows;
  words[(plan + WAVES_PLAN.wavesInner) / 4] = plane.inner ? 1 : 0;
  words[(plan + WAVES_PLAN.wavesSpans) / 4] = spans;
  words[(plan + WAVES_PLAN.wavesWavenumbers) / 4] = wavenumbers;
  words[(plan + WAVES_PLAN.wavesRowPlanes) / 4] = rowPlanes;
  fillCoefficients(floats, coefficients / 4, waves, plane, turns.still);
  const shearScale = fillGain(floats, gain / 4, waves, plane, options);
  const omegaOfTurn = (2 * Math.PI) / waves.periodS;
  for (let w = 0; w < count; w++) {
    for (let side = 0; side < perCell; side++) {
      const at = lane(w, side, perCell);
      const m = turns.turns[2 * w + side];
      words[offsets / 4 + at] = 8 * (m - turns.least);
      if (options.moving) floats[omega / 4 + at] = m * omegaOfTurn;
    }
  }
  const fillPhases = phaseFiller(kernel, phases, waves.frameCount, turns.least, turns.most);
  const { still } = turns;
  return { plane, still, plan, coefficients, turns: offsets, phases, gain, omega, shearScale, fillPhases };
}

/** Where value `part` of `parts` of wave w stands: four waves of one part, then four of the next. */
function lane(w: number, part: number, parts: number): number {
  return (w - (w % LANES)) * parts + part * LANES + (w % LANES);
}

interface PairedTurns {
  /** m(k), m(-k) of wave w at [2 w], [2 w + 1]; Int32Array. A wave without amplitude turns with its opposite. */
  readonly turns: Int32Array;
  readonly still: boolean;
  readonly least: number;
  readonly most: number;
}

function pairedTurns({ amplitude: A, turns, lattice }: WaveAmplitudes, plane: HalfPlane): PairedTurns {
  const paired = new Int32Array(2 * LANES * plane.vectors);
  let still = true;
  let least = 0;
  let most = 0;
  forEachWave(plane, lattice.resolution, (w, _ix, _iy, i, j) => {
    const here = A[2 * i] !== 0 || A[2 * i + 1] !== 0;
    const opposite = A[2 * j] !== 0 || A[2 * j + 1] !== 0;
    if (!here && !opposite) return;
    const m = turns[here ? i : j];
    const mOpposite = turns[opposite ? j : i];
    paired[2 * w] = m;
    paired[2 * w + 1] = mOpposite;
    if (m !== mOpposite) still = false;
    least = Math.min(least, m, mOpposite);
    most = Math.max(most, m, mOpposite);
  });
  return { turns: paired, still, least, most };
}

/** With A(k) = a + ib, A(-k) = c + id: a + c, b + d, b - d, c - a on still water, else a, b, c, d. */
function fillCoefficients(
  out: Float32Array,
  at: number,
  { amplitude: A, lattice }: WaveAmplitudes,
  plane: HalfPlane,
  still: boolean,
): void {
  forEachWave(plane, lattice.resolution, (w, _ix, _iy, i, j) => {
    const a = A[2 * i];
    const b = A[2 * i + 1];
    const c = A[2 * j];
    const d = A[2 * j + 1];
    out[at + lane(w, 0, 4)] = still ? a + c : a;
    out[at + lane(w, 1, 4)] = still ? b + d : b;
    out[at + lane(w, 2, 4)] = still ? b - d : c;
    out[at + lane(w, 3, 4)] = still ? c - a : d;
  });
}

/**
 * Fills q, 0 where there is no wave, and returns the scale of the shear: of the powers of two, the one nearest to the
 * ratio of their standard deviations. Without it the rounding of metres of height would lie over a shear of 1e-4.
 */
function fillGain(
  out: Float32Array,
  at: number,
  { amplitude: A, lattice }: WaveAmplitudes,
  plane: HalfPlane,
  { depthM, horizontalScale }: Float32WavesOptions,
): number {
  const N = lattice.resolution;
  const dk = wavenumberStep(lattice);
  let height = 0;
  let shear = 0;
  forEachWave(plane, N, (w, ix, iy, i, j) => {
    const energy = A[2 * i] ** 2 + A[2 * i + 1] ** 2 + A[2 * j] ** 2 + A[2 * j + 1] ** 2;
    if (energy === 0) return;
    const kx = dk * waveIndex(ix, N);
    const ky = dk * waveIndex(iy, N);
    const k = Math.sqrt(kx * kx + ky * ky);
    const q = (horizontalScale * cothKh(k, depthM)) / k;
    out[at + w] = q;
    height += energy;
    shear += energy * (kx * ky * q) ** 2;
  });
  if (shear === 0) return 0;
  return 2 ** Math.max(-60, Math.min(60, Math.round(Math.log2(height / shear) / 2)));
}

/**
 * Writes cos and sin of 2 pi (m n mod N) / N for every m a wave has. The integer is exact, so frame N is frame 0 to the
 * bit.
 */
function phaseFiller(
  kernel: WaveKernel,
  address: number,
  frameCount: number,
  least: number,
  most: number,
): (frame: number) => void {
  const circle = new Float32Array(2 * frameCount);
  for (let j = 0; j < frameCount; j++) {
    circle[2 * j] = Math.cos((2 * Math.PI * j) / frameCount);
    circle[2 * j + 1] = Math.sin((2 * Math.PI * j) / frameCount);
  }
  return (frame) => {
    const phases = new Float32Array(kernel.buffer, address, 2 * (most - least + 1));
    for (let m = least; m <= most; m++) {
      const j = (((m * frame) % frameCount) + frameCount) % frameCount;
      phases[2 * (m - least)] = circle[2 * j];
      phases[2 * (m - least) + 1] = circle[2 * j + 1];
    }
  };
}
