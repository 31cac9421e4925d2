import type { Image } from '../image/image.ts';
import { type EncodedMap, encodedMap } from '../maps/encoded-map.ts';
import { advanceFoam, foamSourceTable, shownFoam } from '../maps/foam.ts';
import type { CascadeFoam, Plan, PlannedCascade } from '../plan/plan.ts';
import { loopSeconds } from '../sea/loop-length.ts';
import { writtenChannels } from './written-channels.ts';

/** Reads a cascade's J codes of one frame: rows [fromRow, toRow) of the tile, field order. */
export type CodeReader = (frame: number, fromRow: number, toRow: number) => Uint16Array;

/** d, the factor by which foam fades from frame to frame. */
export function decayPerFrame(cascade: PlannedCascade, foam: CascadeFoam): number {
  return Math.exp(-loopSeconds(cascade.loop) / cascade.loop.frameCount / foam.decayTimeS);
}

/** What is taken out of the written map: the part that one loop does not fade, or nothing. */
export function removedResidue(plan: Plan, foam: CascadeFoam): number {
  return plan.foam?.residue === 'remove' ? foam.loopResidue : 0;
}

/** Source strength by J code for a breaking level given as a code. */
export function sourceTable(foam: CascadeFoam, breakingCode: number): Float64Array {
  return foamSourceTable(breakingCode, foam.rampJ / foam.jacobianCodes.stepJ);
}

/** Codes in which foam is counted: those of the file, or 16-bit ones for float files. */
export function foamLevels(cascade: PlannedCascade): number {
  return cascade.maps.find(({ map }) => map === 'foam')?.sample === 'uint8' ? 255 : 65535;
}

/** Buffers that are kept from job to job: a search for the breaking level takes hundreds of them. */
export interface FoamBuffers {
  /** Uint16Array of at least this length, its content undefined. */
  codes(length: number): Uint16Array;
  /** Float64Array of exactly this length, its content undefined. */
  state(length: number): Float64Array;
}

export function foamBuffers(): FoamBuffers {
  let codes = new Uint16Array(0);
  let state = new Float64Array(0);
  return {
    codes(length) {
      if (codes.length < length) codes = new Uint16Array(length);
      return codes;
    },
    state(length) {
      if (state.length < length) state = new Float64Array(length);
      return state.subarray(0, length);
    },
  };
}

/**
 * Sum of written foam codes over a loop and a grid of texels, for several breaking levels. Integers, so that any split
 * of the rows adds up to the same.
 */
export function foamSums(
  plan: Plan,
  cascade: PlannedCascade,
  foam: CascadeFoam,
  grid: { readonly fromRow: number; readonly toRow: number; readonly stride: number },
  breakingCodes: readonly number[],
  read: CodeReader,
  buffers: FoamBuffers,
): { readonly texels: number; readonly sums: readonly number[] } {
  const N = cascade.resolution;
  const { frameCount } = cascade.loop;
  const d = decayPerFrame(cascade, foam);
  const residue = removedResidue(plan, foam);
  const levels = foamLevels(cascade);
  const perRow = Math.ceil(N / grid.stride);
  const rows = Math.ceil((grid.toRow - grid.fromRow) / grid.stride);
  const texels = perRow * rows;
  // The block's codes of the whole loop, [frame][texel of the grid]: read once, used for every level.
  const codes = buffers.codes(frameCount * texels);
  for (let n = 0, o = 0; n < frameCount; n++) {
    const block = read(n, grid.fromRow, grid.toRow);
    for (let row = 0; row < rows; row++) {
      for (let x = 0; x < N; x += grid.stride) codes[o++] = block[row * grid.stride * N + x];
    }
  }
  const breaking = keepBreaking(codes, frameCount, texels, Math.max(...breakingCodes));
  const state = buffers.state(breaking);
  const sums = breakingCodes.map((breakingCode) => {
    const source = sourceTable(foam, breakingCode);
    state.fill(0);
    let sum = 0;
    for (let n = 0; n < 2 * frameCount; n++) {
      const at = (n % frameCount) * breaking;
      advanceFoam(state, codes.subarray(at, at + breaking), source, d);
      if (n < frameCount) continue;
      for (let i = 0; i < breaking; i++) {
        if (state[i] > residue) sum += Math.round(shownFoam(state[i], residue) * levels);
      }
    }
    return sum;
  });
  return { texels, sums };
}

/**
 * Moves together the texels that break at some frame at a level, in place: most of a sea never does, and foams nowhere.
 *
 * @param codes J codes, [frame][texel] before, [frame][breaking texel] after
 * @returns how many texels break
 */
function keepBreaking(codes: Uint16Array, frameCount: number, texels: number, breakingCode: number): number {
  const lowest = new Uint16Array(codes.subarray(0, texels));
  for (let n = 1; n < frameCount; n++) {
    const at = n * texels;
    for (let i = 0; i < texels; i++) if (codes[at + i] < lowest[i]) lowest[i] = codes[at + i];
  }
  const breaking: number[] = [];
  for (let i = 0; i < texels; i++) if (lowest[i] < breakingCode) breaking.push(i);
  let o = 0;
  // What is written lies never behind what is still to be read.
  for (let n = 0; n < frameCount; n++) for (const i of breaking) codes[o++] = codes[n * texels + i];
  return breaking.length;
}

/** Foam images of a run of frames, warmed up by the loop before it. */
export function* foamImages(
  plan: Plan,
  cascade: PlannedCascade,
  foam: CascadeFoam,
  run: { readonly fromFrame: number; readonly toFrame: number; readonly breakingCode: number },
  read: CodeReader,
): Generator<EncodedMap & { readonly frame: number; readonly image: Image }> {
  const N = cascade.resolution;
  const { frameCount } = cascade.loop;
  const planned = cascade.maps.find(({ map }) => map === 'foam');
  if (planned === undefined) return;
  const d = decayPerFrame(cascade, foam);
  const residue = removedResidue(plan, foam);
  const source = sourceTable(foam, run.breakingCode);
  const state = new Float64Array(N * N);
  const shown = new Float64Array(N * N);
  for (let n = run.fromFrame - frameCount; n < run.toFrame; n++) {
    const frame = (n + frameCount) % frameCount;
    advanceFoam(state, read(frame, 0, N), source, d);
    if (n < run.fromFrame) continue;
    for (let i = 0; i < state.length; i++) shown[i] = shownFoam(state[i], residue);
    const made = encodedMap(new Map([['foam', shown]]), {
      resolution: N,
      sample: planned.sample,
      channels: writtenChannels(planned),
      rowZero: plan.output.rowZero,
      dither: null,
    });
    yield { ...made, frame };
  }
}
