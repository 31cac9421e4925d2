/*
 * Codes put as a PNG wants them: samples of a texel side by side, 16-bit samples with the high byte first.
 *
 * Each output vector is three swizzles and two ors, with index 255 for a byte that comes from another channel. Two-sided
 * shuffles say the same with fewer words and take four times as long: V8 builds their masks anew for every use.
 */

/** Bytes of 8-bit samples from codes of two bytes; `count` is a multiple of 16. */
export function pack8(out: usize, codes: usize, count: usize): void {
  const end = codes + (count << 1);
  do {
    v128.store(out, bytes16(codes));
    codes += 32;
    out += 16;
  } while (codes < end);
}

/** 16-bit samples, high byte first; `count` is a multiple of 8. */
export function pack16(out: usize, codes: usize, count: usize): void {
  const swap = i8x16(1, 0, 3, 2, 5, 4, 7, 6, 9, 8, 11, 10, 13, 12, 15, 14);
  const end = codes + (count << 1);
  do {
    v128.store(out, i8x16.swizzle(v128.load(codes), swap));
    codes += 16;
    out += 16;
  } while (codes < end);
}

/**
 * Three channels of 8-bit samples side by side.
 *
 * @param out 3 `count` bytes
 * @param codes `count` codes of two bytes, of each channel, `apart` bytes from channel to channel; a multiple of 16
 */
export function packThree8(out: usize, codes: usize, apart: usize, count: usize): void {
  const r0 = i8x16(0, -1, -1, 1, -1, -1, 2, -1, -1, 3, -1, -1, 4, -1, -1, 5);
  const g0 = i8x16(-1, 0, -1, -1, 1, -1, -1, 2, -1, -1, 3, -1, -1, 4, -1, -1);
  const b0 = i8x16(-1, -1, 0, -1, -1, 1, -1, -1, 2, -1, -1, 3, -1, -1, 4, -1);
  const r1 = i8x16(-1, -1, 6, -1, -1, 7, -1, -1, 8, -1, -1, 9, -1, -1, 10, -1);
  const g1 = i8x16(5, -1, -1, 6, -1, -1, 7, -1, -1, 8, -1, -1, 9, -1, -1, 10);
  const b1 = i8x16(-1, 5, -1, -1, 6, -1, -1, 7, -1, -1, 8, -1, -1, 9, -1, -1);
  const r2 = i8x16(-1, 11, -1, -1, 12, -1, -1, 13, -1, -1, 14, -1, -1, 15, -1, -1);
  const g2 = i8x16(-1, -1, 11, -1, -1, 12, -1, -1, 13, -1, -1, 14, -1, -1, 15, -1);
  const b2 = i8x16(10, -1, -1, 11, -1, -1, 12, -1, -1, 13, -1, -1, 14, -1, -1, 15);
  const end = codes + (count << 1);
  do {
    const r = bytes16(codes);
    const g = bytes16(codes + apart);
    const b = bytes16(codes + 2 * apart);
    v128.store(out, gathered(r, g, b, r0, g0, b0));
    v128.store(out, gathered(r, g, b, r1, g1, b1), 16);
    v128.store(out, gathered(r, g, b, r2, g2, b2), 32);
    codes += 32;
    out += 48;
  } while (codes < end);
}

/** Three channels of 16-bit samples side by side, high byte first: 6 `count` bytes; `count` is a multiple of 8. */
export function packThree16(out: usize, codes: usize, apart: usize, count: usize): void {
  const r0 = i8x16(1, 0, -1, -1, -1, -1, 3, 2, -1, -1, -1, -1, 5, 4, -1, -1);
  const g0 = i8x16(-1, -1, 1, 0, -1, -1, -1, -1, 3, 2, -1, -1, -1, -1, 5, 4);
  const b0 = i8x16(-1, -1, -1, -1, 1, 0, -1, -1, -1, -1, 3, 2, -1, -1, -1, -1);
  const r1 = i8x16(-1, -1, 7, 6, -1, -1, -1, -1, 9, 8, -1, -1, -1, -1, 11, 10);
  const g1 = i8x16(-1, -1, -1, -1, 7, 6, -1, -1, -1, -1, 9, 8, -1, -1, -1, -1);
  const b1 = i8x16(5, 4, -1, -1, -1, -1, 7, 6, -1, -1, -1, -1, 9, 8, -1, -1);
  const r2 = i8x16(-1, -1, -1, -1, 13, 12, -1, -1, -1, -1, 15, 14, -1, -1, -1, -1);
  const g2 = i8x16(11, 10, -1, -1, -1, -1, 13, 12, -1, -1, -1, -1, 15, 14, -1, -1);
  const b2 = i8x16(-1, -1, 11, 10, -1, -1, -1, -1, 13, 12, -1, -1, -1, -1, 15, 14);
  const end = codes + (count << 1);
  do {
    const r = v128.load(codes);
    const g = v128.load(codes + apart);
    const b = v128.load(codes + 2 * apart);
    v128.store(out, gathered(r, g, b, r0, g0, b0));
    v128.store(out, gathered(r, g, b, r1, g1, b1), 16);
    v128.store(out, gathered(r, g, b, r2, g2, b2), 32);
    codes += 16;
    out += 48;
  } while (codes < end);
}

function gathered(r: v128, g: v128, b: v128, fromR: v128, fromG: v128, fromB: v128): v128 {
  const rg = v128.or(i8x16.swizzle(r, fromR), i8x16.swizzle(g, fromG));
  return v128.or(rg, i8x16.swizzle(b, fromB));
}

function bytes16(codes: usize): v128 {
  return i8x16.narrow_i16x8_u(v128.load(codes), v128.load(codes, 16));
}
