/*
 * A reader of zlib streams that shows how they are made: each block's type, codes and symbols. Written from RFC 1950 and
 * RFC 1951 for tests, byte by byte and as plainly as can be.
 */

/** One block as it stands in a stream. */
export interface DeflateBlock {
  readonly type: 'stored' | 'fixed' | 'dynamic';
  /** Code lengths by symbol; empty for a stored block. */
  readonly literalLengths: readonly number[];
  readonly distanceLengths: readonly number[];
  /** How often each symbol stands in the block, the end of block included. */
  readonly literalCounts: readonly number[];
  readonly distanceCounts: readonly number[];
  /** Bits of the whole block, header included. */
  readonly bits: number;
  /** Bytes it stands for. */
  readonly bytes: number;
}

export interface ReadStream {
  readonly bytes: Uint8Array;
  readonly blocks: readonly DeflateBlock[];
}

const LENGTH_BASES = [
  3, 4, 5, 6, 7, 8, 9, 10, 11, 13, 15, 17, 19, 23, 27, 31, 35, 43, 51, 59, 67, 83, 99, 115, 131, 163, 195,
  227, 258,
];
const LENGTH_EXTRA = [0, 0, 0, 0, 0, 0, 0, 0, 1, 1, 1, 1, 2, 2, 2, 2, 3, 3, 3, 3, 4, 4, 4, 4, 5, 5, 5, 5, 0];
const DISTANCE_BASES = [
  1, 2, 3, 4, 5, 7, 9, 13, 17, 25, 33, 49, 65, 97, 129, 193, 257, 385, 513, 769, 1025, 1537, 2049, 3073, 4097,
  6145, 8193, 12289, 16385, 24577,
];
const WRITING_ORDER = [16, 17, 18, 0, 8, 7, 9, 6, 10, 5, 11, 4, 12, 3, 13, 2, 14, 1, 15];

/** Sum of the code space that some lengths take; 1 for a complete code. */
export function kraftSum(lengths: readonly number[]): number {
  return lengths.reduce((sum, length) => sum + (length === 0 ? 0 : 2 ** -length), 0);
}

/** Reads a stream to its end; throws where it breaks a rule of the RFCs, an incomplete code included. */
export function readDeflateStream(stream: Uint8Array): ReadStream {
  if ((stream[0] * 256 + stream[1]) % 31 !== 0 || stream[0] !== 0x78) throw new Error('not a zlib header');
  let at = 16;
  const bit = (): number => {
    if (at >> 3 >= stream.length - 4) throw new Error('the stream ends too soon');
    const value = (stream[at >> 3] >> (at & 7)) & 1;
    at++;
    return value;
  };
  const number = (count: number): number => {
    let value = 0;
    for (let i = 0; i < count; i++) value += bit() * 2 ** i;
    return value;
  };
  const decoder = (lengths: readonly number[]): (() => number) => {
    if (kraftSum(lengths) !== 1) throw new Error(`a code takes ${kraftSum(lengths)} of the code space`);
    const symbols = new Map<string, number>();
    let code = 0;
    for (let length = 1; length <= 15; length++) {
      code *= 2;
      for (const [symbol, l] of lengths.entries()) {
        if (l === length) symbols.set((code++).toString(2).padStart(length, '0'), symbol);
      }
    }
    return () => {
      let text = '';
      for (;;) {
        text += bit();
        const symbol = symbols.get(text);
        if (symbol !== undefined) return symbol;
        if (text.length > 15) throw new Error('no such code');
      }
    };
  };

  const bytes: number[] = [];
  const blocks: DeflateBlock[] = [];
  for (let isLast = 0; isLast === 0; ) {
    const began = at;
    const before = bytes.length;
    isLast = bit();
    const type = (['stored', 'fixed', 'dynamic'] as const)[number(2)];
    if (type === undefined) throw new Error('a block of type 3');
    let literalLengths: number[] = [];
    let distanceLengths: number[] = [];
    const literalCounts = new Array<number>(288).fill(0);
    const distanceCounts = new Array<number>(32).fill(0);
    if (type === 'stored') {
      at = (at + 7) & ~7;
      const length = number(16);
      if ((length ^ number(16)) !== 0xffff) throw new Error('the length of a stored block is not said twice');
      for (let i = 0; i < length; i++) bytes.push(number(8));
    } else {
      if (type === 'fixed') {
        literalLengths = Array.from({ length: 288 }, (_, s) => (s < 144 ? 8 : s < 256 ? 9 : s < 280 ? 7 : 8));
        distanceLengths = new Array<number>(32).fill(5);
      } else {
        const literals = 257 + number(5);
        const distances = 1 + number(5);
        const headerLengths = new Array<number>(19).fill(0);
        const written = 4 + number(4);
        for (let i = 0; i < written; i++) headerLengths[WRITING_ORDER[i]] = number(3);
        const next = decoder(headerLengths);
        const lengths: number[] = [];
        while (lengths.length < literals + distances) {
          const symbol = next();
          if (symbol < 16) lengths.push(symbol);
          else {
            const value = symbol === 16 ? lengths[lengths.length - 1] : 0;
            const times = symbol === 16 ? 3 + number(2) : symbol === 17 ? 3 + number(3) : 11 + number(7);
            for (let i = 0; i < times; i++) lengths.push(value);
          }
        }
        if (lengths.length !== literals + distances) throw new Error('too many code lengths');
        literalLengths = lengths.slice(0, literals);
        distanceLengths = lengths.slice(literals);
      }
      const literal = decoder(literalLengths);
      const distanceSymbol = decoder(distanceLengths);
      for (;;) {
        const symbol = literal();
        literalCounts[symbol]++;
        if (symbol === 256) break;
        if (symbol < 256) {
          bytes.push(symbol);
          continue;
        }
        const length = LENGTH_BASES[symbol - 257] + number(LENGTH_EXTRA[symbol - 257]);
        const d = distanceSymbol();
        distanceCounts[d]++;
        const distance = DISTANCE_BASES[d] + number(d < 4 ? 0 : (d - 2) >> 1);
        if (distance > bytes.length) throw new Error('a match begins before the stream');
        for (let i = 0; i < length; i++) bytes.push(bytes[bytes.length - distance]);
      }
    }
    const counts = { literalCounts, distanceCounts, bits: at - began, bytes: bytes.length - before };
    blocks.push({ type, literalLengths, distanceLengths, ...counts });
  }
  at = (at + 7) & ~7;
  if (at / 8 !== stream.length - 4) throw new Error('something stands behind the last block');
  let a = 1;
  let b = 0;
  for (const byte of bytes) {
    a = (a + byte) % 65521;
    b = (b + a) % 65521;
  }
  const checksum = new DataView(stream.buffer, stream.byteOffset).getUint32(stream.length - 4);
  if (checksum !== b * 65536 + a) throw new Error('the checksum is wrong');
  return { bytes: Uint8Array.from(bytes), blocks };
}

/**
 * Bits of the shortest prefix code for some counts with no code longer than `limit`.
 * Source: Larmore and Hirschberg 1990, "A fast algorithm for optimal length-limited Huffman codes" (package-merge), from
 * memory: the n - 1 cheapest packages of the last round, n symbols and `limit` rounds.
 */
export function shortestCodedBits(counts: readonly number[], limit: number): number {
  const leaves = counts.filter((count) => count > 0).sort((a, b) => a - b);
  if (leaves.length < 2) return leaves[0] ?? 0;
  let round = leaves;
  for (let i = 1; i < limit; i++) {
    const packages: number[] = [];
    for (let p = 0; p + 1 < round.length; p += 2) packages.push(round[p] + round[p + 1]);
    round = [...leaves, ...packages].sort((a, b) => a - b);
  }
  return round.slice(0, 2 * leaves.length - 2).reduce((sum, weight) => sum + weight, 0);
}
