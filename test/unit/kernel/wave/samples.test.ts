import { expect, it } from 'vitest';
import { readStatistics, startStatistics } from '../../../../src/field/float32-statistics.ts';
import { STATISTICS } from '../../../../src/kernel/wave/layout.ts';
import { waveKernel } from '../../../../src/kernel/wave/wave-kernel.ts';
import { halfFromNumber, numberFromHalf } from '../../../../src/math/half.ts';
import { describeKernel } from '../../../support/kernels.ts';
import { noise } from '../../../support/random-waves.ts';

/** A kernel with room for values, samples and statistics. */
function sampleBench(capacity: number) {
  const kernel = waveKernel();
  const values = kernel.keep(4 * capacity);
  const samples = kernel.keep(4 * capacity);
  const packed = kernel.keep(6 * capacity);
  const offsets = kernel.keep(4 * capacity);
  const statistics = kernel.keep(STATISTICS.statisticsBytes);
  const { program, buffer } = kernel;
  const fill = (numbers: ArrayLike<number>) => new Float32Array(buffer, values, numbers.length).set(numbers);
  return {
    program,
    samples,
    packed,
    halves(numbers: ArrayLike<number>, gain = 1, shift = 0) {
      fill(numbers);
      startStatistics(buffer, statistics, false);
      program.storeHalves(samples, values, numbers.length, gain, shift, statistics);
      return {
        out: new Uint16Array(buffer, samples, numbers.length),
        found: readStatistics(buffer, statistics, null),
      };
    },
    floats(numbers: ArrayLike<number>, gain = 1, shift = 0) {
      fill(numbers);
      startStatistics(buffer, statistics, false);
      program.storeFloats(samples, values, numbers.length, gain, shift, statistics);
      return {
        out: new Float32Array(buffer, samples, numbers.length),
        found: readStatistics(buffer, statistics, null),
      };
    },
    codes(numbers: ArrayLike<number>, largest: 255 | 65535, gain = 1, shift: number | Float32Array = 0) {
      fill(numbers);
      startStatistics(buffer, statistics, true);
      const step = typeof shift === 'number' ? 0 : 16;
      if (typeof shift === 'number') new Float32Array(buffer, offsets, 4).fill(shift);
      else new Float32Array(buffer, offsets, shift.length).set(shift);
      program.storeCodes(samples, values, numbers.length, gain, offsets, step, largest, statistics);
      return {
        out: new Uint16Array(buffer, samples, numbers.length),
        found: readStatistics(buffer, statistics, (largest + 1) / 2),
      };
    },
    bytes: (address: number, count: number) => new Uint8Array(buffer, address, count),
  };
}

/** Float32 numbers as bits. */
function floatOfBits(bits: number): number {
  return new Float32Array(Uint32Array.of(bits).buffer)[0];
}
function bitsOfFloat(value: number): number {
  return new Uint32Array(Float32Array.of(value).buffer)[0];
}

describeKernel('wave', 'samples', () => {
  it('are the nearest halves for every half, every midpoint and their float32 neighbours', () => {
    const numbers: number[] = [];
    for (let half = 0; half < 0x7c00; half++) {
      const exact = bitsOfFloat(numberFromHalf(half));
      const midpoint = bitsOfFloat((numberFromHalf(half) + numberFromHalf(Math.min(half + 1, 0x7bff))) / 2);
      for (const bits of [exact, midpoint]) {
        for (const near of [Math.max(0, bits - 1), bits, bits + 1]) numbers.push(floatOfBits(near));
      }
    }
    // 65504 + 16 is where halves overflow.
    const finite = numbers.filter((value) => value < 65520);
    while (finite.length % 4 !== 0) finite.push(0);
    const both = [...finite, ...finite.map((value) => -value)];
    // A shift of -0 leaves even -0 as it is.
    const { out, found } = sampleBench(both.length).halves(both, 1, -0);
    expect(both.findIndex((value, i) => out[i] !== halfFromNumber(value))).toBe(-1);
    expect(found.finite).toBe(true);
    expect([found.min, found.max]).toEqual([-65504, 65504]);
  });

  it('as halves know the sums of what they stored', () => {
    const next = noise(3);
    const numbers = Float32Array.from({ length: 4096 }, () => next() * 2 ** (40 * next() - 10));
    const { out, found } = sampleBench(4096).halves(numbers, -1, 0.25);
    const stored = [...out].map(numberFromHalf);
    expect([...out]).toEqual([...numbers].map((value) => halfFromNumber(Math.fround(0.25 - value))));
    const sum = stored.reduce((total, value) => total + value, 0);
    const squares = stored.reduce((total, value) => total + value * value, 0);
    // Two orders of adding 4096 float64 numbers.
    expect(Math.abs(found.sum - sum)).toBeLessThan(1e-12 * stored.reduce((t, v) => t + Math.abs(v), 0));
    expect(Math.abs(found.sumOfSquares / squares - 1)).toBeLessThan(1e-12);
    expect([found.min, found.max]).toEqual([Math.min(...stored), Math.max(...stored)]);
  });

  it.each([
    [65520, false],
    [-65520, false],
    [floatOfBits(bitsOfFloat(65520) - 1), true],
    [Infinity, false],
    [-Infinity, false],
    [Number.NaN, false],
  ])('as halves know whether %d has one', (value, finite) => {
    for (let at = 0; at < 8; at++) {
      const numbers = new Float32Array(8);
      numbers[at] = value;
      expect(sampleBench(8).halves(numbers).found.finite).toBe(finite);
    }
  });

  it('as floats are the values, with their sums', () => {
    const next = noise(5);
    const numbers = Float32Array.from({ length: 1024 }, () => 100 * next());
    const { out, found } = sampleBench(1024).floats(numbers, 4, 1);
    const expected = numbers.map((value) => Math.fround(Math.fround(value * 4) + 1));
    expect(out).toEqual(expected);
    expect(found.sum).toBeCloseTo(
      expected.reduce((total, value) => total + value, 0),
      8,
    );
    expect(found.max).toBe(Math.max(...expected));
    for (const value of [Number.NaN, Infinity, -Infinity]) {
      numbers[777] = value;
      expect(sampleBench(1024).floats(numbers).found.finite).toBe(false);
    }
  });

  it.each([255, 65535] as const)('as codes up to %i are rounded, clamped and counted', (largest) => {
    const next = noise(7);
    const numbers = Float32Array.from({ length: 8192 }, () => 1.5 * largest * next());
    numbers.set([-0.5, -0.25, 0.5, 1.5, 2.5, largest, largest + 0.25, largest + 0.75, -0.75, 1e30, -1e30]);
    const shift = (largest + 1) / 2;
    const { out, found } = sampleBench(8192).codes(numbers, largest, 1, shift);
    const rounded = [...numbers].map((value) => Math.fround(value + shift)).map(roundTiesToEven);
    const expected = rounded.map((code) => Math.min(largest, Math.max(0, code)));
    expect([...out]).toEqual(expected);
    expect(found.clipped).toBe(rounded.filter((code) => code < 0 || code > largest).length);
    expect(found.centre).toBe(shift);
    expect(found.sum).toBe(expected.reduce((total, code) => total + code - shift, 0));
    expect(found.sumOfSquares).toBe(expected.reduce((total, code) => total + (code - shift) ** 2, 0));
    expect([found.min, found.max]).toEqual([Math.min(...expected), Math.max(...expected)]);
    expect(found.finite).toBe(true);
  });

  it('as codes may have all the extremes without overflow', () => {
    const { out, found } = sampleBench(65536).codes(new Float32Array(65536).fill(-9), 65535);
    expect(out.every((code) => code === 0)).toBe(true);
    expect(found).toMatchObject({
      sum: -32768 * 65536,
      sumOfSquares: 2 ** 30 * 65536,
      clipped: 65536,
      max: 0,
    });
  });

  it('as codes take an offset of their own each', () => {
    const next = noise(9);
    const numbers = Float32Array.from({ length: 64 }, () => 100 * next());
    const offsets = Float32Array.from({ length: 64 }, () => 128 + next());
    const { out } = sampleBench(64).codes(numbers, 255, 1, offsets);
    expect([...out]).toEqual(
      [...numbers].map((value, i) => roundTiesToEven(Math.fround(value + offsets[i]))),
    );
  });

  it.each([Number.NaN, Infinity, -Infinity])('as codes report %d wherever it stands', (value) => {
    for (let at = 0; at < 16; at++) {
      const numbers = new Float32Array(16);
      numbers[at] = value;
      expect(sampleBench(16).codes(numbers, 65535, 3, 5).found.finite).toBe(false);
    }
  });

  it('are packed as a PNG wants them', () => {
    const count = 32;
    const bench = sampleBench(3 * count);
    const apart = 2 * count;
    const { out: codes } = bench.codes(
      Float32Array.from({ length: 3 * count }, (_, i) => (i * 7919) % 65536),
      65535,
    );
    const at = (c: number, i: number) => codes[c * count + i];
    const highFirst = (code: number) => [code >> 8, code & 255];
    const texels = Array.from({ length: count }, (_, i) => [at(0, i), at(1, i), at(2, i)]);

    bench.program.pack16(bench.packed, bench.samples, count);
    expect([...bench.bytes(bench.packed, 2 * count)]).toEqual(texels.flatMap(([r]) => highFirst(r)));
    bench.program.packThree16(bench.packed, bench.samples, apart, count);
    expect([...bench.bytes(bench.packed, 6 * count)]).toEqual(texels.flat().flatMap(highFirst));

    const { out: small } = bench.codes(
      Float32Array.from({ length: 3 * count }, (_, i) => (i * 97) % 256),
      255,
    );
    const smallTexels = Array.from({ length: count }, (_, i) => [0, 1, 2].map((c) => small[c * count + i]));
    bench.program.pack8(bench.packed, bench.samples, count);
    expect([...bench.bytes(bench.packed, count)]).toEqual(smallTexels.map(([r]) => r));
    bench.program.packThree8(bench.packed, bench.samples, apart, count);
    expect([...bench.bytes(bench.packed, 3 * count)]).toEqual(smallTexels.flat());
  });
});

function roundTiesToEven(value: number): number {
  const floor = Math.floor(value);
  const rest = value - floor;
  if (rest !== 0.5) return Math.round(value);
  return floor % 2 === 0 ? floor : floor + 1;
}
