import { describe, expect, it } from 'vitest';
import { InternalError } from '../../../src/errors.ts';
import type { ChannelSpec, Decode, Quantity, SampleType, Unit } from '../../../src/image/image.ts';
import { ditherPattern, encodedMap, type MapStorage } from '../../../src/maps/encoded-map.ts';
import { halfFromNumber } from '../../../src/math/half.ts';
import { decodedPlane } from '../../support/decoded.ts';
import { scattered } from '../../support/image-scenes.ts';

const N = 8;

function channel(decode: Decode, unit: Unit = 'm'): ChannelSpec {
  return { name: 'Y', quantity: 'height', unit, decode };
}

function stored(
  values: ArrayLike<number>,
  sample: SampleType,
  decode: Decode,
  options: Partial<MapStorage> & { readonly unit?: Unit } = {},
) {
  const { unit, ...rest } = options;
  const resolution = Math.sqrt(values.length);
  const channels = [channel(decode, unit)];
  const storage: MapStorage = { resolution, sample, channels, rowZero: 'south', dither: null, ...rest };
  return encodedMap(new Map<Quantity, Float64Array>([['height', Float64Array.from(values)]]), storage);
}

/** Steps of a hundredth with an exact zero, as plans have them. */
const UINT8: Decode = { scale: 2.55, offset: -1.28 };
const UINT16: Decode = { scale: 655.35, offset: -327.68 };
const AS_IT_IS: Decode = { scale: 1, offset: 0 };

const ramp = Float64Array.from({ length: N * N }, (_, i) => 0.01 * ((i % N) - 10 * Math.floor(i / N)));
const noise = Float64Array.from({ length: N * N }, (_, i) => scattered(i) - 0.5);

describe('codes', () => {
  it('zero is the middle code, exactly; steps count from there', () => {
    expect(stored([0], 'uint8', UINT8).image.planes[0][0]).toBe(128);
    expect(stored([0], 'uint16', UINT16).image.planes[0][0]).toBe(32768);
    expect(stored([0.13], 'uint8', UINT8).image.planes[0][0]).toBe(141);
    expect(stored([-1.234], 'uint16', UINT16).image.planes[0][0]).toBe(32768 - 123);
    expect(decodedPlane(stored([0], 'uint16', UINT16).image, 0)[0]).toBeCloseTo(0, 12);
  });

  it('a negative scale stores the negative of the quantity', () => {
    const negative = { scale: -2.55, offset: 1.28 };
    const { image } = stored([0.3], 'uint8', negative);
    expect(image.planes[0][0]).toBe(128 - 30);
    expect(decodedPlane(image, 0)[0]).toBeCloseTo(0.3, 14);
    expect(stored([0.3], 'float', { scale: -1, offset: 0 }).image.planes[0][0]).toBe(Math.fround(-0.3));
  });

  it('values beyond the range are clamped and counted', () => {
    const { image, statistics } = stored([1.28, -1.29, 1.27, -1.28], 'uint8', UINT8);
    expect([...image.planes[0]]).toEqual([255, 0, 255, 0]);
    expect(statistics[0].clipped).toBe(2);
    expect([statistics[0].min, statistics[0].max]).toEqual([-1.28, 1.27].map((v) => expect.closeTo(v, 12)));
    expect(stored([1.276, 0, 0, 0], 'uint8', UINT8).statistics[0].clipped).toBe(1);
    expect(stored([1.274, 0, 0, 0], 'uint8', UINT8).statistics[0].clipped).toBe(0);
  });

  it('centimetres are a hundred to the metre', () => {
    const { image, statistics } = stored([0.25], 'float', AS_IT_IS, { unit: 'cm' });
    expect(image.planes[0][0]).toBe(25);
    expect(statistics[0].sum).toBe(25);
    const centimetres = { scale: 255, offset: -128 };
    expect(stored([0.25], 'uint8', centimetres, { unit: 'cm' }).image.planes[0][0]).toBe(128 + 25);
  });

  it('floats and halves are rounded to nearest, once', () => {
    expect(stored(noise, 'float', AS_IT_IS).image.planes[0]).toEqual(Float32Array.from(noise));
    expect(stored(noise, 'half', AS_IT_IS).image.planes[0]).toEqual(Uint16Array.from(noise, halfFromNumber));
    // Through a float this would be a tie, and go down.
    expect(stored([1 + 2 ** -11 + 2 ** -30], 'half', AS_IT_IS).image.planes[0][0]).toBe(0x3c01);
  });
});

describe('rows', () => {
  it('begin in the south or in the north, as asked; columns run east', () => {
    const south = decodedPlane(stored(ramp, 'uint16', UINT16).image, 0);
    const north = decodedPlane(stored(ramp, 'uint16', UINT16, { rowZero: 'north' }).image, 0);
    for (let row = 0; row < N; row++) {
      for (let column = 0; column < N; column++) {
        expect(south[row * N + column]).toBeCloseTo(0.01 * (column - 10 * row), 10);
        expect(north[row * N + column]).toBeCloseTo(0.01 * (column - 10 * (N - 1 - row)), 10);
      }
    }
  });
});

describe('statistics', () => {
  it.each<[SampleType, Decode]>([
    ['uint8', UINT8],
    ['uint16', UINT16],
    ['half', { scale: -1, offset: 0 }],
    ['float', AS_IT_IS],
  ])('%s: are of what a reader decodes', (sample, decode) => {
    const dither = sample === 'uint8' ? [ditherPattern(N, 'Y')] : null;
    const { image, statistics } = stored(noise, sample, decode, { rowZero: 'north', dither });
    const values = decodedPlane(image, 0);
    const [{ sum, sumOfSquares, min, max }] = statistics;
    expect(sum).toBeCloseTo(
      values.reduce((a, b) => a + b, 0),
      12,
    );
    expect(sumOfSquares).toBeCloseTo(
      values.reduce((a, b) => a + b * b, 0),
      12,
    );
    expect([min, max]).toEqual([Math.min(...values), Math.max(...values)].map((v) => expect.closeTo(v, 14)));
  });
});

describe('dither', () => {
  const size = 128;
  const between = new Float64Array(size * size).fill(0.3074);

  it('is the same in every frame and run, and another in every channel', () => {
    expect(ditherPattern(32, 'R')).toEqual(ditherPattern(32, 'R'));
    expect(ditherPattern(32, 'R')).not.toEqual(ditherPattern(32, 'G'));
  });

  it('is uniform within half a code', () => {
    const pattern = ditherPattern(size, 'R');
    const n = pattern.length;
    expect(pattern.every((offset) => offset >= -0.5 && offset <= 0.5)).toBe(true);
    // Five standard deviations of the mean and of the mean square of as many uniform numbers.
    expect(Math.abs(pattern.reduce((a, b) => a + b, 0) / n)).toBeLessThan(5 / Math.sqrt(12 * n));
    expect(Math.abs(pattern.reduce((a, b) => a + b * b, 0) / n - 1 / 12)).toBeLessThan(
      5 / Math.sqrt(180 * n),
    );
  });

  it('leaves the mean where it is, which plain rounding moves', () => {
    const mean = (dither: Float32Array[] | null): number =>
      stored(between, 'uint8', UINT8, { dither }).statistics[0].sum / between.length;
    expect(mean(null)).toBeCloseTo(0.31, 12);
    // Codes 30 and 31 in the ratio 26 to 74: five standard deviations of the mean of so many.
    const bound = 5 * 0.01 * Math.sqrt((0.26 * 0.74) / between.length);
    expect(Math.abs(mean([ditherPattern(size, 'Y')]) - 0.3074)).toBeLessThan(bound);
    expect(bound).toBeLessThan(0.0026 / 2);
  });

  it('clips nothing that plain rounding would not', () => {
    const edge = new Float64Array(size * size).fill(1.27);
    expect(stored(edge, 'uint8', UINT8, { dither: [ditherPattern(size, 'Y')] }).statistics[0].clipped).toBe(
      0,
    );
  });
});

describe('what cannot be stored is refused', () => {
  const withOne = (value: number): Float64Array => noise.map((other, i) => (i === 3 * N + 5 ? value : other));

  it.each<[string, number, SampleType, Decode]>([
    ['not a number in codes', Number.NaN, 'uint16', UINT16],
    ['infinite in codes', Number.POSITIVE_INFINITY, 'uint8', UINT8],
    ['not a number in halves', Number.NaN, 'half', AS_IT_IS],
    ['infinite in floats', Number.NEGATIVE_INFINITY, 'float', AS_IT_IS],
  ])('%s, naming the texel', (_, value, sample, decode) => {
    expect(() => stored(withOne(value), sample, decode)).toThrow(InternalError);
    expect(() => stored(withOne(value), sample, decode)).toThrow(/height .* texel 5 east, 3 north/);
  });

  it('too large for a half, and said to be', () => {
    expect(() => stored(withOne(70_000), 'half', AS_IT_IS)).toThrow(/exceeds/);
  });

  it('a quantity that was not made', () => {
    const channels = [{ ...channel(AS_IT_IS), quantity: 'foam' as const }];
    expect(() => stored(noise, 'float', AS_IT_IS, { channels })).toThrow(/no values for foam/);
  });
});
