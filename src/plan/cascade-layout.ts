/*
 * Contributor notes. Half of Nyquist leaves 4 texels on the shortest wave, below which bilinear sampling loses slope
 * fast; five waves across a tile at its long end is where tiling stops being seen from above; a fade of 1.25 each way
 * spans two cells of the finer tile at that point. What was compared stands in DEVELOPERS.md, "Decisions"; plans are
 * held against those of an independent program in test/published/cascade-plans.test.ts.
 */
import type { AutoCascades, ListedCascade, ListedCascades, Loop, Sea } from '../sea/sea.ts';
import type { Band, BandBorder } from '../waves/band.ts';
import { nyquistWavenumber } from '../waves/lattice.ts';
import { type RadialTable, radialIntegral } from '../waves/radial-table.ts';
import { patchLengthFor, zeroCellShare } from './longest-patch.ts';
import { fourDigits, unrelatedRatio, writtenPatch } from './patch-ratios.ts';

/** Half-width of the border between two cascades, as a factor on k. */
export const BORDER_FADE = 1.25;
/** Waves across a finer patch at the long end of its band. */
export const WAVES_ACROSS = 5;
/** Neighbouring patches closer than this share most of their waves: one of them is wasted. */
const LEAST_RATIO = 1.5;
/** Bands placed by hand that overlap by less than this factor count as touching. */
const NARROWEST_OVERLAP = 1.2;
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
  const first = request.longestPatchM ?? longestPatch(tables);
  const [ideal, written] = [[first], [first]];
  const largestRatio = largestPatchRatio(N, h);
  while (ideal.length < request.count) {
    const last = ideal[ideal.length - 1];
    const shortestSoFar = (2 * last) / (h * N);
    if (shortestSoFar <= 1.05 * request.shortestWavelengthM) break;
    // Equal steps for what is left, in as few cascades as keep them wide.
    const whole = shortestSoFar / request.shortestWavelengthM;
    const steps = Math.min(request.count - ideal.length, Math.floor(Math.log(whole) / Math.log(LEAST_RATIO)));
    const ratio = Math.min(whole ** (1 / Math.max(1, steps)), largestRatio);
    if (ratio < LEAST_RATIO) break;
    ideal.push(last / unrelatedRatio(ideal, ratio));
    written.push(writtenPatch(ideal[ideal.length - 1], written));
  }
  let low: BandBorder | null = null;
  return written.map((patchLengthM, c) => {
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

function listedLayouts(request: ListedCascades, loop: Loop): readonly CascadeLayout[] {
  const { list, headRoom } = request;
  let low = list[0].longestWavelengthM === null ? null : lowerBorder(list[0], headRoom);
  return list.map((cascade, c) => {
    const finer = list.at(c + 1);
    const end = finer === undefined ? upperBorder(cascade, headRoom) : borderTo(finer, cascade, headRoom);
    const high = inOrder(end, low);
    const { patchLengthM, resolution } = cascade;
    const layout = { patchLengthM, resolution, band: { low, high }, loop: cascade.loop ?? loop };
    // A gap between neighbours stays one, each side fading inside its own band.
    const begin =
      finer === undefined || finer.longestWavelengthM === null ? high : lowerBorder(finer, headRoom);
    low = isGap(high, begin) ? begin : high;
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

/**
 * The border between two neighbours placed by hand. Bands that overlap cross-fade over their whole overlap; those that
 * do not (or a finer band left open) meet in a standard border that ends where the longer one ends.
 */
function borderTo(finer: ListedCascade, longer: ListedCascade, headRoom: number): BandBorder {
  const kBottom = bandBottom(finer);
  const kTop = Math.min(bandTop(longer, headRoom), bandTop(finer, headRoom));
  const overlaps = finer.longestWavelengthM !== null && kTop / kBottom >= NARROWEST_OVERLAP;
  return overlaps ? borderBetween(kBottom, kTop) : upperBorder(longer, headRoom);
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

/** Whether one border begins clearly beyond where the other ends. */
function isGap(high: BandBorder, low: BandBorder): boolean {
  return low.kRadPerM / low.fade > high.kRadPerM * high.fade * 1.001;
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
    if (low === null || !isGap(high, low)) continue;
    gaps.push({
      longestWavelengthM: (2 * Math.PI) / (high.kRadPerM * high.fade),
      shortestWavelengthM: ((2 * Math.PI) / low.kRadPerM) * low.fade,
    });
  }
  return gaps;
}
