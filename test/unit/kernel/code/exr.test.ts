import { inflateSync } from 'node:zlib';
import { expect, it } from 'vitest';
import { exrByKernel } from '../../../../src/codec/exr-kernel-coder.ts';
import { exrByZlib } from '../../../../src/codec/exr-zlib-coder.ts';
import type { Plane } from '../../../../src/image/image.ts';
import { fillHalf } from '../../../../src/math/half.ts';
import { readDeflateStream } from '../../../support/deflate-blocks.ts';
import { planeBytes, scattered } from '../../../support/image-scenes.ts';
import { describeKernel } from '../../../support/kernels.ts';

const HEAD = Uint8Array.of(1, 2, 3);
const LINES = 16;

interface FoundBlock {
  readonly y: number;
  readonly data: Uint8Array;
}

/** The blocks behind the offset table. */
function blocksOf(file: Uint8Array, height: number): FoundBlock[] {
  const numbers = new DataView(file.buffer, file.byteOffset, file.byteLength);
  return Array.from({ length: Math.ceil(height / LINES) }, (_, b) => {
    const at = Number(numbers.getBigUint64(HEAD.length + 8 * b, true));
    const length = numbers.getInt32(at + 4, true);
    return { y: numbers.getInt32(at, true), data: file.subarray(at + 8, at + 8 + length) };
  });
}

/** The bytes of a block as the format's document puts them: line by line, channel by channel. */
function plainBlock(planes: readonly Plane[], width: number, height: number, y: number): Uint8Array {
  const parts: Uint8Array[] = [];
  for (let line = y; line < Math.min(height, y + LINES); line++) {
    for (const plane of planes) {
      const bytes = width * plane.BYTES_PER_ELEMENT;
      parts.push(planeBytes(plane).subarray(line * bytes, (line + 1) * bytes));
    }
  }
  return new Uint8Array(Buffer.concat(parts));
}

/** Reordered and predicted, as the format's document puts it. */
function predicted(plain: Uint8Array): Uint8Array {
  const halves = [...plain.filter((_, i) => i % 2 === 0), ...plain.filter((_, i) => i % 2 === 1)];
  return Uint8Array.from(halves, (byte, i) => (i === 0 ? byte : byte - halves[i - 1] + 128));
}

type Value = (x: number, y: number, c: number) => number;

const VALUES: Readonly<Record<string, Value>> = {
  waves: (x, y, c) => Math.sin(x / 9 + c) + 0.4 * Math.sin(y / 7 - x / 4) + 0.01 * scattered(x + 999 * y),
  ripples: (x, y, c) => 0.02 * Math.sin(1.7 * x + y + c) * (1 + scattered(x + 999 * y + 1e6 * c)),
  // Values near zero: signs and exponents change all the time, and in the same way from line to line.
  crossings: (x, y, c) => Math.sin(0.9 * x + 0.03 * y + c) * (1 + 0.05 * scattered(x + 999 * y)),
  noise: (x, y, c) => 4 * scattered(x + 999 * y + 1e6 * c) - 2,
  zero: () => 0,
  sparse: (x, y) => (scattered((x >> 3) + 99 * (y >> 2)) < 0.9 ? 0 : scattered(x + 999 * y)),
};

function planesOf(
  sample: 'half' | 'float',
  channels: number,
  width: number,
  height: number,
  value: Value,
): Plane[] {
  return Array.from({ length: channels }, (_, c) => {
    const values = Float64Array.from({ length: width * height }, (_, i) =>
      value(i % width, Math.floor(i / width), c),
    );
    if (sample === 'float') return Float32Array.from(values);
    const halves = new Uint16Array(values.length);
    fillHalf(halves, values);
    return halves;
  });
}

describeKernel('code', 'OpenEXR blocks', () => {
  it('are the reordered, predicted bytes, or the plain ones where these are not longer', () => {
    let plain = 0;
    for (const sample of ['half', 'float'] as const) {
      for (const channels of [1, 2, 3]) {
        for (const [width, height] of [
          [1, 1],
          [3, 5],
          [7, 16],
          [16, 17],
          [33, 40],
          [150, 35],
          [700, 20],
        ] as const) {
          for (const [name, value] of Object.entries(VALUES)) {
            const planes = planesOf(sample, channels, width, height, value);
            const file = exrByKernel(HEAD, planes, width, height);
            expect([...file.subarray(0, HEAD.length)]).toEqual([...HEAD]);
            for (const [b, { y, data }] of blocksOf(file, height).entries()) {
              const where = `${sample} ${channels} ${width}x${height} ${name} block ${b}`;
              expect(y, where).toBe(b * LINES);
              const bytes = plainBlock(planes, width, height, y);
              if (data.length === bytes.length) {
                plain++;
                expect(Buffer.compare(data, bytes), where).toBe(0);
              } else {
                expect(data.length, where).toBeLessThan(bytes.length);
                expect(Buffer.compare(inflateSync(data), predicted(bytes)), where).toBe(0);
              }
            }
          }
        }
      }
    }
    expect(plain).toBeGreaterThan(10);
  });

  it('stand one behind the other, the file ending with the last', () => {
    const planes = planesOf('half', 3, 64, 50, VALUES.waves);
    const file = exrByKernel(HEAD, planes, 64, 50);
    const blocks = blocksOf(file, 50);
    let at = HEAD.length + 8 * blocks.length;
    for (const { data } of blocks) {
      expect(data.byteOffset - file.byteOffset).toBe(at + 8);
      at += 8 + data.length;
    }
    expect(file.length).toBe(at);
  });

  it('are one block of DEFLATE where small, else one for the low bytes and one for the high', () => {
    const deflated = (width: number): number[] => {
      const planes = planesOf('half', 1, width, 16, VALUES.waves);
      const [{ data }] = blocksOf(exrByKernel(HEAD, planes, width, 16), 16);
      return readDeflateStream(data).blocks.map(({ bytes }) => bytes);
    };
    expect(deflated(64)).toEqual([2048]);
    expect(deflated(200)).toEqual([3200, 3200]);
  });

  it('are searched for repeats while that pays', () => {
    const farMatches = (name: string): number[] => {
      const planes = planesOf('half', 3, 256, 128, VALUES[name]);
      return blocksOf(exrByKernel(HEAD, planes, 256, 128), 128).map(({ data }) => {
        const high = readDeflateStream(data).blocks.at(-1);
        return (high?.distanceCounts ?? []).slice(1).reduce((sum, count) => sum + count, 0);
      });
    };
    const searched = farMatches('crossings');
    expect(Math.min(...searched)).toBeGreaterThan(100);
    // The first block tells that it does not pay.
    const [, ...later] = farMatches('noise');
    expect(later).toEqual(later.map(() => 0));
  });

  // Waves take no search; ripples, whose high bytes are dear, do. The other coder is zlib without a search.
  it.each([
    ['half', 'waves', 1],
    ['half', 'ripples', 1],
    ['half', 'sparse', 1.01],
    ['float', 'waves', 1],
  ] as const)('of %s %s are no longer than zlib makes them', (sample, name, part) => {
    const planes = planesOf(sample, 3, 256, 256, VALUES[name]);
    const ours = exrByKernel(HEAD, planes, 256, 256).length;
    expect(ours).toBeLessThanOrEqual(part * exrByZlib(HEAD, planes, 256, 256).length);
  });
});
