import { decode as decodeByFastPng } from 'fast-png';
import parseExr from 'parse-exr';
import { PNG as ForeignPng } from 'pngjs';
import { expect, it } from 'vitest';
import { EXR } from '../../src/codec/exr.ts';
import { PNG } from '../../src/codec/png.ts';
import type { Image } from '../../src/image/image.ts';
import { FILLS, FRAME_METADATA, SIZES, samePlane, sceneImage, scenesOf } from '../support/image-scenes.ts';

/** Sample type numbers of parse-exr. */
const FLOAT_TYPE = 1015;
const HALF_TYPE = 1016;

/** The samples of an image interleaved, row 0 first. */
function interleaved(image: Image): number[] {
  const { width, height, planes } = image;
  return Array.from({ length: width * height }, (_, i) => planes.map((plane) => plane[i])).flat();
}

/** Whether two rows of integer codes are equal. */
function sameCodes(a: ArrayLike<number>, b: ArrayLike<number>): boolean {
  return samePlane(Uint16Array.from(a), Uint16Array.from(b));
}

it.each(['half', 'float'] as const)(
  'parse-exr reads our R,G,B %s files to the bit, its rows from the bottom',
  (sample) => {
    let compared = 0;
    for (const size of SIZES) {
      for (const fill of FILLS) {
        const image = sceneImage(sample, ['R', 'G', 'B'], size, fill);
        const file = EXR.encode(image, FRAME_METADATA);
        const parsed = parseExr(Uint8Array.from(file).buffer, sample === 'half' ? HALF_TYPE : FLOAT_TYPE);
        const { width, height } = image;
        expect([parsed.width, parsed.height]).toEqual([width, height]);
        for (const [c, plane] of image.planes.entries()) {
          const read = plane.slice();
          for (let i = 0; i < read.length; i++) {
            const y = Math.floor(i / width);
            read[i] = parsed.data[4 * ((height - 1 - y) * width + (i % width)) + c];
          }
          expect(samePlane(read, plane), `${size} ${fill} ${c}`).toBe(true);
          compared += read.length;
        }
      }
    }
    expect(compared).toBeGreaterThan(60_000);
  },
);

it('fast-png and pngjs read our PNG files to the code', () => {
  for (const { name, image } of scenesOf(PNG)) {
    const file = PNG.encode(image, FRAME_METADATA);
    const wanted = interleaved(image);

    const fast = decodeByFastPng(file, { checkCrc: true });
    expect([fast.width, fast.height, fast.channels], name).toEqual([
      image.width,
      image.height,
      image.planes.length,
    ]);
    expect(fast.depth, name).toBe(image.sample === 'uint8' ? 8 : 16);
    expect(sameCodes(fast.data, wanted), name).toBe(true);

    // pngjs always answers with four channels: grey spread over three, alpha full where there is none.
    const foreign = ForeignPng.sync.read(Buffer.from(file), { skipRescale: true });
    const full = image.sample === 'uint8' ? 255 : 65535;
    const four =
      { 1: [0, 0, 0, -1], 2: [0, 0, 0, 1], 3: [0, 1, 2, -1], 4: [0, 1, 2, 3] }[image.planes.length] ?? [];
    const expected: number[] = [];
    for (let i = 0; i < image.width * image.height; i++) {
      for (const c of four) expected.push(c < 0 ? full : image.planes[c][i]);
    }
    expect(sameCodes(foreign.data, expected), name).toBe(true);
  }
});

it.each(FILLS)('fast-png reads a PNG of many deflate blocks to the code: %s', (fill) => {
  // Its inflater loses what a block of more than 128 KiB of literals holds, without a word.
  for (const sample of ['uint8', 'uint16'] as const) {
    const image = sceneImage(sample, ['R', 'G', 'B'], [512, 384], fill);
    const fast = decodeByFastPng(PNG.encode(image, FRAME_METADATA), { checkCrc: true });
    expect(sameCodes(fast.data, interleaved(image)), sample).toBe(true);
  }
});
