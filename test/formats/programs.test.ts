import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { EXR } from '../../src/codec/exr.ts';
import { PNG } from '../../src/codec/png.ts';
import { CODECS } from '../../src/codec/registry.ts';
import type { Image } from '../../src/image/image.ts';
import { fillFromHalf } from '../../src/math/half.ts';
import { externalProgram, withTemporaryFolder } from '../support/foreign-program.ts';
import { tiffPixels } from '../support/foreign-tiff.ts';
import { FILLS, FRAME_METADATA, samePlane, sceneImage, scenesOf } from '../support/image-scenes.ts';

const oiiotool = externalProgram('oiiotool');
const iinfo = externalProgram('iinfo');
const exrheader = externalProgram('exrheader');
const pngcheck = externalProgram('pngcheck');

/** The bytes of an uncompressed interleaved file of the image in its own integer type, or float for half and float. */
function interleavedBytes(image: Image): Uint8Array {
  const { width, height, sample, planes } = image;
  const values = planes.map((plane) => {
    if (sample !== 'half') return plane;
    const numbers = new Float32Array(plane.length);
    fillFromHalf(numbers, plane as Uint16Array);
    return numbers;
  });
  const count = width * height * planes.length;
  const out = new (values[0].constructor as Float32ArrayConstructor)(count);
  for (let i = 0; i < count; i++) out[i] = values[i % planes.length][Math.floor(i / planes.length)];
  return new Uint8Array(out.buffer);
}

describe.skipIf(oiiotool.skip)('oiiotool', () => {
  const TIFF_TYPE = { uint8: 'uint8', uint16: 'uint16', half: 'float', float: 'float' } as const;

  const cases = CODECS.flatMap((codec) =>
    codec.samples.map((sample) => ({ codec, sample, format: codec.format })),
  );
  it.each(cases)('reads $format $sample to the bit', ({ codec, sample }) => {
    withTemporaryFolder((folder) => {
      const images = FILLS.map((fill) => sceneImage(sample, ['R', 'G', 'B'], [37, 35], fill));
      const theirs = FILLS.map((fill) => join(folder, `${fill}.tif`));
      const commands = images.flatMap((image, i) => {
        const ours = join(folder, `${FILLS[i]}.${codec.extension}`);
        writeFileSync(ours, codec.encode(image, FRAME_METADATA));
        return [ours, '-d', TIFF_TYPE[sample], '--compression', 'none', '-o', theirs[i]];
      });
      oiiotool.run(...commands);
      for (const [i, image] of images.entries()) {
        const read = tiffPixels(readFileSync(theirs[i]));
        expect([read.width, read.height, read.channelCount]).toEqual([37, 35, 3]);
        expect(Buffer.compare(read.bytes, interleavedBytes(image)), FILLS[i]).toBe(0);
      }
    });
  });

  it.each(['half', 'float'] as const)(
    'writes %s EXR files, uncompressed, ZIPS and ZIP, that we read to the bit',
    (sample) => {
      const names = ['Y', 'slope.X', 'slope.Y'];
      const fills = ['waves', 'noise', 'extremes'] as const;
      withTemporaryFolder((folder) => {
        const cases = fills.flatMap((fill) =>
          (['none', 'zips', 'zip'] as const).map((zip) => ({ fill, zip })),
        );
        const theirs = cases.map(({ fill, zip }) => join(folder, `${fill}-${zip}.exr`));
        const commands = cases.flatMap(({ fill, zip }, i) => {
          const ours = join(folder, `${fill}.exr`);
          writeFileSync(ours, EXR.encode(sceneImage(sample, names, [37, 35], fill), FRAME_METADATA));
          return [ours, '-d', sample, '--compression', zip, '-o', theirs[i]];
        });
        oiiotool.run(...commands);
        for (const [i, { fill, zip }] of cases.entries()) {
          const image = sceneImage(sample, names, [37, 35], fill);
          const read = EXR.decode(readFileSync(theirs[i]));
          expect(read.attributes.get('loopswell.patchLengthM')).toBe(Math.fround(250.123456789));
          for (const [c, name] of names.entries()) {
            const plane = read.planes[read.channels.indexOf(name)];
            expect(samePlane(plane, image.planes[c]), `${fill} ${zip} ${name}`).toBe(true);
          }
        }
      });
    },
  );

  it.each(['uint8', 'uint16'] as const)('writes %s PNG files that we read to the code', (sample) => {
    const image = sceneImage(sample, ['R', 'G', 'B'], [37, 35], 'waves');
    withTemporaryFolder((folder) => {
      const ours = join(folder, 'ours.png');
      const theirs = join(folder, 'theirs.png');
      writeFileSync(ours, PNG.encode(image, FRAME_METADATA));
      oiiotool.run(ours, '-d', sample, '-o', theirs);
      const read = PNG.decode(readFileSync(theirs));
      for (const [c, plane] of image.planes.entries()) expect(samePlane(read.planes[c], plane)).toBe(true);
    });
  });

  it('does not accept a file of ours that was cut', () => {
    withTemporaryFolder((folder) => {
      const file = EXR.encode(sceneImage('half', ['R', 'G', 'B'], [37, 35], 'waves'), FRAME_METADATA);
      const cut = join(folder, 'cut.exr');
      writeFileSync(cut, file.subarray(0, file.length - 100));
      expect(() => oiiotool.run('--stats', cut)).toThrow(/exited with/);
    });
  });
});

describe.skipIf(iinfo.skip)('iinfo', () => {
  it('finds the standard attributes of an EXR frame and no colour', () => {
    withTemporaryFolder((folder) => {
      const path = join(folder, 'frame.exr');
      writeFileSync(
        path,
        EXR.encode(sceneImage('half', ['displacement.X'], [16, 16], 'waves'), FRAME_METADATA),
      );
      const printed = iinfo.run('-v', path);
      expect(printed).toContain('16 x   16, 1 channel, half openexr');
      for (const line of [
        'channel list: displacement.X',
        'framesPerSecond: 24000/1001',
        'imageCounter: 1007',
        'wrapmodes: "periodic"',
        'colorInteropID: "data"',
        'software: "loopswell 9.9.9"',
        'ImageDescription: "One frame of a scene for tests."',
        'loopswell.seed: 7',
      ]) {
        expect(printed).toContain(line);
      }
      expect(printed).not.toMatch(/chromaticities|DateTime/i);
    });
  });

  it('finds no gamma and no profile in a PNG frame', () => {
    withTemporaryFolder((folder) => {
      const path = join(folder, 'frame.png');
      writeFileSync(
        path,
        PNG.encode(sceneImage('uint16', ['R', 'G', 'B'], [16, 16], 'waves'), FRAME_METADATA),
      );
      const printed = iinfo.run('-v', path);
      expect(printed).toContain('16 x   16, 3 channel, uint16 png');
      expect(printed).not.toMatch(/gamma|icc/i);
    });
  });
});

describe.skipIf(exrheader.skip)('exrheader', () => {
  it('reads the header of every EXR scene', () => {
    withTemporaryFolder((folder) => {
      for (const sample of EXR.samples) {
        const path = join(folder, `${sample}.exr`);
        writeFileSync(
          path,
          EXR.encode(sceneImage(sample, ['displacement.X'], [3, 5], 'ramp'), FRAME_METADATA),
        );
        const printed = exrheader.run(path);
        // 31 bytes of name are the most that readers without long names take: `loopswell.decode.displacement.X`.
        expect(printed).toContain('file format version: 2, flags 0x0');
        expect(printed).toContain(`${sample === 'half' ? 16 : 32}-bit floating-point`);
        expect(printed).toContain('dataWindow (type box2i): (0 0) - (2 4)');
        expect(printed).toContain('loopswell.patchLengthM (type float): 250.123');
      }
    });
  });
});

describe.skipIf(pngcheck.skip)('pngcheck', () => {
  it('finds no fault in any PNG scene', () => {
    withTemporaryFolder((folder) => {
      const paths = scenesOf(PNG).map(({ image }, s) => {
        const path = join(folder, `${s}.png`);
        writeFileSync(path, PNG.encode(image, FRAME_METADATA));
        return path;
      });
      // No -q: with it pngcheck prints nothing for good files, and one that it never opened would look good too.
      const printed = pngcheck.run(...paths);
      expect(printed.match(/^OK:/gm)?.length).toBe(paths.length);
    });
  });

  it('does not accept a file of ours with one bit changed', () => {
    withTemporaryFolder((folder) => {
      const file = PNG.encode(sceneImage('uint16', ['Y'], [16, 16], 'waves'), FRAME_METADATA).slice();
      file[file.length - 40] ^= 1;
      const path = join(folder, 'changed.png');
      writeFileSync(path, file);
      expect(() => pngcheck.run(path)).toThrow(/exited with/);
    });
  });
});
