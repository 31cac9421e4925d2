import { describe, expect, it } from 'vitest';
import { type Counter, type Key, key32, philox4x32 } from '../../src/math/random.ts';

const F = 0xffffffff;

// Salmon et al. 2011, known-answer vectors of the paper's reference distribution, philox4x32 with 10 rounds (from
// memory; wrong vectors could not agree with a right implementation, nor the other way round). The last row's counter
// and key are the digits of pi.
const VECTORS: [Counter, Key, string][] = [
  [[0, 0, 0, 0], [0, 0], '6627e8d5 e169c58d bc57ac4c 9b00dbd8'],
  [[F, F, F, F], [F, F], '408f276d 41c83b0e a20bc7c6 6d5451fd'],
  [
    [0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344],
    [0xa4093822, 0x299f31d0],
    'd16cfe09 94fdcceb 5001e420 24126ea1',
  ],
];

describe('philox4x32', () => {
  it.each(VECTORS)('counter %j, key %j', (counter, key, expected) => {
    const out = new Uint32Array(4);
    philox4x32(counter, key, out);
    expect([...out].map((word) => word.toString(16).padStart(8, '0')).join(' ')).toBe(expected);
  });

  it('takes words modulo 2^32', () => {
    const [unsigned, signed] = [new Uint32Array(4), new Uint32Array(4)];
    philox4x32([F, F, 0, 5], [F, 0], unsigned);
    philox4x32([-1, -1, 2 ** 32, 5], [-1, 0], signed);
    expect(signed).toEqual(unsigned);
  });
});

describe('key32', () => {
  // FNV-1a, 32 bits, test vectors of the algorithm's authors (from memory).
  it.each([
    ['', 0x811c9dc5],
    ['a', 0xe40c292c],
    ['foobar', 0xbf9cf968],
  ])('hash of %j', (text, expected) => {
    expect(key32(text)).toBe(expected);
  });
});
