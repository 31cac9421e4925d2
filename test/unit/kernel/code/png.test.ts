import { constants, deflateSync, inflateSync } from 'node:zlib';
import fc from 'fast-check';
import { expect, it } from 'vitest';
import { chunks, SIGNATURE } from '../../../../src/codec/png-chunks.ts';
import { pngByKernel } from '../../../../src/codec/png-kernel-coder.ts';
import type { Plane } from '../../../../src/image/image.ts';
import { scattered } from '../../../support/image-scenes.ts';
import { describeKernel } from '../../../support/kernels.ts';

const NONE = 0;
const SUB = 1;
const UP = 2;
const PAETH = 4;
const FILTERS = [NONE, SUB, UP, PAETH];

/** The rows of an image as PNG has them: channels side by side, high bytes first. */
function imageRows(planes: readonly Plane[], width: number, height: number): Uint8Array[] {
  return Array.from({ length: height }, (_, y) => {
    const row: number[] = [];
    for (let x = 0; x < width; x++) {
      for (const plane of planes) {
        const sample = plane[y * width + x];
        if (plane.BYTES_PER_ELEMENT === 2) row.push(sample >> 8);
        row.push(sample & 255);
      }
    }
    return Uint8Array.from(row);
  });
}

/** The filtered rows by the words of the specification, section 9. */
function filteredByDefinition(rows: readonly Uint8Array[], pixelBytes: number, filter: number): Uint8Array {
  const out: number[] = [];
  for (const [y, row] of rows.entries()) {
    out.push(filter);
    for (const [i, byte] of row.entries()) {
      const a = row[i - pixelBytes] ?? 0;
      const b = rows[y - 1]?.[i] ?? 0;
      const c = rows[y - 1]?.[i - pixelBytes] ?? 0;
      const p = a + b - c;
      const [pa, pb, pc] = [Math.abs(p - a), Math.abs(p - b), Math.abs(p - c)];
      const paeth = pa <= pb && pa <= pc ? a : pb <= pc ? b : c;
      out.push(byte - ([0, a, b, 0, paeth][filter] ?? 0));
    }
  }
  return Uint8Array.from(out);
}

/** What stands in IDAT, inflated. */
function pixelBytesOf(planes: readonly Plane[], width: number, height: number): Uint8Array {
  const header = Uint8Array.from([...SIGNATURE]);
  const file = pngByKernel(header, planes, width, height);
  const [idat] = chunks(file, 'test').filter(({ type }) => type === 'IDAT');
  return inflateSync(idat.data);
}

function planesOf(
  type: 'uint8' | 'uint16',
  channels: number,
  width: number,
  height: number,
  value: (x: number, y: number, c: number) => number,
): Plane[] {
  return Array.from({ length: channels }, (_, c) => {
    const plane = type === 'uint8' ? new Uint8Array(width * height) : new Uint16Array(width * height);
    for (let i = 0; i < plane.length; i++) plane[i] = value(i % width, Math.floor(i / width), c);
    return plane;
  });
}

/** A smooth surface with some noise, as codes of either type. */
const sea =
  (largest: number) =>
  (x: number, y: number, c: number): number =>
    (largest / 2) * (1 + 0.4 * Math.sin(x / 7 + c) + 0.4 * Math.sin((y + x) / 11)) +
    (largest / 60) * scattered(x + 1000 * y + 1e6 * c);

describeKernel('code', 'PNG pixels', () => {
  it('are the rows of the image under one of the filters, by the words of the specification', () => {
    const sizes = [
      [1, 1],
      [2, 3],
      [5, 4],
      [15, 9],
      [16, 9],
      [17, 9],
      [33, 40],
      [127, 65],
    ] as const;
    const seen = new Set<number>();
    for (const type of ['uint8', 'uint16'] as const) {
      const largest = type === 'uint8' ? 255 : 65_535;
      const values = {
        sea: sea(largest),
        noise: (x: number, y: number, c: number) => largest * scattered(x + 997 * y + 1e5 * c),
        across: (x: number) => (largest / 128) * x,
        down: (_: number, y: number) => (largest / 128) * y + largest * scattered(7),
        extremes: (x: number, y: number, c: number) => largest * ((x + y + c) % 2),
        sparse: (x: number, y: number) => (scattered(x + 50 * y) < 0.97 ? 0 : largest),
      };
      for (const channels of [1, 2, 3, 4]) {
        for (const [width, height] of sizes) {
          for (const [name, value] of Object.entries(values)) {
            const planes = planesOf(type, channels, width, height, value);
            const found = pixelBytesOf(planes, width, height);
            const wanted = filteredByDefinition(
              imageRows(planes, width, height),
              channels * planes[0].BYTES_PER_ELEMENT,
              found[0],
            );
            seen.add(found[0]);
            expect(Buffer.compare(found, wanted), `${type} ${channels} ${width}x${height} ${name}`).toBe(0);
          }
        }
      }
    }
    expect([...seen].sort()).toEqual(FILTERS);
  });

  it('take Paeth’s predictor for every three neighbours', () => {
    // Rows of two pixels: c a / b x. All 2^24 neighbours are too many; these are all ties and all signs of differences.
    const property = fc.property(fc.uint8Array({ minLength: 4000, maxLength: 4000 }), (bytes) => {
      const plane = bytes.map((byte, i) => (i % 3 === 0 ? byte : byte % 5));
      const found = pixelBytesOf([plane], 50, 80);
      const wanted = filteredByDefinition(imageRows([plane], 50, 80), 1, found[0]);
      expect(Buffer.compare(found, wanted)).toBe(0);
    });
    fc.assert(property, { numRuns: 50, seed: 5 });
    // Every a, b, c of 0, 1, 2, 3, 127, 128, 254, 255, with waves around them so that Paeth is chosen.
    const few = [0, 1, 2, 3, 127, 128, 254, 255];
    const width = 2 * few.length ** 2;
    const plane = new Uint8Array(width * 600);
    for (let i = 0; i < plane.length; i++) plane[i] = sea(255)(i % width, Math.floor(i / width), 0);
    for (const [i, a] of few.entries()) {
      for (const [j, b] of few.entries()) {
        for (const [k, c] of few.entries()) {
          const x = 2 * (i * few.length + j);
          plane[2 * k * width + x] = c;
          plane[2 * k * width + x + 1] = b;
          plane[(2 * k + 1) * width + x] = a;
        }
      }
    }
    const found = pixelBytesOf([plane], width, 600);
    expect(found[0]).toBe(PAETH);
    const wanted = filteredByDefinition(imageRows([plane], width, 600), 1, PAETH);
    expect(Buffer.compare(found, wanted)).toBe(0);
  });

  it.each([
    ['waves, 16 bits', 'uint16', 3, sea(65_535), PAETH],
    ['waves, 8 bits', 'uint8', 3, sea(255), PAETH],
    [
      'foam',
      'uint8',
      1,
      (x: number, y: number) => Math.max(0, sea(255)(x, y, 0) - 200) * scattered(x + y * 777),
      NONE,
    ],
    ['nothing', 'uint8', 1, () => 0, NONE],
    ['a ramp across', 'uint16', 1, (x: number, y: number) => 250 * x + 60_000 * scattered(y), SUB],
    ['a ramp down', 'uint16', 1, (x: number, y: number) => 250 * y + 60_000 * scattered(x), UP],
    [
      'white noise',
      'uint16',
      3,
      (x: number, y: number, c: number) => 65_535 * scattered(x + 256 * y + 7e5 * c),
      NONE,
    ],
  ] as const)('take for %s the filter that makes them shortest', (_, type, channels, value, filter) => {
    const planes = planesOf(type, channels, 256, 256, value);
    const rows = imageRows(planes, 256, 256);
    const pixelBytes = channels * planes[0].BYTES_PER_ELEMENT;
    const lengths = FILTERS.map(
      (one) => deflateSync(filteredByDefinition(rows, pixelBytes, one), { strategy: constants.Z_RLE }).length,
    );
    expect(FILTERS[lengths.indexOf(Math.min(...lengths))]).toBe(filter);
    expect(pixelBytesOf(planes, 256, 256)[0]).toBe(filter);
  });

  it('are right where rows are longer than a block, and where a band ends within the image', () => {
    for (const [type, channels, width, height] of [
      ['uint8', 1, 150_000, 3],
      ['uint16', 3, 23_000, 4],
      ['uint16', 3, 300, 200],
      ['uint8', 1, 131_071, 2],
      ['uint8', 1, 4, 60_000],
    ] as const) {
      const planes = planesOf(type, channels, width, height, sea(type === 'uint8' ? 255 : 65_535));
      const found = pixelBytesOf(planes, width, height);
      const rows = imageRows(planes, width, height);
      const wanted = filteredByDefinition(rows, channels * planes[0].BYTES_PER_ELEMENT, found[0]);
      expect(Buffer.compare(found, wanted), `${width}x${height}`).toBe(0);
    }
  });
});
