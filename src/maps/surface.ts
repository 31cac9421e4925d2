import type { FrameFields } from '../field/frame-fields.ts';

/**
 * Jacobian of the horizontal map x -> x + D: the area of a displaced surface element seen from above.
 *
 *     J = (1 + Dxx)(1 + Dyy) - Dxy^2
 *
 * Its mean over a tile is 1; it is below 1 where crests gather the surface and negative where it folds.
 *
 * @param out Float64Array of N*N, filled in the fields' order
 * @param fields strain of the frame
 */
export function fillJacobian(out: Float64Array, fields: FrameFields): void {
  const {
    strainEastEast: Dxx,
    strainNorthNorth: Dyy,
    strainEastNorth: Dxy,
  } = fields as Required<FrameFields>;
  for (let i = 0; i < out.length; i++) out[i] = (1 + Dxx[i]) * (1 + Dyy[i]) - Dxy[i] * Dxy[i];
}

/**
 * Unit normals of the displaced surface: the cross product of its two true tangents, not a slope approximation.
 *
 *     Te = (1 + Dxx, Dxy, Sx),  Tn = (Dxy, 1 + Dyy, Sy),  n = Te x Tn / |Te x Tn|
 *
 * The up component is J before normalisation, so a folded surface points down.
 *
 * @param east, north, up Float64Array of N*N each, filled in the fields' order
 * @param fields slope and strain of the frame
 */
export function fillNormals(
  east: Float64Array,
  north: Float64Array,
  up: Float64Array,
  fields: FrameFields,
): void {
  const {
    slopeEast: Sx,
    slopeNorth: Sy,
    strainEastEast: Dxx,
    strainNorthNorth: Dyy,
    strainEastNorth: Dxy,
  } = fields as Required<FrameFields>;
  for (let i = 0; i < up.length; i++) {
    const x = Dxy[i] * Sy[i] - Sx[i] * (1 + Dyy[i]);
    const y = Sx[i] * Dxy[i] - (1 + Dxx[i]) * Sy[i];
    const z = (1 + Dxx[i]) * (1 + Dyy[i]) - Dxy[i] * Dxy[i];
    const length = Math.sqrt(x * x + y * y + z * z);
    // All three vanish only where the surface is pinched to a point: any direction is as good, up is expected. A
    // length that is not a number stays one, for the encoder to refuse.
    east[i] = length === 0 ? 0 : x / length;
    north[i] = length === 0 ? 0 : y / length;
    up[i] = length === 0 ? 1 : z / length;
  }
}
