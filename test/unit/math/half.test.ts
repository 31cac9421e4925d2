import { describe, expect, it } from 'vitest';
import { fillFromHalf, fillHalf, halfFromNumber, halfStep, numberFromHalf } from '../../../src/math/half.ts';

/** The next float64 away from zero (+1) or towards it (-1), for finite non-zero values. */
function neighbour(value: number, direction: 1 | -1): number {
  const number = new Float64Array([value]);
  const bits = new BigUint64Array(number.buffer);
  bits[0] += BigInt(direction);
  return number[0];
}

const QUIET_NAN = 0x7e00;
const LARGEST = 0x7bff;

describe('published values of binary16', () => {
  // Source: IEEE 754-2019, Table 3.5 (p = 11, emax = 15) and the values that follow from it. Status: from memory.
  it.each([
    [0x0000, 0],
    [0x0001, 2 ** -24],
    [0x03ff, 2 ** -14 - 2 ** -24],
    [0x0400, 2 ** -14],
    [0x3555, 0.333251953125],
    [0x3bff, 1 - 2 ** -11],
    [0x3c00, 1],
    [0x3c01, 1 + 2 ** -10],
    [0xc000, -2],
    [0x7bff, 65504],
    [0x7c00, Infinity],
    [0xfc00, -Infinity],
  ])('%i stands for %d', (bits, value) => {
    expect(numberFromHalf(bits)).toBe(value);
    expect(halfFromNumber(value)).toBe(bits);
  });

  it('keeps the sign of zero and makes every NaN quiet', () => {
    expect(halfFromNumber(-0)).toBe(0x8000);
    expect(numberFromHalf(0x8000)).toBe(-0);
    expect(halfFromNumber(NaN)).toBe(QUIET_NAN);
    for (let bits = 0x7c01; bits < 0x8000; bits++) expect(numberFromHalf(bits)).toBeNaN();
  });
});

describe('rounding', () => {
  it('gives back each of the 65536 halves', () => {
    let wrong = 0;
    for (let bits = 0; bits < 0x10000; bits++) {
      const value = numberFromHalf(bits);
      const back = halfFromNumber(value);
      if (Number.isNaN(value) ? (back & 0x7fff) !== QUIET_NAN : back !== bits) wrong++;
    }
    expect(wrong).toBe(0);
  });

  it('sends every midpoint to the even neighbour, and a float64 beside it to the nearer one', () => {
    let wrong = 0;
    for (const sign of [1, -1]) {
      const signBit = sign === 1 ? 0 : 0x8000;
      for (let low = 0; low <= LARGEST; low++) {
        // Past the largest half the scale goes on with 65536, which only infinity stands for.
        const next = low === LARGEST ? 65536 : numberFromHalf(low + 1);
        const midpoint = sign * ((numberFromHalf(low) + next) / 2);
        if (halfFromNumber(midpoint) !== (signBit | (low + (low & 1)))) wrong++;
        if (halfFromNumber(neighbour(midpoint, -1)) !== (signBit | low)) wrong++;
        if (halfFromNumber(neighbour(midpoint, 1)) !== (signBit | (low + 1))) wrong++;
      }
    }
    expect(wrong).toBe(0);
  });

  it('does not round twice', () => {
    const justAboveMidpoint = 1 + 2 ** -11 + 2 ** -30;
    expect(halfFromNumber(justAboveMidpoint)).toBe(0x3c01);
    expect(halfFromNumber(Math.fround(justAboveMidpoint))).toBe(0x3c00);
  });

  it('sends the smallest and largest float64 to zero and infinity', () => {
    expect(halfFromNumber(Number.MIN_VALUE)).toBe(0);
    expect(halfFromNumber(-Number.MIN_VALUE)).toBe(0x8000);
    expect(halfFromNumber(Number.MAX_VALUE)).toBe(0x7c00);
    expect(halfFromNumber(-65520)).toBe(0xfc00);
    expect(halfFromNumber(65519.99)).toBe(LARGEST);
  });
});

describe('fillHalf and fillFromHalf', () => {
  const values = Float64Array.from({ length: 4001 }, (_, i) => Math.sinh((i - 2000) / 100) * 2 ** -12);
  values.set([0, -0, NaN, Infinity, -Infinity, 1 + 2 ** -11 + 2 ** -30, 5e-324, 65520], 7);

  it('round float64 and float32 like halfFromNumber, also from a view that starts inside a buffer', () => {
    const view = values.subarray(3);
    const fromDoubles = new Uint16Array(view.length);
    fillHalf(fromDoubles, view);
    expect(fromDoubles).toEqual(Uint16Array.from(view, halfFromNumber));
    const singles = Float32Array.from(values).subarray(1);
    const fromSingles = new Uint16Array(singles.length);
    fillHalf(fromSingles, singles);
    expect(fromSingles).toEqual(Uint16Array.from(singles, halfFromNumber));
  });

  it('write only as many as there are values', () => {
    const out = new Uint16Array(4).fill(7);
    fillHalf(out, Float64Array.of(1, 2));
    expect([...out]).toEqual([0x3c00, 0x4000, 7, 7]);
    const back = new Float64Array(3).fill(9);
    fillFromHalf(back, Uint16Array.of(0x3c00, 0xc000));
    expect([...back]).toEqual([1, -2, 9]);
  });
});

describe('halfStep', () => {
  it('is the distance to the next half, for every finite half below the largest', () => {
    let wrong = 0;
    for (let bits = 0; bits < LARGEST; bits++) {
      const value = numberFromHalf(bits);
      const step = numberFromHalf(bits + 1) - value;
      if (halfStep(value) !== step || halfStep(-value) !== step) wrong++;
      if (halfStep(value + 0.9 * step) !== step) wrong++;
    }
    expect(wrong).toBe(0);
  });

  it('has no step where halves have none', () => {
    expect(halfStep(65504)).toBe(32);
    expect(halfStep(65536)).toBe(Infinity);
    expect(halfStep(-Infinity)).toBe(Infinity);
    expect(halfStep(NaN)).toBeNaN();
  });
});
