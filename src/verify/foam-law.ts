import type { ManifestFoam, ManifestLoop } from '../manifest/manifest.ts';

/**
 * The law that foam keeps from frame to frame, in terms of what the maps show. With f the foam, r the part that one loop
 * does not fade and d the fade of one frame,
 *
 *     f[n] = max(source(J[n]), d f[n-1]),   source = clamp((Jb - J) / ramp, 0, 1),
 *     shown = max(0, (f - r) / (1 - r))     where the residue is removed, else f.
 */
export interface FoamLaw {
  /** Shown foam one frame after a texel showed `shown`, where nothing breaks. */
  readonly faded: (shown: number) => number;
  /** Shown foam of a texel that breaks at J, whatever was there before. */
  readonly fresh: (J: number) => number;
  /** d(fresh)/dJ where it is neither 0 nor full, as a magnitude. */
  readonly steepness: number;
}

/**
 * @param foam the manifest's figures
 * @param loop loop of the cascade
 * @param residue `remove` or `keep`
 */
export function foamLaw(foam: ManifestFoam, loop: ManifestLoop, residue: string): FoamLaw {
  const seconds = (loop.frameCount * loop.frameRate[1]) / loop.frameRate[0];
  const d = Math.exp(-seconds / loop.frameCount / foam.decayTimeS);
  const r = residue === 'remove' ? Math.exp(-seconds / foam.decayTimeS) : 0;
  const shownOf = (f: number): number => Math.max(0, (f - r) / (1 - r));
  return {
    // Foam that shows 0 is r or less and fades below it.
    faded: (shown) => (shown <= 0 ? 0 : shownOf(d * (r + shown * (1 - r)))),
    fresh: (J) => shownOf(Math.min(1, Math.max(0, (foam.breakingJ - J) / foam.rampJ))),
    steepness: 1 / (foam.rampJ * (1 - r)),
  };
}
