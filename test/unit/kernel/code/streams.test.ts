import { deflateSync, inflateSync } from 'node:zlib';
import fc from 'fast-check';
import { expect, it } from 'vitest';
import { BYTE_SCENES } from '../../../support/byte-scenes.ts';
import { KINDS, type Kind, kernelStream } from '../../../support/code-streams.ts';
import { scattered } from '../../../support/image-scenes.ts';
import { describeKernel } from '../../../support/kernels.ts';

/**
 * Lengths about every seam: vectors of 16, groups of 4, 6, 8 and 64 bytes, the longest match, the largest block with
 * fixed codes (1024), the least noise (8192), the longest stored piece (65535), the largest blocks (65536, 262144).
 */
const SHORT = [
  0, 1, 2, 3, 4, 5, 7, 8, 9, 15, 16, 17, 31, 33, 63, 64, 65, 100, 257, 258, 259, 260, 517, 1023, 1024,
];
const LONG = [1025, 8191, 8192, 20_000, 65_535, 65_536, 65_537, 131_077, 262_143, 262_145];
const KIND_NAMES = Object.keys(KINDS) as Kind[];

/** The most bytes a stream may take: stored pieces of 65535 bytes at most, a few more where blocks are cut evenly. */
function storedBytes(length: number): number {
  const pieces = Math.ceil(length / 65_535) + Math.ceil(length / 65_536);
  return 2 + length + 5 * Math.max(1, pieces) + 4;
}

/** What is wrong with the stream of some bytes; null where nothing is. */
function fault(bytes: Uint8Array, kind: Kind): string | null {
  const stream = kernelStream(bytes, kind);
  let read: Uint8Array;
  try {
    read = inflateSync(stream);
  } catch (error) {
    return String(error);
  }
  if (Buffer.compare(read, bytes) !== 0) return 'other bytes';
  if (stream.length > storedBytes(bytes.length)) return `${stream.length} bytes for ${bytes.length}`;
  return null;
}

describeKernel('code', 'zlib streams', () => {
  it.each(Object.entries(BYTE_SCENES))('of %s hold them, at every length and in every way', (_, scene) => {
    const wrong: string[] = [];
    for (const length of [...SHORT, ...LONG]) {
      const bytes = scene(length);
      for (const kind of KIND_NAMES) {
        const found = fault(bytes, kind);
        if (found !== null) wrong.push(`${length} bytes, ${kind}: ${found}`);
      }
    }
    expect(wrong).toEqual([]);
  });

  it('hold any bytes', () => {
    const piece = fc.oneof(
      fc.uint8Array({ maxLength: 40 }),
      fc.tuple(fc.nat(255), fc.integer({ min: 1, max: 700 })).map(([b, n]) => new Uint8Array(n).fill(b)),
      fc
        .tuple(fc.uint8Array({ minLength: 1, maxLength: 9 }), fc.integer({ min: 1, max: 60 }))
        .map(([b, n]) => Uint8Array.from({ length: b.length * n }, (_, i) => b[i % b.length])),
      fc
        .tuple(fc.nat(1e6), fc.integer({ min: 1, max: 3000 }))
        .map(([seed, n]) => Uint8Array.from({ length: n }, (_, i) => 256 * scattered(seed + i))),
    );
    const bytes = fc.array(piece, { maxLength: 60 }).map((pieces) => new Uint8Array(Buffer.concat(pieces)));
    fc.assert(
      fc.property(bytes, fc.constantFrom(...KIND_NAMES), (some, kind) => {
        expect(fault(some, kind)).toBeNull();
      }),
      { numRuns: 400, seed: 11 },
    );
  });

  it('are the same bytes whatever the kernel made before', () => {
    const once = Object.values(BYTE_SCENES).flatMap((scene) =>
      KIND_NAMES.map((kind) => kernelStream(scene(70_001), kind)),
    );
    const again = Object.values(BYTE_SCENES)
      .reverse()
      .flatMap((scene) => [...KIND_NAMES].reverse().map((kind) => kernelStream(scene(70_001), kind)))
      .reverse();
    for (const [i, stream] of once.entries()) expect(Buffer.compare(stream, again[i])).toBe(0);
  });

  it('are found broken by zlib where one bit of them is changed', () => {
    const stream = kernelStream(BYTE_SCENES['small residues'](5000));
    for (let at = 2; at < stream.length; at += 97) {
      const changed = stream.slice();
      changed[at] ^= 1 << (at & 7);
      expect(() => {
        const read = inflateSync(changed);
        if (Buffer.compare(read, BYTE_SCENES['small residues'](5000)) === 0) throw new Error('unseen');
      }).toThrow(/(?<!unseen)$/);
    }
  });

  it.each([
    ['zeros', 'any', 1],
    ['runs of every length', 'any', 1],
    ['sparse blobs', 'any', 1],
    ['small residues', 'any', 1],
    ['large residues', 'any', 1],
    ['noise and residues by turns', 'any', 1.002],
    ['noise', 'any', 1],
    // Half of the bytes follow from the one before; a search as deep as level 6 finds a little more.
    ['pairs that cancel', 'repetitive pairs', 1.01],
  ] as const)('of %s are no longer than those of zlib at level 6', (name, kind, part) => {
    const bytes = BYTE_SCENES[name](200_000);
    const ours = kernelStream(bytes, kind).length;
    // 24 bytes: the header of a second block, which zeros cannot make up for.
    expect(ours).toBeLessThanOrEqual(part * deflateSync(bytes, { level: 6 }).length + 24);
  });
});
