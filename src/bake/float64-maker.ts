import { float64Engine } from '../field/float64-engine.ts';
import type { FrameFields } from '../field/frame-fields.ts';
import { synthesis } from '../field/synthesis.ts';
import { encodedMap, UNITS_PER_SI } from '../maps/encoded-map.ts';
import { FRAME_MAPS, type FrameMapName } from '../maps/quantity-values.ts';
import { fillJacobian } from '../maps/surface.ts';
import type { CascadeFoam, PlannedMap } from '../plan/plan.ts';
import type { CascadeMaker, MakerParts } from './cascade-maker.ts';

/** Makes the frames of one cascade with the reference engine. */
export function float64Maker({ cascade, waves, options, frameMaps, storage }: MakerParts): CascadeMaker {
  const N = cascade.resolution;
  const surface = synthesis(waves, float64Engine(N), options);
  const planes: Float64Array[] = [];
  const scratch = (index: number): Float64Array => {
    planes[index] ??= new Float64Array(N * N);
    return planes[index];
  };
  const codes = new Uint16Array(N * N);
  let fields: FrameFields = {};
  const values = ({ map }: PlannedMap) => FRAME_MAPS[map as FrameMapName].values(fields, scratch);
  return {
    turnTo(n) {
      fields = surface.frame(n);
    },
    *maps() {
      for (const planned of frameMaps) yield { planned, ...encodedMap(values(planned), storage(planned)) };
    },
    extents(planned) {
      const found = values(planned);
      return planned.channels.map(({ quantity, unit }) => {
        const centre = quantity === 'jacobian' ? 1 : 0;
        let largest = 0;
        for (const value of found.get(quantity) ?? []) largest = Math.max(largest, Math.abs(value - centre));
        return largest * UNITS_PER_SI[unit];
      });
    },
    jacobianCodes() {
      const { zeroJ, stepJ } = (cascade.foam as CascadeFoam).jacobianCodes;
      const J = scratch(0);
      fillJacobian(J, fields);
      for (let i = 0; i < J.length; i++) {
        codes[i] = Math.min(65535, Math.max(0, Math.round((J[i] - zeroJ) / stepJ)));
      }
      return codes;
    },
  };
}
