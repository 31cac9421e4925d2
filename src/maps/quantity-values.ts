import type { FieldName, FrameFields } from '../field/frame-fields.ts';
import type { Quantity } from '../image/image.ts';
import type { MapName } from '../sea/sea.ts';
import { fillJacobian, fillNormals } from './surface.ts';

/** Maps that are made from one frame's fields; foam needs the whole loop and is made elsewhere. */
export type FrameMapName = Exclude<MapName, 'foam'>;

/** How one map's quantities follow from the fields. */
export interface FrameMapDefinition {
  readonly fields: readonly FieldName[];
  /**
   * Values of the map's quantities in SI: Float64Array N*N each, field order (row 0 south). Valid until the next call
   * or frame.
   */
  readonly values: (fields: FrameFields, scratch: ScratchPlanes) => ReadonlyMap<Quantity, Float64Array>;
}

/** Lends Float64Arrays of N*N by index, so that no frame allocates. */
export type ScratchPlanes = (index: number) => Float64Array;

const STRAIN_FIELDS = ['strainEastEast', 'strainNorthNorth', 'strainEastNorth'] as const;

/** One entry a map: a new one is a function here, a name in `MAP_NAMES` and its channels in the plan's encodings. */
export const FRAME_MAPS: Readonly<Record<FrameMapName, FrameMapDefinition>> = {
  displacement: copied({
    'displacement-east': 'displacementEast',
    'displacement-north': 'displacementNorth',
    'displacement-up': 'height',
  }),
  height: copied({ height: 'height' }),
  velocity: copied({
    'velocity-east': 'velocityEast',
    'velocity-north': 'velocityNorth',
    'velocity-up': 'velocityUp',
  }),
  slope: copied({ 'slope-east': 'slopeEast', 'slope-north': 'slopeNorth' }),
  strain: copied({
    'strain-east-east': 'strainEastEast',
    'strain-north-north': 'strainNorthNorth',
    'strain-east-north': 'strainEastNorth',
  }),
  normal: {
    fields: ['slopeEast', 'slopeNorth', ...STRAIN_FIELDS],
    values(fields, scratch) {
      const [east, north, up] = [scratch(0), scratch(1), scratch(2)];
      fillNormals(east, north, up, fields);
      return new Map([
        ['normal-east', east],
        ['normal-north', north],
        ['normal-up', up],
      ]);
    },
  },
  jacobian: {
    fields: STRAIN_FIELDS,
    values(fields, scratch) {
      const J = scratch(0);
      fillJacobian(J, fields);
      return new Map([['jacobian', J]]);
    },
  },
};

/** Fields that foam needs of every frame: those of the Jacobian. */
export const FOAM_FIELDS: readonly FieldName[] = STRAIN_FIELDS;

/** A map whose quantities are fields as they are. */
function copied(fieldOf: Partial<Record<Quantity, FieldName>>): FrameMapDefinition {
  const entries = Object.entries(fieldOf) as [Quantity, FieldName][];
  return {
    fields: entries.map(([, field]) => field),
    values: (fields) =>
      new Map(entries.map(([quantity, field]) => [quantity, fields[field] as Float64Array])),
  };
}
