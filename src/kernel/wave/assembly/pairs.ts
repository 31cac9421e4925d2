/*
 * Two real fields a and b share a complex transform as a + i b. This makes the spectra of the pairs from h, row by row,
 * and transforms them.
 *
 * A row of waves k gives two rows of the spectrum: with the transforms f_a and f_b of the real fields,
 *
 *     P(k)  = f_a(k) + i f_b(k),   P(-k) = conj f_a(k) + i conj f_b(k)
 *
 * Rows are made in two planes (real, imaginary) in the first cache, where the first stage of the transform reads them.
 *
 * One pair is made at a time from h in memory: a row is scattered over all strips, one memory page each, and all pairs
 * of a row at once would touch as many pages for each of them. Making the rows costs 6 % of their transform at 256.
 */
import {
  ROW_PLANE,
  STRIP_PAD,
  STRIP_ROW,
  wavesInner,
  wavesResolution,
  wavesRowPlanes,
  wavesRows,
  wavesSpans,
  wavesWavenumbers,
} from './layout';
import { transformColumns, transformRow } from './transform';

/**
 * Transforms the gradient of q times the waves: a = d/dx, b = d/dy.
 *
 *     f_a = i kx q h,  f_b = i ky q h
 *
 * @param plan transform plan
 * @param waves waves plan
 * @param h the waves' vectors
 * @param gain q by vector, four floats; 0 for q = 1
 * @param strips out: the pair
 */
export function transformGradient(plan: usize, waves: usize, h: usize, gain: usize, strips: usize): void {
  transformPair(GRADIENT, plan, waves, h, gain, 0, strips);
}

/**
 * Transforms the waves themselves with a multiple of their shear: a = eta, b = scale Dxy.
 *
 *     f_a = h,  f_b = -scale kx ky q h
 */
export function transformHeight(
  plan: usize,
  waves: usize,
  h: usize,
  gain: usize,
  scale: f32,
  strips: usize,
): void {
  transformPair(HEIGHT, plan, waves, h, gain, scale, strips);
}

/**
 * Transforms the strain along the axes: a = Dxx, b = Dyy.
 *
 *     f_a = -kx^2 q h,  f_b = -ky^2 q h
 */
export function transformStrain(plan: usize, waves: usize, h: usize, gain: usize, strips: usize): void {
  transformPair(STRAIN, plan, waves, h, gain, 0, strips);
}

const GRADIENT = 0;
const HEIGHT = 1;
const STRAIN = 2;

function transformPair(
  kind: i32,
  plan: usize,
  waves: usize,
  h: usize,
  gain: usize,
  scale: f32,
  strips: usize,
): void {
  const N: usize = load<u32>(waves + wavesResolution);
  const rows: usize = load<u32>(waves + wavesRows);
  const inner = load<u32>(waves + wavesInner) !== 0;
  const wavenumbers: usize = load<u32>(waves + wavesWavenumbers);
  const north: usize = load<u32>(waves + wavesRowPlanes);
  const south = north + 2 * ROW_PLANE;
  let spans: usize = load<u32>(waves + wavesSpans);
  memory.fill(north, 0, 4 * ROW_PLANE);
  let widestEast: usize = 0;
  let widestWest: usize = 0;
  for (let ny: usize = 0; ny < rows; ny++, spans += 8) {
    const east: usize = load<u32>(spans);
    const west: usize = load<u32>(spans, 4);
    const ky = load<f32>(wavenumbers + (ny << 2));
    fillOppositeRows(kind, h, gain, scale, east, 0, N, wavenumbers, ky, north, south);
    h += east << 5;
    if (gain !== 0) gain += east << 4;
    fillOppositeRows(kind, h, gain, scale, west, N - (west << 2), N, wavenumbers, ky, north, south);
    h += west << 5;
    if (gain !== 0) gain += west << 4;
    // Spans only shrink from row to row: what a wider row left beyond is no wave of this one.
    if (widestEast > east) clearOppositeRows(east << 2, widestEast - east, N, north, south);
    if (widestWest > west) clearOppositeRows(N - (widestWest << 2), widestWest - west, N, north, south);
    widestEast = east;
    widestWest = west;
    transformRow(plan, north, north + ROW_PLANE, strips, ny, inner);
    if (ny === 0) continue;
    // -nx of nx = 0 was written as index N.
    store<f32>(south, load<f32>(south + (N << 2)));
    store<f32>(south + ROW_PLANE, load<f32>(south + ROW_PLANE + (N << 2)));
    transformRow(plan, south, south + ROW_PLANE, strips, N - ny, inner);
  }
  // An inner spectrum's middle half is not read, so only the rest of its outer quarters is cleared.
  clearStripRows(strips, N, rows, inner ? N >> 2 : N - rows + 1);
  if (inner) clearStripRows(strips, N, N - (N >> 2), N - rows + 1);
  transformColumns(plan, strips, inner);
}

/**
 * Fills `count` vectors of the row ny from index `from` on, and their opposites in the row -ny, where index i has its
 * opposite at N - i and a vector its lanes in reverse.
 */
function fillOppositeRows(
  kind: i32,
  h: usize,
  gain: usize,
  scale: f32,
  count: usize,
  from: usize,
  N: usize,
  wavenumbers: usize,
  ky: f32,
  north: usize,
  south: usize,
): void {
  const n = north + (from << 2);
  const s = south + ((N - from - 3) << 2);
  const kx = wavenumbers + (from << 2);
  if (kind === STRAIN) fillStrain(h, gain, count, kx, ky, n, s);
  else if (kind === HEIGHT) fillHeight(h, gain, scale, count, kx, ky, n, s);
  else if (gain === 0) fillSlope(h, count, kx, ky, n, s);
  else fillGradient(h, gain, count, kx, ky, n, s);
}

function fillGradient(
  h: usize,
  gain: usize,
  count: usize,
  kx: usize,
  ky: f32,
  north: usize,
  south: usize,
): void {
  const y = f32x4.splat(ky);
  for (const end = h + (count << 5); h < end; h += 32) {
    const q = v128.load(gain);
    const x = f32x4.mul(v128.load(kx), q);
    const yq = f32x4.mul(y, q);
    storeTurned(north, south, v128.load(h), v128.load(h, 16), x, yq);
    gain += 16;
    kx += 16;
    north += 16;
    south -= 16;
  }
}

function fillSlope(h: usize, count: usize, kx: usize, ky: f32, north: usize, south: usize): void {
  const y = f32x4.splat(ky);
  for (const end = h + (count << 5); h < end; h += 32) {
    storeTurned(north, south, v128.load(h), v128.load(h, 16), v128.load(kx), y);
    kx += 16;
    north += 16;
    south -= 16;
  }
}

function fillHeight(
  h: usize,
  gain: usize,
  scale: f32,
  count: usize,
  kx: usize,
  ky: f32,
  north: usize,
  south: usize,
): void {
  const y = f32x4.splat(-scale * ky);
  for (const end = h + (count << 5); h < end; h += 32) {
    const shear = f32x4.mul(f32x4.mul(v128.load(kx), y), v128.load(gain));
    const re = v128.load(h);
    const im = v128.load(h, 16);
    storeOpposites(north, south, re, im, f32x4.mul(re, shear), f32x4.mul(im, shear));
    gain += 16;
    kx += 16;
    north += 16;
    south -= 16;
  }
}

function fillStrain(
  h: usize,
  gain: usize,
  count: usize,
  kx: usize,
  ky: f32,
  north: usize,
  south: usize,
): void {
  const minusYY = f32x4.splat(-ky * ky);
  for (const end = h + (count << 5); h < end; h += 32) {
    const q = v128.load(gain);
    const x = v128.load(kx);
    const xx = f32x4.neg(f32x4.mul(f32x4.mul(x, x), q));
    const yy = f32x4.mul(minusYY, q);
    const re = v128.load(h);
    const im = v128.load(h, 16);
    storeOpposites(north, south, f32x4.mul(re, xx), f32x4.mul(im, xx), f32x4.mul(re, yy), f32x4.mul(im, yy));
    gain += 16;
    kx += 16;
    north += 16;
    south -= 16;
  }
}

/** Stores P(k) and P(-k) of f_a = i x h, f_b = i y h. */
function storeTurned(north: usize, south: usize, re: v128, im: v128, x: v128, y: v128): void {
  const xRe = f32x4.mul(x, re);
  const xIm = f32x4.mul(x, im);
  const yRe = f32x4.mul(y, re);
  const yIm = f32x4.mul(y, im);
  v128.store(north, f32x4.neg(f32x4.add(xIm, yRe)));
  v128.store(north, f32x4.sub(xRe, yIm), ROW_PLANE);
  v128.store(south, reversed(f32x4.sub(yRe, xIm)));
  v128.store(south, reversed(f32x4.neg(f32x4.add(xRe, yIm))), ROW_PLANE);
}

/** Stores P(k) and P(-k) of f_a = a, f_b = b. */
function storeOpposites(north: usize, south: usize, aRe: v128, aIm: v128, bRe: v128, bIm: v128): void {
  v128.store(north, f32x4.sub(aRe, bIm));
  v128.store(north, f32x4.add(aIm, bRe), ROW_PLANE);
  v128.store(south, reversed(f32x4.add(aRe, bIm)));
  v128.store(south, reversed(f32x4.sub(bRe, aIm)), ROW_PLANE);
}

function reversed(v: v128): v128 {
  return v128.shuffle<f32>(v, v, 3, 2, 1, 0);
}

/** Sets vectors from index `from` on to zero, and their opposites. */
function clearOppositeRows(from: usize, count: usize, N: usize, north: usize, south: usize): void {
  const zero = f32x4.splat(0);
  north += from << 2;
  south += (N - from - 3) << 2;
  for (const end = north + (count << 4); north < end; north += 16, south -= 16) {
    v128.store(north, zero);
    v128.store(north, zero, ROW_PLANE);
    v128.store(south, zero);
    v128.store(south, zero, ROW_PLANE);
  }
}

/** Sets rows from `from` to before `to` of all strips to zero. */
function clearStripRows(strips: usize, N: usize, from: usize, to: usize): void {
  const bytes = N * STRIP_ROW + STRIP_PAD;
  for (const end = strips + (N >> 4) * bytes; strips < end; strips += bytes) {
    memory.fill(strips + from * STRIP_ROW, 0, (to - from) * STRIP_ROW);
  }
}
