import type { Surface } from './surface.ts';

/** A field by another route, and the mean square error that it has by the rounding of the files it comes from. */
export interface Prediction {
  /** Float64Array N*N, row 0 south; the caller's. */
  readonly values: Float64Array;
  /** One for all texels, or one each. */
  readonly errorSquare: number | Float64Array;
}

/**
 * Jacobian of x -> x + D and its error, to first order in the errors of the strain.
 *
 *     J = (1 + Dxx)(1 + Dyy) - Dxy^2
 */
export function jacobianOf({ Dxx, Dyy, Dxy, noise }: Surface): Prediction {
  const values = new Float64Array(Dxx.length);
  const errorSquare = new Float64Array(Dxx.length);
  for (let i = 0; i < values.length; i++) {
    const [a, b, c] = [1 + Dyy[i], 1 + Dxx[i], -2 * Dxy[i]];
    values[i] = a * b - Dxy[i] * Dxy[i];
    errorSquare[i] = a * a * noise.Dxx + b * b * noise.Dyy + c * c * noise.Dxy + 2 * a * b * noise.DxxDyy;
  }
  return { values, errorSquare };
}

/** Where a normal's length before normalisation is less than this many of its errors, first order says nothing. */
const PINCHED = 10;

/**
 * Unit normal of the displaced surface, the normalised product of its tangents, and its error to first order.
 *
 *     Te = (1 + Dxx, Dxy, Sx),  Tn = (Dxy, 1 + Dyy, Sy),  v = Te x Tn,  n = v / |v|,
 *     dn = (dv - n (n.dv)) / |v|
 */
export function normalsOf({
  Sx,
  Sy,
  Dxx,
  Dyy,
  Dxy,
  noise,
}: Surface): readonly [Prediction, Prediction, Prediction] {
  const count = Sx.length;
  const made = (): { values: Float64Array; errorSquare: Float64Array } => {
    return { values: new Float64Array(count), errorSquare: new Float64Array(count) };
  };
  const [east, north, up] = [made(), made(), made()];
  const variance = [noise.Sx, noise.Sy, noise.Dxx, noise.Dyy, noise.Dxy];
  // Derivatives of v by Sx, Sy, Dxx, Dyy, Dxy: five triples; then those of n in their place.
  const d = new Float64Array(15);
  for (let i = 0; i < count; i++) {
    const [p, q, s, sx, sy] = [1 + Dxx[i], 1 + Dyy[i], Dxy[i], Sx[i], Sy[i]];
    const length = Math.sqrt((s * sy - sx * q) ** 2 + (sx * s - p * sy) ** 2 + (p * q - s * s) ** 2);
    const nx = (s * sy - sx * q) / length;
    const ny = (sx * s - p * sy) / length;
    const nz = (p * q - s * s) / length;
    d[0] = -q;
    d[1] = d[3] = s;
    d[4] = -p;
    d[2] = d[5] = d[6] = d[10] = 0;
    d[7] = -sy;
    d[8] = q;
    d[9] = -sx;
    d[11] = p;
    d[12] = sy;
    d[13] = sx;
    d[14] = -2 * s;
    let [xx, yy, zz] = [0, 0, 0];
    for (let a = 0; a < 5; a++) {
      const along = nx * d[3 * a] + ny * d[3 * a + 1] + nz * d[3 * a + 2];
      d[3 * a] = (d[3 * a] - nx * along) / length;
      d[3 * a + 1] = (d[3 * a + 1] - ny * along) / length;
      d[3 * a + 2] = (d[3 * a + 2] - nz * along) / length;
      xx += variance[a] * d[3 * a] * d[3 * a];
      yy += variance[a] * d[3 * a + 1] * d[3 * a + 1];
      zz += variance[a] * d[3 * a + 2] * d[3 * a + 2];
    }
    xx += 2 * noise.DxxDyy * d[6] * d[9];
    yy += 2 * noise.DxxDyy * d[7] * d[10];
    zz += 2 * noise.DxxDyy * d[8] * d[11];
    // A unit vector turned by a small angle e also loses e^2 / 2 along itself: second order, of the same size as zz
    // where the surface is level.
    const turned = xx + yy + zz;
    const second = turned * PINCHED ** 2 < 1 ? turned * turned : Infinity;
    east.values[i] = nx;
    north.values[i] = ny;
    up.values[i] = nz;
    east.errorSquare[i] = xx + second;
    north.errorSquare[i] = yy + second;
    up.errorSquare[i] = zz + second;
  }
  return [east, north, up];
}
