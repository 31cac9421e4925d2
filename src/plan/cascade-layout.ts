/*
 * Contributor notes. Constants and the search come from a numerical study of tilings (kept with the project's design
 * notes; figures in DEVELOPERS.md, "Decisions"): half of Nyquist leaves 4 texels on the shortest wave, below which
 * bilinear sampling loses slope fast; five waves across a tile at its long end is where tiling stops being seen from
 * above; a fade of 1.25 each way spans two cells of the finer tile at that point.
 */
import type { AutoCascades, ListedCascade, ListedCascades, Loop, Sea } from '../sea/sea.ts';
import type { Band, BandBorder } from '../waves/band.ts';
import { nyquistWavenumber } from '../waves/lattice.ts';
import { type RadialTable, radialIntegral } from '../waves/radial-table.ts';
import { patchLengthFor, zeroCellShare } from './longest-patch.ts';

/** Half-width of the border between two cascades, as a factor on k. */
export const BORDER_FADE = 1.25;
/** Waves across a finer patch at the long end of its band. */
export const WAVES_ACROSS = 5;
/** Bands placed by hand that overlap by less than this factor count as touching. */
const NARROWEST_OVERLAP = 1.2;
/** Largest denominator looked at when patch ratios are kept away from simple fractions. */
const LARGEST_DENOMINATOR = 12;
/** A patch whose k = 0 cell holds more than this share of m0 is lengthened. */
const ZERO_CELL_SHARE = 0.005;

/** Where one cascade sits, before its waves are drawn. */
export interface CascadeLayout {
  readonly patchLengthM: number;
  readonly resolution: number;
  readonly band: Band;
  readonly loop: Loop;
}

/** A stretch of wavelengths that no cascade covers though its neighbours were placed by hand. */
export interface BandGap {
  readonly longestWavelengthM: number;
  readonly shortestWavelengthM: number;
}

/** Lays out the cascades a sea asks for, longest patch first. */
export function cascadeLayouts(sea: Sea, tables: readonly RadialTable[]): readonly CascadeLayout[] {
  return sea.cascades.plan === 'auto'
    ? plannedLayouts(sea.cascades, sea.loop, tables)
    : listedLayouts(sea.cascades, sea.loop);
}

/** Largest ratio of neighbouring patches that keeps `WAVES_ACROSS` waves at the long end: h N / (2 F^2 m). */
export function largestPatchRatio(resolution: number, headRoom: number): number {
  return (headRoom * resolution) / (2 * BORDER_FADE ** 2 * WAVES_ACROSS);
}

function plannedLayouts(
  request: AutoCascades,
  loop: Loop,
  tables: readonly RadialTable[],
): readonly CascadeLayout[] {
  const { resolution: N, headRoom: h } = request;
  const patches = [request.longestPatchM ?? longestPatch(tables)];
  const largestRatio = largestPatchRatio(N, h);
  while (patches.length < request.count) {
    const shortestSoFar = (2 * patches[patches.length - 1]) / (h * N);
    if (shortestSoFar <= 1.05 * request.shortestWavelengthM) break;
    const remaining = request.count - patches.length;
    const equalRatio = (shortestSoFar / request.shortestWavelengthM) ** (1 / remaining);
    const ratio = Math.min(equalRatio, largestRatio);
    if (ratio < 1.5) break;
    patches.push(unrelatedPatch(patches, ratio));
  }
  let low: BandBorder | null = null;
  return patches.map((patchLengthM, c) => {
    const kMax = h * nyquistWavenumber({ patchLengthM, resolution: N });
    const high: BandBorder = { kRadPerM: kMax / BORDER_FADE, fade: BORDER_FADE };
    const layout = { patchLengthM, resolution: N, band: { low, high }, loop: request.loops[c] ?? loop };
    low = high;
    return layout;
  });
}

function longestPatch(tables: readonly RadialTable[]): number {
  const m0s = tables.map((table) => radialIntegral(table, () => 1));
  const m0 = m0s.reduce((a, b) => a + b, 0);
  const counted = tables.filter((_, s) => m0s[s] >= 0.05 * m0);
  let L = Math.max(...counted.map(patchLengthFor));
  while (zeroCellShare(counted, L) > ZERO_CELL_SHARE) L *= 1.25;
  return fourDigits(L);
}

/**
 * The next patch, m: shorter than the last by a ratio in [0.9 R, R], as far from simple fractions with every longer
 * patch as can be, leaning slightly to the larger ratio. Tiles whose lengths share a small multiple line up and repeat
 * together. Lengths are judged as they will be written: rounding alone can bring two in line.
 */
function unrelatedPatch(patches: readonly number[], R: number): number {
  const last = patches[patches.length - 1];
  let best = last / R;
  let bestScore = -Infinity;
  for (let step = 0; step <= 50; step++) {
    const r = (0.9 + 0.002 * step) * R;
    const candidate = fourDigits(last / r);
    let distance = Infinity;
    for (const patch of patches) distance = Math.min(distance, distanceToFractions(patch / candidate));
    const score = distance + (0.02 * r) / R;
    if (score > bestScore) {
      best = candidate;
      bestScore = score;
    }
  }
  return best;
}

/** min over q = 1..12 of q * |q R - nearest whole number|; 0 for R a fraction with a denominator up to 12. */
export function distanceToFractions(R: number): number {
  let distance = Infinity;
  for (let q = 1; q <= LARGEST_DENOMINATOR; q++) {
    distance = Math.min(distance, q * Math.abs(q * R - Math.round(q * R)));
  }
  return distance;
}

/** Lengths are rounded to four digits, so that a shader can carry them as written. */
function fourDigits(value: number): number {
  return Number(value.toPrecision(4));
}

function listedLayouts(request: ListedCascades, loop: Loop): readonly CascadeLayout[] {
  const { list, headRoom } = request;
  let low = outerLow(list[0], headRoom);
  return list.map((cascade, c) => {
    const next = c + 1 < list.length ? sharedBorder(cascade, list[c + 1], headRoom) : null;
    const high = inOrder(next?.high ?? upperBorder(cascade, headRoom), low);
    const { patchLengthM, resolution } = cascade;
    const layout = { patchLengthM, resolution, band: { low, high }, loop: cascade.loop ?? loop };
    low = inOrder(next?.low ?? high, high);
    return layout;
  });
}

/** Wavenumber at which a listed cascade's band ends, stated or by the head room, rad/m. */
function bandTop(cascade: ListedCascade, headRoom: number): number {
  const { shortestWavelengthM } = cascade;
  return shortestWavelengthM === null
    ? headRoom * nyquistWavenumber(cascade)
    : (2 * Math.PI) / shortestWavelengthM;
}

/** Wavenumber at which a listed cascade's band begins, stated or by the patch, rad/m. */
function bandBottom({ longestWavelengthM, patchLengthM }: ListedCascade): number {
  return (2 * Math.PI) / (longestWavelengthM ?? patchLengthM);
}

/** Fade of a border inside a cascade's own band: the standard one, but no more than a quarter of a narrow band. */
function ownFade(cascade: ListedCascade, headRoom: number): number {
  return Math.min(BORDER_FADE, (bandTop(cascade, headRoom) / bandBottom(cascade)) ** 0.25);
}

/** The border that ends a band at its shortest wave; it fades inside the band. */
function upperBorder(cascade: ListedCascade, headRoom: number): BandBorder {
  const fade = ownFade(cascade, headRoom);
  return { kRadPerM: bandTop(cascade, headRoom) / fade, fade };
}

/** The border that begins a band at its stated longest wave; it fades inside the band. */
function lowerBorder(cascade: ListedCascade, headRoom: number): BandBorder {
  const fade = ownFade(cascade, headRoom);
  return { kRadPerM: bandBottom(cascade) * fade, fade };
}

function outerLow(cascade: ListedCascade, headRoom: number): BandBorder | null {
  return cascade.longestWavelengthM === null ? null : lowerBorder(cascade, headRoom);
}

/**
 * The border between two neighbours placed by hand. Bands that overlap cross-fade over their whole overlap; bands that
 * touch (or a finer band left open) share a standard border that ends where the longer patch ends; a gap stays a gap,
 * each side fading inside its own band.
 */
function sharedBorder(
  longer: ListedCascade,
  finer: ListedCascade,
  headRoom: number,
): { readonly high: BandBorder; readonly low: BandBorder } {
  const upper = upperBorder(longer, headRoom);
  if (finer.longestWavelengthM === null) return { high: upper, low: upper };
  const kBottom = bandBottom(finer);
  const kTop = Math.min(bandTop(longer, headRoom), bandTop(finer, headRoom));
  if (kTop / kBottom >= NARROWEST_OVERLAP) {
    const shared = borderBetween(kBottom, kTop);
    return { high: shared, low: shared };
  }
  if (kBottom <= bandTop(longer, headRoom) * 1.001) return { high: upper, low: upper };
  return { high: upper, low: lowerBorder(finer, headRoom) };
}

/**
 * A border moved up, where need be, so that it begins and ends no lower than the one before it: the weights of bands
 * that overlap three deep, or of a patch whose band ends before its longer neighbour's, then still sum to 1.
 */
function inOrder(border: BandBorder, before: BandBorder | null): BandBorder {
  if (before === null) return border;
  const [from, to] = [border.kRadPerM / border.fade, border.kRadPerM * border.fade];
  const [leastFrom, leastTo] = [before.kRadPerM / before.fade, before.kRadPerM * before.fade];
  if (from >= leastFrom && to >= leastTo) return border;
  if (from <= leastFrom && to <= leastTo) return before;
  return borderBetween(Math.max(from, leastFrom), Math.max(to, leastTo));
}

/** The border that fades over the wavenumbers from .. to, rad/m. */
function borderBetween(from: number, to: number): BandBorder {
  return { kRadPerM: Math.sqrt(from * to), fade: Math.sqrt(to / from) };
}

/** Wavelengths between neighbouring bands that neither holds. */
export function bandGaps(layouts: readonly CascadeLayout[]): readonly BandGap[] {
  const gaps: BandGap[] = [];
  for (let c = 1; c < layouts.length; c++) {
    const { high } = layouts[c - 1].band;
    const { low } = layouts[c].band;
    if (low === null) continue;
    const kTop = high.kRadPerM * high.fade;
    const kBottom = low.kRadPerM / low.fade;
    if (kBottom > kTop * 1.001) {
      gaps.push({ longestWavelengthM: (2 * Math.PI) / kTop, shortestWavelengthM: (2 * Math.PI) / kBottom });
    }
  }
  return gaps;
}
