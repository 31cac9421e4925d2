import { deflateSync } from 'node:zlib';
import { expect, it } from 'vitest';
import { BYTE_SCENES } from '../../../support/byte-scenes.ts';
import { kernelStream } from '../../../support/code-streams.ts';
import {
  type DeflateBlock,
  kraftSum,
  readDeflateStream,
  shortestCodedBits,
} from '../../../support/deflate-blocks.ts';
import { scattered } from '../../../support/image-scenes.ts';
import { describeKernel } from '../../../support/kernels.ts';

/** The longest code that the kernel writes. */
const LONGEST_CODE = 12;

/** Bits that a block's own codes take for its symbols. */
function codedBits(counts: readonly number[], lengths: readonly number[]): number {
  return counts.reduce((sum, count, s) => sum + count * (lengths[s] ?? 0), 0);
}

function only(blocks: readonly DeflateBlock[]): DeflateBlock {
  expect(blocks).toHaveLength(1);
  return blocks[0];
}

it('the reader of this test reads what zlib writes', () => {
  for (const [name, scene] of Object.entries(BYTE_SCENES)) {
    const bytes = scene(5000);
    for (const level of [0, 1, 9]) {
      expect(Buffer.compare(readDeflateStream(deflateSync(bytes, { level })).bytes, bytes), name).toBe(0);
    }
  }
});

it('package-merge gives the lengths of a worked example', () => {
  // Counts 1, 1, 2, 4: Huffman lengths 3, 3, 2, 1 are 14 bits; with two bits for each at most, 16. By hand.
  expect(shortestCodedBits([1, 1, 2, 4], 15)).toBe(14);
  expect(shortestCodedBits([1, 1, 2, 4], 2)).toBe(16);
  // Fibonacci counts 1, 1, 2, 3, 5, 8: inner nodes 2, 4, 7, 12, 20 are 45 bits; with four bits at most, lengths
  // 4, 4, 4, 4, 2, 1 are 46.
  expect(shortestCodedBits([1, 1, 2, 3, 5, 8], 15)).toBe(45);
  expect(shortestCodedBits([1, 1, 2, 3, 5, 8], 4)).toBe(46);
});

describeKernel('code', 'blocks', () => {
  const scenes = Object.entries(BYTE_SCENES).flatMap(([name, scene]) =>
    [40, 3000, 70_000].map((length) => ({ name: `${length} of ${name}`, bytes: scene(length) })),
  );

  it('read by the RFC hold their bytes, and their codes are complete and short enough', () => {
    for (const { name, bytes } of scenes) {
      const stream = readDeflateStream(kernelStream(bytes, 'repetitive'));
      expect(Buffer.compare(stream.bytes, bytes), name).toBe(0);
      for (const { type, literalLengths, distanceLengths } of stream.blocks) {
        if (type !== 'dynamic') continue;
        expect(kraftSum(literalLengths), name).toBe(1);
        expect(kraftSum(distanceLengths), name).toBe(1);
        expect(Math.max(...literalLengths, ...distanceLengths), name).toBeLessThanOrEqual(LONGEST_CODE);
      }
    }
  });

  it('have codes as short as package-merge finds, or 0.5 % longer where the limit binds', () => {
    let limited = 0;
    for (const { name, bytes } of scenes) {
      for (const block of readDeflateStream(kernelStream(bytes)).blocks) {
        if (block.type !== 'dynamic') continue;
        const ours = codedBits(block.literalCounts, block.literalLengths);
        const unlimited = shortestCodedBits(block.literalCounts, 30);
        const shortest = shortestCodedBits(block.literalCounts, LONGEST_CODE);
        const binds = shortest > unlimited;
        if (binds) limited++;
        // Of long blocks with all 256 bytes a quarter is counted: 17500 of 70000 here.
        const part = block.bytes > 65_535 ? 1.005 : binds ? 1.005 : 1;
        expect(ours, name).toBeGreaterThanOrEqual(shortest);
        expect(ours, name).toBeLessThanOrEqual(part * shortest);
      }
    }
    expect(limited).toBeGreaterThan(0);
  });

  it('of Fibonacci counts reach the limit and no further', () => {
    const { literalLengths } = only(
      readDeflateStream(kernelStream(BYTE_SCENES['Fibonacci counts'](60_000))).blocks,
    );
    expect(literalLengths.filter((length) => length === LONGEST_CODE).length).toBeGreaterThanOrEqual(2);
    expect(Math.max(...literalLengths)).toBe(LONGEST_CODE);
  });

  it('of 256 equal counts and noise are stored: codes would not be shorter', () => {
    for (const name of ['equal counts', 'noise']) {
      for (const kind of ['any', 'perhaps noise'] as const) {
        const { blocks } = readDeflateStream(kernelStream(BYTE_SCENES[name](60_000), kind));
        expect(only(blocks).type, name).toBe('stored');
      }
    }
  });

  it('of bytes that might be noise but are not have codes', () => {
    // 255 of 256 bytes are log2(256/255) = 0.07 % shorter at best, and their collisions 1/255: taken for noise.
    const near = readDeflateStream(kernelStream(BYTE_SCENES['all bytes but one'](60_000), 'perhaps noise'));
    expect(only(near.blocks).type).toBe('stored');
    // A zero in 25 bytes more: 1 % shorter by codes.
    const tinted = BYTE_SCENES.noise(60_000).map((byte, i) => (scattered(i + 7) < 0.04 ? 0 : byte));
    const { blocks: tintedBlocks } = readDeflateStream(kernelStream(tinted, 'perhaps noise'));
    expect(only(tintedBlocks).type).toBe('dynamic');
    for (const name of ['noise and residues by turns', 'large residues']) {
      const { blocks } = readDeflateStream(kernelStream(BYTE_SCENES[name](60_000), 'perhaps noise'));
      expect(only(blocks).type, name).toBe('dynamic');
    }
  });

  it('of a few bytes take the fixed codes, and of one byte no more than zlib does', () => {
    for (const text of ['a', 'ab', 'the sea', 'aaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaa']) {
      const bytes = new TextEncoder().encode(text);
      const stream = kernelStream(bytes);
      expect(only(readDeflateStream(stream).blocks).type, text).toBe('fixed');
      expect(stream.length, text).toBeLessThanOrEqual(deflateSync(bytes, { level: 6 }).length);
    }
  });

  it('are stored where what was counted of them misleads', () => {
    // Of a long block a sixteenth at each quarter is counted. Here bytes from 128 on are rare there, and all that the
    // rest has: their codes get 12 bits.
    const bytes = BYTE_SCENES.noise(131_072).map((byte, i) => {
      if (i % 32_768 >= 8192) return 128 + (byte >> 1);
      return i % 64 === 0 ? 128 + ((i >> 6) & 127) : byte >> 1;
    });
    const stream = kernelStream(bytes);
    const read = readDeflateStream(stream);
    expect(Buffer.compare(read.bytes, bytes)).toBe(0);
    expect(read.blocks.map(({ type }) => type)).toEqual(['stored', 'stored', 'stored']);
  });

  it('hold runs behind a long stretch of literals', () => {
    const bytes = BYTE_SCENES['residues, zeros at the end'](120_000);
    const { literalCounts, distanceCounts } = only(readDeflateStream(kernelStream(bytes)).blocks);
    expect(distanceCounts[0]).toBeGreaterThan(24_000 / 258 - 1);
    expect(literalCounts.slice(0, 256).reduce((sum, count) => sum + count, 0)).toBeLessThan(97_000);
  });

  it('say two distance codes at least, also where there is no match', () => {
    const { blocks } = readDeflateStream(kernelStream(BYTE_SCENES['large residues'](30_000)));
    expect(only(blocks).distanceLengths).toEqual([1, 1]);
    expect(only(blocks).distanceCounts.every((count) => count === 0)).toBe(true);
  });

  it('write runs as matches at distance 1, however long', () => {
    const { blocks } = readDeflateStream(kernelStream(new Uint8Array(10_000)));
    const { literalCounts, distanceCounts, type } = only(blocks);
    expect(type).toBe('dynamic');
    // One zero, then 9999 repeats: 38 matches of 258 and one of 195 (symbol 283).
    expect(literalCounts[0]).toBe(1);
    expect(literalCounts[285]).toBe(38);
    expect(literalCounts[283]).toBe(1);
    expect(distanceCounts[0]).toBe(39);
  });

  it('leave no rest of a run shorter than a match can be', () => {
    for (const repeats of [258, 259, 260, 261, 516, 517, 518, 519]) {
      const run = new Uint8Array(2 + repeats);
      run[0] = 9;
      const { blocks } = readDeflateStream(kernelStream(run));
      const matches = only(blocks).distanceCounts[0];
      expect(only(blocks).literalCounts[0], `${repeats}`).toBe(1);
      expect(matches, `${repeats}`).toBe(Math.ceil(repeats / 258));
    }
  });

  it('find repeats at any distance up to 32768, and none beyond', () => {
    for (const distance of [40, 300, 5000, 32_767, 32_768, 32_769, 40_000]) {
      // Eight cheap bytes, and twice a word of forty that stand nowhere else: dear ones, worth a search.
      const bytes = Uint8Array.from({ length: 50_000 }, (_, i) => 8 * scattered(i));
      for (let i = 0; i < 40; i++) bytes[i] = bytes[distance + i] = 200 + i;
      const { blocks } = readDeflateStream(kernelStream(bytes, 'repetitive'));
      const { literalCounts, distanceCounts } = only(blocks);
      const matches = literalCounts.slice(257).reduce((sum, count) => sum + count, 0);
      // A match of 40 bytes, or of two more by chance, has symbol 273 (35..42).
      expect([matches, literalCounts[273]], `${distance}`).toEqual(distance <= 32_768 ? [1, 1] : [0, 0]);
      expect(distanceCounts.reduce((sum, count) => sum + count, 0)).toBe(matches);
    }
  });

  it('are cut evenly at 128 KiB, or 64 KiB where repeats are searched', () => {
    const bytes = BYTE_SCENES['large residues'](600_000);
    const sizes = (kind: 'any' | 'repetitive'): number[] =>
      readDeflateStream(kernelStream(bytes, kind)).blocks.map((block) => block.bytes);
    expect(sizes('any')).toEqual(new Array(5).fill(120_000));
    expect(sizes('repetitive')).toEqual(new Array(10).fill(60_000));
  });
});
