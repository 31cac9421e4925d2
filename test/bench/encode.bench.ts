import { constants, deflateSync } from 'node:zlib';
import { bench, describe } from 'vitest';
import { filteredRows } from '../../src/codec/png-filter.ts';
import { codecFor } from '../../src/codec/registry.ts';
import { FRAME_METADATA } from '../support/image-scenes.ts';
import { describeKernel } from '../support/kernels.ts';
import { seaImages } from '../support/sea-images.ts';

/*
 * Whole files by both coders; and for PNG what zlib's settings would take for the compression alone, of rows filtered
 * beforehand. Bytes a second are those of the samples: 1.57 MB of 16-bit displacement at 512 x 512.
 */

const SETTINGS = {
  'level 1': { level: 1 },
  'level 6': { level: 6 },
  'runs only': { level: 1, strategy: constants.Z_RLE },
  'Huffman only': { level: 1, strategy: constants.Z_HUFFMAN_ONLY },
};

describeKernel('code', 'encoding', () => {
  for (const N of [256, 512]) {
    for (const [name, image] of Object.entries(seaImages(N))) {
      describe(`${name}, ${N} x ${N}`, () => {
        const isPng = image.sample === 'uint8' || image.sample === 'uint16';
        const format = isPng ? 'png' : 'exr';
        const codec = codecFor(format);
        const byZlib = codecFor(format, 'zlib');
        bench('kernel, whole file', () => void codec.encode(image, FRAME_METADATA));
        bench('zlib coder, whole file', () => void byZlib.encode(image, FRAME_METADATA));
        if (!isPng) return;
        const rows = filteredRows(image.planes, N, N);
        for (const [setting, options] of Object.entries(SETTINGS)) {
          bench(`zlib ${setting}, filtered rows`, () => void deflateSync(rows, options));
        }
      });
    }
  }
});
