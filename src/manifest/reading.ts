import type { OutputConventions } from '../sea/sea.ts';

/** The reader's guide that travels with the files: short sentences and formulas, by topic. */
export function readingGuide(
  output: OutputConventions,
  names: ReadonlySet<string>,
): Readonly<Record<string, string>> {
  const rowZero =
    output.rowZero === 'north'
      ? 'Row 0 of a file is the north edge; tools that count v down from the upper left corner use v = 1 - north / patchLength.'
      : 'Row 0 of a file is the south edge; tools that count v down from the upper left corner use v = north / patchLength.';
  const guide: Record<string, string> = {
    decode:
      'value = stored * scale + offset; stored is the float in the file, or code / largest code (0..1).',
    coordinates: `World: x east, y north, z up, right-handed. uv = (east, north) / patchLengthM of each cascade, repeated; samples sit at texel centres, so no half-texel shift. ${rowZero}`,
    color: 'Every file holds data: no colour transform, no gamma, no sRGB flag.',
    loop: 'Frame numbers run from firstFrame; the frame after the last is the first. A cascade with a shorter loop repeats within the whole.',
  };
  if (names.has('displacement')) {
    guide.displacement =
      'Sum the cascades at the undisplaced position x; the surface point is (x + east, y + north, up). For the height above a fixed point solve x + D(x) = p by p - D(x) repeated three or four times.';
  }
  if (names.has('normal')) {
    guide.normal =
      'A cascade alone: use its normals. Several: sum slope and strain maps, then n = normalize(Exy Sy - Sx (1 + Eyy), Sx Exy - (1 + Exx) Sy, (1 + Exx)(1 + Eyy) - Exy^2). Without those maps, add the horizontal parts divided by up, which is close where slopes are small.';
  }
  if (names.has('jacobian')) {
    guide.jacobian =
      'J = (1 + Exx)(1 + Eyy) - Exy^2. Of several cascades, rebuild it from summed strain; the product of their J follows it closely (correlation above 0.99).';
  }
  if (names.has('foam')) {
    guide.foam =
      'Combine cascades as 1 - (1 - f0)(1 - f1)...; coverage is the mean. Each cascade foams on its own breakers only: amount and statistics are right, places relative to the other cascades are not. For crests of the sum, gate it with the product of the jacobian maps.';
  }
  guide.roughness =
    'losses.slopeVarianceLeftOut is the slope variance (both axes) of waves from 0.1 m up that no cascade holds: add it to the roughness of the shading.';
  return guide;
}
