import { InternalError } from '../errors.ts';
import type { Float32Synthesis } from '../field/float32-engine.ts';
import type {
  SampledChannel,
  SampledValue,
  SampleStatistics,
  SamplesRequest,
  SamplesTarget,
} from '../field/float32-requests.ts';
import { blankPlane, type ChannelSpec, LARGEST_CODE, type Quantity } from '../image/image.ts';
import type { JacobianCodes } from '../plan/plan.ts';
import { type ChannelStatistics, type EncodedMap, type MapStorage, UNITS_PER_SI } from './encoded-map.ts';

/*
 * The float32 counterpart of encoded-map.ts: maps made by the kernel straight from its fields. Codes differ from those
 * of the float64 engine by at most one; halves and floats by the rounding of the fields.
 */

const SAMPLED_VALUES: Readonly<Partial<Record<Quantity, SampledValue>>> = {
  'displacement-east': 'displacementEast',
  'displacement-north': 'displacementNorth',
  'displacement-up': 'height',
  height: 'height',
  'velocity-east': 'velocityEast',
  'velocity-north': 'velocityNorth',
  'velocity-up': 'velocityUp',
  'slope-east': 'slopeEast',
  'slope-north': 'slopeNorth',
  'strain-east-east': 'strainEastEast',
  'strain-north-north': 'strainNorthNorth',
  'strain-east-north': 'strainEastNorth',
  'normal-east': 'normalEast',
  'normal-north': 'normalNorth',
  'normal-up': 'normalUp',
  jacobian: 'jacobian',
};

/**
 * Maps of the frame that a synthesis was turned to, as planar images, made in one pass.
 *
 * @param storages how each map is stored
 * @param also further samples to make in the same pass, e.g. `jacobianCodesRequest`
 * @throws InternalError where a value is not finite or too large for its samples, naming the texel
 */
export function sampledMaps(
  synthesis: Float32Synthesis,
  storages: readonly MapStorage[],
  also: readonly SamplesRequest[] = [],
): readonly EncodedMap[] {
  const planes = storages.map(({ resolution: N, sample, channels }) =>
    channels.map(() => blankPlane(sample, N * N)),
  );
  const requests = storages.map((storage, m) => samplesRequest(storage, { planes: planes[m] }));
  const statistics = synthesis.samples([...requests, ...also]);
  return storages.map((storage, m) => {
    const { resolution: N, sample, channels } = storage;
    const image = { width: N, height: N, sample, channels, planes: planes[m] };
    return { image, statistics: channelStatistics(synthesis, storage, statistics[m]) };
  });
}

/**
 * Largest magnitude of quantities over the tile of the current frame, SI; of J - 1 for `jacobian`.
 *
 * @throws InternalError where a value is not finite
 */
export function largestMagnitudes(
  synthesis: Float32Synthesis,
  quantities: readonly Quantity[],
): readonly number[] {
  const largest = synthesis.largest(quantities.map((quantity) => SAMPLED_VALUES[quantity] as SampledValue));
  const bad = largest.findIndex((value) => !Number.isFinite(value));
  if (bad >= 0) throw new InternalError(`${quantities[bad]} is not a number somewhere on the tile`);
  return largest;
}

/**
 * J as 16-bit codes for foam: code = (J - zeroJ) / stepJ, clamped.
 *
 * @param out Uint16Array N*N, filled in field order
 */
export function jacobianCodesRequest(out: Uint16Array, { zeroJ, stepJ }: JacobianCodes): SamplesRequest {
  const channel = { value: 'jacobian', gain: 1 / stepJ, shift: -zeroJ / stepJ, dither: null } as const;
  return { sample: 'uint16', channels: [channel], rowZero: 'south', target: { planes: [out] } };
}

/** What the kernel has to do for a map. */
export function samplesRequest(storage: MapStorage, target: SamplesTarget): SamplesRequest {
  const { sample, channels, rowZero, dither } = storage;
  return {
    sample,
    rowZero,
    target,
    channels: channels.map((channel, c): SampledChannel => {
      const value = SAMPLED_VALUES[channel.quantity];
      if (value === undefined) throw new InternalError(`no values for ${channel.quantity}`);
      const { scale, offset } = channel.decode;
      const largest = largestStored(storage);
      const gain = (UNITS_PER_SI[channel.unit] / scale) * largest;
      return { value, gain, shift: (-offset / scale) * largest, dither: dither?.[c] ?? null };
    }),
  };
}

/**
 * Statistics of what was stored, in each channel's unit.
 *
 *     value = stored * step + offset
 *
 * @throws InternalError where a value is not finite or too large for its samples, naming the texel
 */
export function channelStatistics(
  synthesis: Float32Synthesis,
  storage: MapStorage,
  statistics: readonly SampleStatistics[],
): readonly ChannelStatistics[] {
  const count = storage.resolution ** 2;
  return storage.channels.map((channel, c) => {
    const { centre, sum, sumOfSquares, min, max, clipped, finite } = statistics[c];
    if (!finite) throw notFinite(synthesis, storage, channel);
    const { scale, offset } = channel.decode;
    const step = scale / largestStored(storage);
    const middle = centre * step + offset;
    const ends = [min * step + offset, max * step + offset];
    return {
      sum: sum * step + count * middle,
      sumOfSquares: sumOfSquares * step * step + 2 * middle * step * sum + count * middle * middle,
      min: Math.min(...ends),
      max: Math.max(...ends),
      clipped,
    };
  });
}

/** What the decode rule calls 1: the largest code, or 1 in a file of floats. */
function largestStored({ sample }: MapStorage): number {
  return sample === 'uint8' || sample === 'uint16' ? LARGEST_CODE[sample] : 1;
}

function notFinite(synthesis: Float32Synthesis, storage: MapStorage, channel: ChannelSpec): InternalError {
  const N = storage.resolution;
  const values = synthesis.values(SAMPLED_VALUES[channel.quantity] as SampledValue);
  const i = values.findIndex((value) => !Number.isFinite(value));
  if (i < 0) return new InternalError(`${channel.quantity} exceeds what the file's samples can hold`);
  return new InternalError(
    `${channel.quantity} is not a number at texel ${i % N} east, ${Math.floor(i / N)} north of the south-west corner`,
  );
}
