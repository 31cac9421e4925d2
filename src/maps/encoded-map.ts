import { InternalError } from '../errors.ts';
import {
  type ChannelSpec,
  type Image,
  LARGEST_CODE,
  type Plane,
  type Quantity,
  type SampleType,
  type Unit,
} from '../image/image.ts';
import { halfFromNumber, numberFromHalf } from '../math/half.ts';
import { key32, uniform } from '../math/random.ts';

/** What was written into one channel of one frame, in the channel's unit: the numbers a reader recovers. */
export interface ChannelStatistics {
  readonly sum: number;
  readonly sumOfSquares: number;
  readonly min: number;
  readonly max: number;
  /** Texels beyond the range of an integer map. */
  readonly clipped: number;
}

export interface EncodedMap {
  readonly image: Image;
  /** In the order of the image's channels. */
  readonly statistics: readonly ChannelStatistics[];
}

/** How a map is stored. */
export interface MapStorage {
  readonly resolution: number;
  readonly sample: SampleType;
  readonly channels: readonly ChannelSpec[];
  readonly rowZero: 'north' | 'south';
  /** Offsets of -1/2 .. 1/2 code by texel, or null for plain rounding; see `ditherPattern`. */
  readonly dither: readonly Float32Array[] | null;
}

/** Channel units per SI unit. */
export const UNITS_PER_SI: Readonly<Record<Unit, number>> = { m: 1, cm: 100, 'm/s': 1, 'cm/s': 100, '1': 1 };

/**
 * Stores a map's values: rows put in file order, units applied, samples rounded to nearest (floats in the middle to
 * even, codes up), codes beyond the range clamped and counted.
 *
 * @param values SI values by quantity: Float64Array N*N, row 0 south
 * @param storage how to store them
 * @throws InternalError where a value is not finite, naming the texel
 */
export function encodedMap(values: ReadonlyMap<Quantity, Float64Array>, storage: MapStorage): EncodedMap {
  const { resolution: N, sample, channels } = storage;
  const planes: Plane[] = [];
  const statistics: ChannelStatistics[] = [];
  channels.forEach((channel, c) => {
    const source = values.get(channel.quantity);
    if (source === undefined) throw new InternalError(`no values for ${channel.quantity}`);
    const plane = emptyPlane(sample, N * N);
    statistics.push(fillPlane(plane, source, channel, storage, storage.dither?.[c] ?? null));
    planes.push(plane);
  });
  return { image: { width: N, height: N, sample, channels, planes }, statistics };
}

/**
 * Dither offsets of one channel, uniform in -1/2 .. 1/2 code and fixed in place: the same in every frame, so that the
 * grain does not boil, and in every run. Float32Array N*N in file order.
 */
export function ditherPattern(resolution: number, channelName: string): Float32Array {
  const pattern = new Float32Array(resolution * resolution);
  const key: [number, number] = [key32('dither'), key32(channelName)];
  for (let i = 0; i < pattern.length; i++) pattern[i] = uniform([i, 0, 0, 0], key) - 0.5;
  return pattern;
}

function emptyPlane(sample: SampleType, length: number): Plane {
  if (sample === 'uint8') return new Uint8Array(length);
  return sample === 'float' ? new Float32Array(length) : new Uint16Array(length);
}

function fillPlane(
  plane: Plane,
  source: Float64Array,
  channel: ChannelSpec,
  storage: MapStorage,
  dither: Float32Array | null,
): ChannelStatistics {
  const { resolution: N, sample } = storage;
  const { scale, offset } = channel.decode;
  const unit = UNITS_PER_SI[channel.unit];
  const largest = sample === 'uint8' || sample === 'uint16' ? LARGEST_CODE[sample] : 0;
  // stored = value * gain + shift, in codes for integers.
  const gain = (unit / scale) * (largest || 1);
  const shift = (-offset / scale) * (largest || 1);
  const step = scale / (largest || 1);
  let sum = 0;
  let sumOfSquares = 0;
  let min = Infinity;
  let max = -Infinity;
  let clipped = 0;
  for (let row = 0, o = 0; row < N; row++) {
    const iy = storage.rowZero === 'north' ? N - 1 - row : row;
    for (let i = iy * N; i < iy * N + N; i++, o++) {
      let stored = source[i] * gain + shift;
      if (sample === 'half') {
        const bits = halfFromNumber(stored);
        plane[o] = bits;
        stored = numberFromHalf(bits);
      } else if (sample === 'float') {
        plane[o] = stored;
        stored = plane[o];
      } else {
        let code = Math.round(dither === null ? stored : stored + dither[o]);
        if (code < 0 || code > largest) {
          if (!Number.isFinite(code)) throw notFinite(source, channel, N);
          clipped++;
          code = code < 0 ? 0 : largest;
        }
        plane[o] = code;
        stored = code;
      }
      const value = stored * step + offset;
      sum += value;
      sumOfSquares += value * value;
      if (value < min) min = value;
      if (value > max) max = value;
    }
  }
  if (!Number.isFinite(sumOfSquares)) throw notFinite(source, channel, N);
  return { sum, sumOfSquares, min, max, clipped };
}

function notFinite(source: Float64Array, channel: ChannelSpec, N: number): InternalError {
  const i = source.findIndex((value) => !Number.isFinite(value));
  if (i < 0) return new InternalError(`${channel.quantity} exceeds what the file's samples can hold`);
  return new InternalError(
    `${channel.quantity} is not a number at texel ${i % N} east, ${Math.floor(i / N)} north of the south-west corner`,
  );
}
