import { SAMPLE_LISTS } from './workspace';

/*
 * A row of an image as PNG has it: the channels of a pixel side by side, 16-bit samples with their high byte first.
 *
 * Sixteen bytes of each plane become as many vectors of pixels as there are channels. Each of these takes some bytes of
 * each plane, and a list says which of them go where; it has 128 for none, which a swizzle turns into 0. So up to 15
 * bytes behind a row of a plane are read, and up to 16 times the channels written behind the row made.
 *
 * The lists are in memory because V8 builds a constant vector anew wherever it is used, in five instructions: measured
 * 0.14 ns a byte so, 0.18 with shuffles of two operands (two lists each), 0.08 from memory.
 */

const NO_BYTE: usize = 128;

/**
 * SAMPLE_LISTS[v][c] = for each byte of the v-th vector of pixels the byte it takes of channel c, 128 for none.
 * @param channels 1..4
 * @param sampleBytes 1 or 2
 */
export function fillSampleLists(channels: usize, sampleBytes: usize): void {
  const pixelBytes = channels * sampleBytes;
  let list = SAMPLE_LISTS;
  for (let v: usize = 0; v < channels; v++) {
    for (let c: usize = 0; c < channels; c++, list += 16) {
      for (let i: usize = 0; i < 16; i++) {
        const byte: usize = (v << 4) + i;
        const within: usize = byte % pixelBytes;
        const fromEnd: usize = sampleBytes - (within % sampleBytes);
        const sample: usize = (byte / pixelBytes) * sampleBytes + fromEnd - 1;
        store<u8>(list + i, <u8>(within / sampleBytes === c ? sample : NO_BYTE));
      }
    }
  }
}

/**
 * @param row receives width * channels * sampleBytes bytes
 * @param plane the row in the plane of the first channel
 * @param step bytes from one plane to the next
 * @param planeRowBytes bytes of a row of one plane
 */
export function fillRow(row: usize, plane: usize, step: usize, planeRowBytes: usize, channels: usize): void {
  if (channels === 3) {
    fillThreeChannels(row, plane, step, planeRowBytes);
    return;
  }
  const end = plane + planeRowBytes;
  for (; plane < end; plane += 16) {
    let list = SAMPLE_LISTS;
    for (let v: usize = 0; v < channels; v++, row += 16) {
      let pixels = i8x16.splat(0);
      let from = plane;
      for (let c: usize = 0; c < channels; c++, from += step, list += 16) {
        pixels = v128.or(pixels, i8x16.swizzle(v128.load(from), v128.load(list)));
      }
      v128.store(row, pixels);
    }
  }
}

/** As fillRow, with the loops over vectors and channels written out. */
function fillThreeChannels(row: usize, red: usize, step: usize, planeRowBytes: usize): void {
  const end = red + planeRowBytes;
  const list0 = v128.load(SAMPLE_LISTS);
  const list1 = v128.load(SAMPLE_LISTS, 16);
  const list2 = v128.load(SAMPLE_LISTS, 32);
  const list3 = v128.load(SAMPLE_LISTS, 48);
  const list4 = v128.load(SAMPLE_LISTS, 64);
  const list5 = v128.load(SAMPLE_LISTS, 80);
  const list6 = v128.load(SAMPLE_LISTS, 96);
  const list7 = v128.load(SAMPLE_LISTS, 112);
  const list8 = v128.load(SAMPLE_LISTS, 128);
  for (; red < end; red += 16, row += 48) {
    const r = v128.load(red);
    const g = v128.load(red + step);
    const b = v128.load(red + 2 * step);
    const rg0 = v128.or(i8x16.swizzle(r, list0), i8x16.swizzle(g, list1));
    const rg1 = v128.or(i8x16.swizzle(r, list3), i8x16.swizzle(g, list4));
    const rg2 = v128.or(i8x16.swizzle(r, list6), i8x16.swizzle(g, list7));
    v128.store(row, v128.or(rg0, i8x16.swizzle(b, list2)));
    v128.store(row, v128.or(rg1, i8x16.swizzle(b, list5)), 16);
    v128.store(row, v128.or(rg2, i8x16.swizzle(b, list8)), 32);
  }
}
