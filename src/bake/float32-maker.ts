import { InternalError } from '../errors.ts';
import type { Float32Engine } from '../field/float32-engine.ts';
import { UNITS_PER_SI } from '../maps/encoded-map.ts';
import { jacobianCodesRequest, largestMagnitudes, sampledMaps } from '../maps/sampled-map.ts';
import type { CascadeFoam } from '../plan/plan.ts';
import type { CascadeMaker, MakerParts } from './cascade-maker.ts';

/** Up to this resolution all maps of a frame are made in one pass: beyond it their planes take too much memory. */
const LARGEST_AT_ONCE = 2048;

/** Makes the frames of one cascade with the fast engine. */
export function float32Maker(
  { cascade, waves, options, frameMaps, storage }: MakerParts,
  engine: Float32Engine,
): CascadeMaker {
  const N = cascade.resolution;
  const surface = engine.synthesis(waves, options);
  const codes = new Uint16Array(N * N);
  const groups = N <= LARGEST_AT_ONCE ? [frameMaps] : frameMaps.map((planned) => [planned]);
  return {
    turnTo: (n) => surface.turnTo(n),
    *maps() {
      for (const group of groups) {
        const made = sampledMaps(surface, group.map(storage));
        for (const [m, planned] of group.entries()) yield { planned, ...made[m] };
      }
    },
    extents({ channels }) {
      const largest = largestMagnitudes(
        surface,
        channels.map(({ quantity }) => quantity),
      );
      return channels.map(({ unit }, c) => largest[c] * UNITS_PER_SI[unit]);
    },
    jacobianCodes() {
      const { jacobianCodes } = cascade.foam as CascadeFoam;
      const [[{ finite }]] = surface.samples([jacobianCodesRequest(codes, jacobianCodes)]);
      if (!finite) throw new InternalError('the Jacobian is not a number somewhere on the tile');
      return codes;
    },
  };
}
