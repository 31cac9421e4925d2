/**
 * The real fields of one frame that maps are made from. Lengths in metres, velocities in m/s, the rest dimensionless;
 * displacement, velocity and strain include the horizontal scale.
 */
export const FIELD_NAMES = [
  'displacementEast',
  'displacementNorth',
  'height',
  'strainEastNorth',
  'slopeEast',
  'slopeNorth',
  'strainEastEast',
  'strainNorthNorth',
  'velocityEast',
  'velocityNorth',
  'velocityUp',
] as const;
export type FieldName = (typeof FIELD_NAMES)[number];

/**
 * Fields of one frame: Float64Array of N*N each, row-major [iy][ix], row 0 in the south, values at texel centres.
 * Only the fields asked for are there. They are the synthesis's own buffers: the next frame overwrites them.
 */
export type FrameFields = Partial<Readonly<Record<FieldName, Float64Array>>>;
