import { deflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { EXR } from '../../../src/codec/exr.ts';
import { fillFromBlock, packedBlock } from '../../../src/codec/exr-block.ts';
import { InputError } from '../../../src/errors.ts';
import { FRAME_METADATA, scattered, sceneImage } from '../../support/image-scenes.ts';

/** Index just behind the bytes of a text in a file; fails where there is none. */
function behind(file: Uint8Array, text: string): number {
  const at = Buffer.from(file).indexOf(text, 0, 'latin1');
  expect(at, text).toBeGreaterThan(0);
  return at + text.length;
}

/** The compression step as the format's document puts it, byte by byte. */
function reorderedAndPredicted(raw: Uint8Array): Uint8Array {
  const halves = [...raw.filter((_, i) => i % 2 === 0), ...raw.filter((_, i) => i % 2 === 1)];
  return Uint8Array.from(halves, (byte, i) => (i === 0 ? byte : byte - halves[i - 1] + 128));
}

describe('file layout', () => {
  const image = sceneImage('half', ['R', 'G', 'B'], [5, 40], 'waves');
  const file = EXR.encode(image, FRAME_METADATA);
  const view = new DataView(file.buffer, file.byteOffset);

  it('begins with the magic number and version 2 without flags', () => {
    // Source: "OpenEXR File Layout", magic number 20000630 = 76 2f 31 01. Status: verified by exrheader in test/formats.
    expect([...file.subarray(0, 8)]).toEqual([0x76, 0x2f, 0x31, 0x01, 2, 0, 0, 0]);
  });

  it('names every required attribute once, and neither colour nor a clock', () => {
    const latin1 = Buffer.from(file).toString('latin1');
    for (const name of [
      'channels\0chlist\0',
      'compression\0compression\0',
      'dataWindow\0box2i\0',
      'displayWindow\0box2i\0',
      'lineOrder\0lineOrder\0',
      'pixelAspectRatio\0float\0',
      'screenWindowCenter\0v2f\0',
      'screenWindowWidth\0float\0',
      'type\0string\0',
    ]) {
      expect(latin1.split(name).length, name).toBe(2);
    }
    expect(latin1).not.toContain('chromaticities');
    expect(latin1).not.toContain('capDate');
  });

  it('points its offset table at blocks of 16 lines', () => {
    const blocks: number[] = [];
    let table = file.length;
    // The table is the last thing before the first block, so the least offset ends it.
    for (let at = 8; at < table; at++) {
      if (view.getBigUint64(at, true) === BigInt(at + 24)) table = at;
    }
    for (let b = 0; b < 3; b++) {
      const offset = Number(view.getBigUint64(table + 8 * b, true));
      blocks.push(view.getInt32(offset, true));
      const end = offset + 8 + view.getInt32(offset + 4, true);
      expect(end).toBe(b < 2 ? Number(view.getBigUint64(table + 8 * b + 8, true)) : file.length);
    }
    expect(blocks).toEqual([0, 16, 32]);
  });

  it('sets the flag for long names only where a name has more than 31 bytes', () => {
    const names = (length: number) => ['n'.repeat(length)];
    const flags = (length: number) =>
      EXR.encode(sceneImage('half', names(length), [1, 1], 'zero'), FRAME_METADATA)[5];
    // The channel's decode rule has 17 more bytes in its name: `loopswell.decode.`.
    expect(flags(14)).toBe(0);
    expect(flags(15)).toBe(4);
  });

  it('sorts channels by the bytes of their names', () => {
    const mixed = sceneImage('half', ['b', 'a.Z', 'Z', 'a-Z'], [2, 2], 'noise');
    const { channels } = EXR.decode(EXR.encode(mixed, FRAME_METADATA));
    expect(channels).toEqual(['Z', 'a-Z', 'a.Z', 'b']);
  });
});

describe('blocks', () => {
  const width = 6;
  const lines = 3;
  const halves = [0, 1].map((c) => Uint16Array.from({ length: 30 }, (_, i) => 0x3c00 + 7 * i + 300 * c));

  it('hold the bytes of the format document, reordered and predicted', () => {
    // Channel by channel within a line, low byte first; the block begins at row 2 of the planes.
    const raw: number[] = [];
    for (let y = 2; y < 2 + lines; y++) {
      for (const plane of halves) {
        for (let x = 0; x < width; x++) raw.push(plane[y * width + x] & 0xff, plane[y * width + x] >>> 8);
      }
    }
    const theirs = deflateSync(reorderedAndPredicted(Uint8Array.from(raw)));
    const read = halves.map(() => new Uint16Array(30));
    expect(fillFromBlock(read, theirs, width, 2 * width, lines)).toBeNull();
    for (const [c, plane] of read.entries()) expect(plane.subarray(12)).toEqual(halves[c].subarray(12));
    expect(read[0].subarray(0, 12)).toEqual(new Uint16Array(12));
  });

  it('are stored plain where compression does not help, and read back', () => {
    const noise = Float32Array.from({ length: 16 }, (_, i) => scattered(i));
    new Uint32Array(noise.buffer).forEach((_, i, bits) => {
      bits[i] = scattered(1000 + i) * 2 ** 32;
    });
    const stored = packedBlock([noise], 4, 0, 4);
    expect(stored).toEqual(new Uint8Array(noise.buffer));
    const read = new Float32Array(16);
    expect(fillFromBlock([read], stored, 4, 0, 4)).toBeNull();
    expect(new Uint8Array(read.buffer)).toEqual(new Uint8Array(noise.buffer));
  });

  it('are refused where they hold too few or too many bytes', () => {
    const plane = new Uint16Array(16);
    const sized = (length: number) => deflateSync(new Uint8Array(length));
    expect(fillFromBlock([plane], sized(32), 4, 0, 4)).toBeNull();
    expect(fillFromBlock([plane], sized(31), 4, 0, 4)).toMatch(/31 bytes/);
    expect(fillFromBlock([plane], sized(1_000_000), 4, 0, 4)).toMatch(/larger than 32 bytes/);
    expect(fillFromBlock([plane], sized(32).subarray(0, 8), 4, 0, 4)).toMatch(/unexpected end/);
  });
});

describe('headers that lie', () => {
  const file = EXR.encode(sceneImage('half', ['R', 'G', 'B'], [16, 16], 'waves'), FRAME_METADATA);

  /** The file with a 32-bit integer put `skip` bytes behind a text. */
  function changed(text: string, skip: number, value: number): Uint8Array {
    const copy = file.slice();
    new DataView(copy.buffer).setInt32(behind(copy, text) + skip, value, true);
    return copy;
  }

  it.each([
    [
      'a width that no file holds',
      changed('dataWindow\0box2i\0', 4 + 8, 2 ** 31 - 2),
      /size: expected at most 1073741824/,
    ],
    [
      'a size that this file cannot hold',
      changed('dataWindow\0box2i\0', 4 + 12, 40_000),
      /what a file of \d+ bytes can hold/,
    ],
    ['a window inside out', changed('dataWindow\0box2i\0', 4 + 8, -5), /size: expected at least one pixel/],
    [
      'more lines than blocks',
      changed('dataWindow\0box2i\0', 4 + 12, 47),
      /expected (scan line|an offset|\d+ more bytes)/,
    ],
    ['a negative attribute size', changed('comments\0string\0', 0, -4), /more bytes/],
    ['an attribute longer than the file', changed('comments\0string\0', 0, 2 ** 30), /more bytes/],
    [
      'an attribute size that is not its type’s',
      changed('dataWindow\0box2i\0', 0, 12),
      /dataWindow: expected a value of 12 bytes/,
    ],
    [
      'pixels of type uint',
      changed('channels\0chlist\0', 4 + 2, 0),
      /one pixel type|half \(1\) or float \(2\)/,
    ],
    ['subsampled channels', changed('channels\0chlist\0', 4 + 2 + 8, 2), /full resolution/],
    ['another magic number', Uint8Array.from([1, ...file.subarray(1)]), /magic number: expected 20000630/],
    [
      'tiles',
      Uint8Array.from([...file.subarray(0, 5), 2, ...file.subarray(6)]),
      /single-part scan-line file/,
    ],
    [
      'compression that we do not know',
      changed('compression\0compression\0', 1, 0x04000000),
      /compression: expected 0/,
    ],
  ])('%s are refused', (_, bytes, message) => {
    expect(() => EXR.decode(bytes, 'frame.exr')).toThrow(InputError);
    expect(() => EXR.decode(bytes, 'frame.exr')).toThrow(message);
    expect(() => EXR.decode(bytes, 'frame.exr')).toThrow(/^frame\.exr: /);
  });
});
