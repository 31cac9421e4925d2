import { LINE } from './layout';

/*
 * Values of a few rows of a map from strips of fields: taken as they are, or as normals and Jacobian of the displaced
 * surface. Rows come out one behind the other, N float32 values each, in the order of the file.
 *
 * A strip is visited once for all rows of the call: with one row a call, every 64 bytes would be in another memory page.
 */

/**
 * Copies rows of one field.
 *
 * @param out `rows` rows of `columns` values
 * @param field address of the field's first row to copy, in its first strip
 * @param scale factor, a power of two: what undoes the scale of a field in its pair
 * @param step bytes from one row to the next: STRIP_ROW northward, its negative southward
 */
export function fieldRows(
  out: usize,
  field: usize,
  scale: f32,
  step: isize,
  stripBytes: usize,
  rows: usize,
  columns: usize,
): void {
  const s = f32x4.splat(scale);
  for (const end = out + (columns << 2); out < end; out += 64, field += stripBytes) {
    for (let row: usize = 0, from = field, to = out; row < rows; row++, from += step, to += columns << 2) {
      v128.store(to, f32x4.mul(s, v128.load(from)));
      v128.store(to, f32x4.mul(s, v128.load(from, 16)), 16);
      v128.store(to, f32x4.mul(s, v128.load(from, LINE)), 32);
      v128.store(to, f32x4.mul(s, v128.load(from, LINE + 16)), 48);
    }
  }
}

/**
 * J - 1 of the horizontal map x -> x + D.
 *
 *     J - 1 = Dxx + Dyy + Dxx Dyy - Dxy^2
 *
 * J itself lies near 1, where float32 has steps of 1.2e-7; its distance from 1 keeps its own digits.
 *
 * @param out `rows` rows of `columns` values
 * @param xx, yy, xy addresses of the strain's first rows
 * @param shearScale factor that undoes the scale of Dxy in its pair
 */
export function jacobianRows(
  out: usize,
  xx: usize,
  yy: usize,
  xy: usize,
  shearScale: f32,
  step: isize,
  stripBytes: usize,
  rows: usize,
  columns: usize,
): void {
  const unscale = f32x4.splat(shearScale);
  for (const end = out + (columns << 2); out < end; out += 64) {
    for (
      let row: usize = 0, offset: isize = 0, to = out;
      row < rows;
      row++, offset += step, to += columns << 2
    ) {
      let v: usize = 0;
      do {
        // The second eight columns lie a line further.
        const u = v + (v & 32);
        const Dxx = v128.load(xx + offset + u);
        const Dyy = v128.load(yy + offset + u);
        const Dxy = f32x4.mul(unscale, v128.load(xy + offset + u));
        v128.store(to + v, jacobianExcess(Dxx, Dyy, Dxy));
        v += 16;
      } while (v < 64);
    }
    xx += stripBytes;
    yy += stripBytes;
    xy += stripBytes;
  }
}

/**
 * Unit normals of the displaced surface, the cross product of its two true tangents.
 *
 *     n = (Dxy Sy - Sx (1 + Dyy),  Sx Dxy - (1 + Dxx) Sy,  J) / |n|
 *
 * Where all three vanish the surface is pinched to a point and up is as good as any direction.
 *
 * @param east, north, up out: `rows` rows of `columns` values each
 * @param sx, sy addresses of the slope's first rows; xx, yy, xy of the strain's
 */
export function normalRows(
  east: usize,
  north: usize,
  up: usize,
  sx: usize,
  sy: usize,
  xx: usize,
  yy: usize,
  xy: usize,
  shearScale: f32,
  step: isize,
  stripBytes: usize,
  rows: usize,
  columns: usize,
): void {
  const unscale = f32x4.splat(shearScale);
  const one = f32x4.splat(1);
  const zero = f32x4.splat(0);
  for (let x: usize = 0; x < columns << 2; x += 64) {
    for (
      let row: usize = 0, offset: isize = 0, to = x;
      row < rows;
      row++, offset += step, to += columns << 2
    ) {
      let v: usize = 0;
      do {
        // The second eight columns lie a line further.
        const u = v + (v & 32);
        const Sx = v128.load(sx + offset + u);
        const Sy = v128.load(sy + offset + u);
        const Dxx = v128.load(xx + offset + u);
        const Dyy = v128.load(yy + offset + u);
        const Dxy = f32x4.mul(unscale, v128.load(xy + offset + u));
        const nx = f32x4.sub(f32x4.mul(Dxy, Sy), f32x4.mul(Sx, f32x4.add(one, Dyy)));
        const ny = f32x4.sub(f32x4.mul(Sx, Dxy), f32x4.mul(f32x4.add(one, Dxx), Sy));
        const nz = f32x4.add(one, jacobianExcess(Dxx, Dyy, Dxy));
        const square = f32x4.add(f32x4.add(f32x4.mul(nx, nx), f32x4.mul(ny, ny)), f32x4.mul(nz, nz));
        const pinched = f32x4.eq(square, zero);
        const perLength = v128.andnot(f32x4.div(one, f32x4.sqrt(square)), pinched);
        v128.store(east + to + v, f32x4.mul(nx, perLength));
        v128.store(north + to + v, f32x4.mul(ny, perLength));
        v128.store(up + to + v, v128.bitselect(one, f32x4.mul(nz, perLength), pinched));
        v += 16;
      } while (v < 64);
    }
    sx += stripBytes;
    sy += stripBytes;
    xx += stripBytes;
    yy += stripBytes;
    xy += stripBytes;
  }
}

function jacobianExcess(Dxx: v128, Dyy: v128, Dxy: v128): v128 {
  const linear = f32x4.add(Dxx, Dyy);
  return f32x4.add(linear, f32x4.sub(f32x4.mul(Dxx, Dyy), f32x4.mul(Dxy, Dxy)));
}

/** Largest magnitude of some values; NaN where one is NaN. `count` is a multiple of 4. */
export function largestMagnitude(values: usize, count: usize): f32 {
  let largest = f32x4.splat(0);
  for (const end = values + (count << 2); values < end; values += 16) {
    largest = f32x4.max(largest, f32x4.abs(v128.load(values)));
  }
  const two = f32x4.max(largest, v128.shuffle<f32>(largest, largest, 2, 3, 0, 1));
  return max(f32x4.extract_lane(two, 0), f32x4.extract_lane(two, 1));
}
