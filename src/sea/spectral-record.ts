import type { MeasuredSpectrum } from './sea.ts';

/** One measured spectrum as its file gives it. */
export interface SpectralRecord {
  /** Hz, ascending. */
  readonly frequencyHz: readonly number[];
  /** Widths of the bands, Hz. */
  readonly bandwidthHz: readonly number[];
  readonly densityM2PerHz: readonly number[];
  /** Fourier moments of the directions waves come from, clockwise from north; null where a band has none. */
  readonly directions: readonly (DirectionMoments | null)[];
}

/** Means of cos, sin of a direction, and of twice the direction. */
export interface DirectionMoments {
  readonly cos1: number;
  readonly sin1: number;
  readonly cos2: number;
  readonly sin2: number;
}

/** Moments from the mean direction and its resultant r1, the principal direction and r2; directions in rad. */
export function directionMoments(alpha1: number, r1: number, alpha2: number, r2: number): DirectionMoments {
  return {
    cos1: r1 * Math.cos(alpha1),
    sin1: r1 * Math.sin(alpha1),
    cos2: r2 * Math.cos(2 * alpha2),
    sin2: r2 * Math.sin(2 * alpha2),
  };
}

/**
 * Moments of a mean direction and a circular spread.
 *
 *     r1 = 1 - spread^2 / 2;  r2 = s (s - 1) / ((s + 1)(s + 2)),  s = r1 / (1 - r1)
 *
 * The second moment is that of the cos-2s distribution with this first one.
 * Source: Kuik, van Vledder & Holthuijsen 1988 (from memory) for the spread.
 *
 * @param fromRad mean direction, rad
 * @param spreadRad sigma_1, rad, 0 < .. < sqrt 2
 */
export function spreadMoments(fromRad: number, spreadRad: number): DirectionMoments {
  const r1 = 1 - 0.5 * spreadRad ** 2;
  const s = r1 / (1 - r1);
  return directionMoments(fromRad, r1, fromRad, (s * (s - 1)) / ((s + 1) * (s + 2)));
}

/** Widths of bands that meet half way between their frequencies, Hz; the outermost reach as far out as in. */
export function halfwayBandwidths(frequencyHz: readonly number[]): number[] {
  const last = frequencyHz.length - 1;
  return frequencyHz.map((f, i) => {
    const below = i === 0 ? frequencyHz[1] - f : f - frequencyHz[i - 1];
    const above = i === last ? f - frequencyHz[last - 1] : frequencyHz[i + 1] - f;
    return 0.5 * (below + above);
  });
}

/**
 * A record between two of the same bands: energies and their moments blended in time, so that the mean direction is
 * that of the energy of both.
 *
 * @param share how far from `before` to `after`, 0 .. 1
 */
export function blendedRecord(before: SpectralRecord, after: SpectralRecord, share: number): SpectralRecord {
  const densityM2PerHz = before.densityM2PerHz.map((S, i) => S + share * (after.densityM2PerHz[i] - S));
  const directions = before.directions.map((own, i) => {
    const other = after.directions[i];
    if (own === null || other === null) return own ?? other;
    const energy = densityM2PerHz[i];
    const weight = energy === 0 ? share : (share * after.densityM2PerHz[i]) / energy;
    const mix = (key: keyof DirectionMoments): number => own[key] + weight * (other[key] - own[key]);
    return { cos1: mix('cos1'), sin1: mix('sin1'), cos2: mix('cos2'), sin2: mix('sin2') };
  });
  return { ...before, densityM2PerHz, directions };
}

/** m0 = sum of density times bandwidth, m^2. */
export function recordVariance({ densityM2PerHz, bandwidthHz }: SpectralRecord): number {
  return densityM2PerHz.reduce((sum, S, i) => sum + S * bandwidthHz[i], 0);
}

/**
 * A record as a sea holds it: directions as moments about the mean direction of all its energy, in the sense of the
 * waves' travel (counter-clockwise). Bands without energy and direction take the directions of the nearest that has one.
 *
 * @param record some of its bands have energy, and a direction
 */
export function measuredSpectrum(record: SpectralRecord): MeasuredSpectrum & { readonly fromRad: number } {
  const { frequencyHz, densityM2PerHz, bandwidthHz } = record;
  const directions = filledDirections(record.directions);
  const weighted = (key: 'cos1' | 'sin1'): number =>
    directions.reduce((sum, own, i) => sum + densityM2PerHz[i] * bandwidthHz[i] * own[key], 0);
  const from = Math.atan2(weighted('sin1'), weighted('cos1'));
  // Clockwise is against the sense of mathematics, so that the moments are conjugated as they are turned.
  const [c1, s1, c2, s2] = [Math.cos(from), Math.sin(from), Math.cos(2 * from), Math.sin(2 * from)];
  const peak = densityM2PerHz.indexOf(Math.max(...densityM2PerHz));
  const peakFrom = Math.atan2(directions[peak].sin1, directions[peak].cos1);
  return {
    fromRad: from < 0 ? from + 2 * Math.PI : from,
    peakFromRad: peakFrom < 0 ? peakFrom + 2 * Math.PI : peakFrom,
    significantHeightM: 4 * Math.sqrt(recordVariance(record)),
    frequencyHz,
    densityM2PerHz,
    cos1: directions.map(({ cos1, sin1 }) => cos1 * c1 + sin1 * s1),
    sin1: directions.map(({ cos1, sin1 }) => cos1 * s1 - sin1 * c1),
    cos2: directions.map(({ cos2, sin2 }) => cos2 * c2 + sin2 * s2),
    sin2: directions.map(({ cos2, sin2 }) => cos2 * s2 - sin2 * c2),
  };
}

function filledDirections(directions: SpectralRecord['directions']): readonly DirectionMoments[] {
  return directions.map((own, i) => {
    for (let step = 0; step < directions.length; step++) {
      const found = directions[i - step] ?? directions[i + step];
      if (found) return found;
    }
    return own ?? directionMoments(0, 0, 0, 0);
  });
}
