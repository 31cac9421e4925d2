import type { Manifest, ManifestCascade } from '../manifest/manifest.ts';
import type { Current, Water } from '../physics/water.ts';
import { bandLimits } from '../waves/band.ts';
import type { CascadeRequest } from '../waves/cascade-waves.ts';
import { nyquistWavenumber, wavenumberStep } from '../waves/lattice.ts';
import type { CascadeWaves } from '../waves/wave-amplitudes.ts';
import type { BakeFacts } from './bake-facts.ts';
import type { SeenFrame } from './frame-reader.ts';
import { dispersionTurns } from './measured-waves.ts';
import { type PlaneTransform, planeTransform } from './plane-transform.ts';
import { heightOf, type Surface, surfaceMaker } from './surface.ts';
import { type TargetWaves, targetWaves } from './target-waves.ts';
import { wavesOfCascade } from './waves-of-manifest.ts';

/** A cascade under inspection. What is costly is made when it is first asked for, and once. */
export interface CascadeFacts {
  readonly manifest: Manifest;
  readonly cascade: ManifestCascade;
  readonly request: CascadeRequest;
  readonly water: Water;
  readonly current: Current;
  readonly dkRadPerM: number;
  /** Wavenumbers at which the cascade may hold a wave, rad/m. */
  readonly kMinRadPerM: number;
  readonly kMaxRadPerM: number;
  /** Whole turns per loop of every wave by the dispersion relation; Int32Array N*N. */
  readonly turns: () => Int32Array;
  /** Frames to be looked at more closely, in order. */
  readonly keyedFrames: readonly number[];
  readonly transform: () => PlaneTransform;
  /** The waves drawn anew from the manifest. */
  readonly waves: () => CascadeWaves;
  readonly target: () => TargetWaves;
  /** Slope and strain by differentiating what a frame's files hold; null without its height. */
  readonly surface: (frame: SeenFrame) => Surface | null;
}

/**
 * @param bake the bake
 * @param c index of the cascade
 * @param keyedFrames indices of the frames that are looked at more closely, in order
 */
export function cascadeFacts(bake: BakeFacts, c: number, keyedFrames: readonly number[]): CascadeFacts {
  const { manifest } = bake;
  const cascade = manifest.cascades[c];
  const request = bake.request.cascades[c];
  const { water, current } = bake.request;
  const { kMinRadPerM, kMaxRadPerM } = bandLimits(request.band);
  const turns = once(() => dispersionTurns(request, water, current, request.periodS));
  const transform = once(() => planeTransform(cascade.resolution));
  let last: { readonly frame: SeenFrame; readonly surface: Surface | null } | null = null;
  const maker = once(() => surfaceMaker(facts));
  const facts: CascadeFacts = {
    manifest,
    cascade,
    request,
    water,
    current,
    dkRadPerM: wavenumberStep(request),
    kMinRadPerM,
    kMaxRadPerM: Math.min(kMaxRadPerM, Math.SQRT2 * nyquistWavenumber(request)),
    turns,
    keyedFrames,
    transform,
    waves: once(() => wavesOfCascade(manifest, c)),
    target: once(() => targetWaves(bake.request, request, turns())),
    surface(frame) {
      // Memory is taken once there is a frame of that size.
      if (heightOf(frame) === null) return null;
      if (last?.frame !== frame) last = { frame, surface: maker()(frame) };
      return last.surface;
    },
  };
  return facts;
}

function once<T>(make: () => T): () => T {
  let made: { readonly value: T } | null = null;
  return () => {
    made ??= { value: make() };
    return made.value;
  };
}
