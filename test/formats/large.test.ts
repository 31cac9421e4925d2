import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { decode as decodeByFastPng } from 'fast-png';
import parseExr from 'parse-exr';
import { PNG as ForeignPng } from 'pngjs';
import { describe, expect, it } from 'vitest';
import type { Codec } from '../../src/codec/codec.ts';
import { CODECS, CODECS_BY_ZLIB } from '../../src/codec/registry.ts';
import type { Image } from '../../src/image/image.ts';
import { externalProgram, withTemporaryFolder } from '../support/foreign-program.ts';
import { tiffPixels } from '../support/foreign-tiff.ts';
import { FILLS, type Fill, FRAME_METADATA, samePlane, sceneImage } from '../support/image-scenes.ts';

/*
 * Images large enough for every kind of block: filtered rows beyond 64 KiB and beyond the 128 KiB that some inflaters
 * make room for at once, blocks of OpenEXR beyond 64 KiB; odd widths. Read by every reader there is.
 */

const LARGE: readonly (readonly [width: number, height: number])[] = [
  [301, 211],
  [1031, 70],
];

const oiiotool = externalProgram('oiiotool');
const pngcheck = externalProgram('pngcheck');

/** Sample type numbers of parse-exr. */
const EXR_TYPES = { half: 1016, float: 1015 } as const;

function largeImages(codec: Codec): { readonly name: string; readonly image: Image }[] {
  return codec.samples.flatMap((sample) =>
    LARGE.flatMap((size) =>
      FILLS.flatMap((fill: Fill) =>
        [['R', 'G', 'B'], ['Y']].map((names) => ({
          name: `${sample} ${names.join('')} ${size.join('x')} ${fill}`,
          image: sceneImage(sample, names, size, fill),
        })),
      ),
    ),
  );
}

/** Whether interleaved samples from a foreign reader are those of the image. */
function sameSamples(image: Image, read: ArrayLike<number>, readChannels: number): boolean {
  const { width, height, planes } = image;
  for (let i = 0; i < width * height; i++) {
    for (const [c, plane] of planes.entries()) if (read[readChannels * i + c] !== plane[i]) return false;
  }
  return true;
}

describe.each([...CODECS, ...CODECS_BY_ZLIB])('large $format files', (codec) => {
  const images = largeImages(codec);

  it('are read by us to the bit', () => {
    for (const { name, image } of images) {
      const { planes, channels } = codec.decode(codec.encode(image, FRAME_METADATA));
      for (const [c, { name: channel }] of image.channels.entries()) {
        expect(samePlane(planes[channels.indexOf(channel)], image.planes[c]), `${name} ${channel}`).toBe(
          true,
        );
      }
    }
  });
});

describe('large PNG files', () => {
  const [, png] = CODECS;
  const images = largeImages(png);

  it('are read by fast-png and pngjs to the code', () => {
    for (const { name, image } of images) {
      const file = png.encode(image, FRAME_METADATA);
      const fast = decodeByFastPng(file, { checkCrc: true });
      expect(fast.channels, name).toBe(image.planes.length);
      expect(sameSamples(image, fast.data, fast.channels), `${name} by fast-png`).toBe(true);
      const foreign = ForeignPng.sync.read(Buffer.from(file), { skipRescale: true });
      expect(sameSamples(image, foreign.data, 4), `${name} by pngjs`).toBe(true);
    }
  });

  it.skipIf(pngcheck.skip)('have no fault that pngcheck finds', () => {
    withTemporaryFolder((folder) => {
      const paths = images.map(({ image }, i) => {
        const path = join(folder, `${i}.png`);
        writeFileSync(path, png.encode(image, FRAME_METADATA));
        return path;
      });
      expect(pngcheck.run(...paths).match(/^OK:/gm)?.length).toBe(paths.length);
    });
  });
});

describe('large EXR files', () => {
  const [exr] = CODECS;
  const images = largeImages(exr).filter(({ image }) => image.planes.length === 3);

  it('are read by parse-exr to the bit, its rows from the bottom', () => {
    for (const { name, image } of images) {
      const { width, height } = image;
      const file = exr.encode(image, FRAME_METADATA);
      const parsed = parseExr(Uint8Array.from(file).buffer, EXR_TYPES[image.sample as 'half' | 'float']);
      for (const [c, plane] of image.planes.entries()) {
        const read = plane.slice();
        for (let i = 0; i < read.length; i++) {
          read[i] = parsed.data[4 * ((height - 1 - Math.floor(i / width)) * width + (i % width)) + c];
        }
        expect(samePlane(read, plane), `${name} ${c}`).toBe(true);
      }
    }
  });

  it.skipIf(oiiotool.skip)('of floats are read by oiiotool to the bit', () => {
    withTemporaryFolder((folder) => {
      const floats = images.filter(({ image }) => image.sample === 'float');
      const theirs = floats.map((_, i) => join(folder, `${i}.tif`));
      const commands = floats.flatMap(({ image }, i) => {
        const ours = join(folder, `${i}.exr`);
        writeFileSync(ours, exr.encode(image, FRAME_METADATA));
        return [ours, '-d', 'float', '--compression', 'none', '-o', theirs[i]];
      });
      oiiotool.run(...commands);
      for (const [i, { name, image }] of floats.entries()) {
        const { bytes } = tiffPixels(readFileSync(theirs[i]));
        const read = new Float32Array(Uint8Array.from(bytes).buffer);
        for (const [c, plane] of image.planes.entries()) {
          const one = Float32Array.from({ length: plane.length }, (_, k) => read[3 * k + c]);
          expect(samePlane(one, plane), `${name} ${c}`).toBe(true);
        }
      }
    });
  });
});
