import { STATISTICS, STRIP_COLUMNS, STRIP_ROW, stripBytes } from '../kernel/wave/layout.ts';
import type { WaveKernel } from '../kernel/wave/wave-kernel.ts';
import {
  type BlockPlace,
  blockCopier,
  blockOf,
  fillOffsets,
  MOST_CHANNELS,
  MOST_REQUESTS,
} from './float32-blocks.ts';
import type { PairStore } from './float32-pairs.ts';
import {
  isInteger,
  LARGEST,
  type SampledChannel,
  type SampledValue,
  type SampleStatistics,
  type SamplesRequest,
} from './float32-requests.ts';
import { readStatistics, startStatistics } from './float32-statistics.ts';
import type { FieldName } from './frame-fields.ts';

/** Makes samples from the pairs of one frame, a block at a time, in memory at `address`. */
export interface Sampler {
  /**
   * All requests in one pass over the blocks. Measured no faster than one after the other at 256 to 1024 (making codes
   * and normals takes longer than reading fields), so callers may do either.
   */
  samples(requests: readonly SamplesRequest[], address: number): SampleStatistics[][];
  /** Largest magnitude of each value over the tile, of J - 1 for the Jacobian; NaN where one is not a number. */
  largest(values: readonly SampledValue[], address: number): number[];
  /** Fills Float32Array N*N with one value, J - 1 for the Jacobian; row 0 south. */
  fillValues(out: Float32Array, value: SampledValue, address: number): void;
}

export function sampler(kernel: WaveKernel, pairs: PairStore, N: number): Sampler {
  const { program } = kernel;
  const block = blockOf(N);

  /** Fills the values of a block, one channel behind the other. `row` counts from the first row of the file. */
  const fillBlock = (
    values: readonly SampledValue[],
    { row, column }: BlockPlace,
    rowZero: 'north' | 'south',
    out: number,
  ): void => {
    const fieldRow = rowZero === 'north' ? N - 1 - row : row;
    const step = rowZero === 'north' ? -STRIP_ROW : STRIP_ROW;
    const offset = (column / STRIP_COLUMNS) * stripBytes(N) + fieldRow * STRIP_ROW;
    const size = [step, stripBytes(N), block.rows, block.columns] as const;
    const start = (field: FieldName) => pairs.place(field).address + offset;
    // A part of the normal that nobody wants goes behind the others.
    const slot = (value: SampledValue) => {
      const c = values.indexOf(value);
      return out + (c < 0 ? MOST_CHANNELS - 1 : c) * block.channelBytes;
    };
    const strain = () =>
      [
        start('strainEastEast'),
        start('strainNorthNorth'),
        start('strainEastNorth'),
        pairs.place('strainEastNorth').unscale,
      ] as const;
    if (values.some(isNormal)) {
      const [east, north, up] = [slot('normalEast'), slot('normalNorth'), slot('normalUp')];
      program.normalRows(east, north, up, start('slopeEast'), start('slopeNorth'), ...strain(), ...size);
    }
    for (const value of values) {
      if (value === 'jacobian') program.jacobianRows(slot(value), ...strain(), ...size);
      else if (!isNormal(value)) {
        program.fieldRows(slot(value), start(value), pairs.place(value).unscale, ...size);
      }
    }
  };

  const forEachBlock = (visit: (place: BlockPlace) => void): void => {
    for (let row = 0; row < N; row += block.rows) {
      for (let column = 0; column < N; column += block.columns) visit({ row, column });
    }
  };

  return {
    samples(requests, address) {
      requireServable(requests);
      const stored = address + MOST_CHANNELS * block.channelBytes;
      const packed = stored + MOST_CHANNELS * block.channelBytes;
      const offsets = packed + 2 * block.channelBytes;
      const statistics = offsets + block.channelBytes;

      const jobs = requests.map((request, r) => {
        const { sample, channels, target } = request;
        const slots = channels.map(
          (_, c) => statistics + (r * MOST_CHANNELS + c) * STATISTICS.statisticsBytes,
        );
        for (const slot of slots) startStatistics(kernel.buffer, slot, isInteger(sample));
        const place = { sample, channels: channels.length, N, block, stored, packed };
        const values = channels.map(({ value }) => value);
        return { request, values, slots, copyOut: blockCopier(kernel, target, place) };
      });
      const storeChannel = (
        sample: SamplesRequest['sample'],
        { value, gain, shift, dither: pattern }: SampledChannel,
        place: BlockPlace,
        c: number,
        slot: number,
      ): void => {
        const from = address + c * block.channelBytes;
        const to = stored + c * block.channelBytes;
        // J comes as J - 1.
        const added = shift + (value === 'jacobian' ? gain : 0);
        if (sample === 'half') program.storeHalves(to, from, block.values, gain, added, slot);
        else if (sample === 'float') program.storeFloats(to, from, block.values, gain, added, slot);
        else {
          const step = pattern === null ? 0 : 16;
          if (pattern === null) new Float32Array(kernel.buffer, offsets, 4).fill(added);
          else fillOffsets(kernel.buffer, offsets, pattern, added, place, block, N);
          program.storeCodes(to, from, block.values, gain, offsets, step, LARGEST[sample], slot);
        }
      };

      forEachBlock((place) => {
        for (const { request, values, slots, copyOut } of jobs) {
          const { sample, channels, rowZero } = request;
          fillBlock(values, place, rowZero, address);
          channels.forEach((channel, c) => {
            storeChannel(sample, channel, place, c, slots[c]);
          });
          copyOut(place);
        }
      });
      return jobs.map(({ request: { sample }, slots }) => {
        const centre = isInteger(sample) ? (LARGEST[sample] + 1) / 2 : null;
        return slots.map((slot) => readStatistics(kernel.buffer, slot, centre));
      });
    },
    largest(values, address) {
      const largest = values.map(() => 0);
      forEachBlock((place) => {
        fillBlock(values, place, 'south', address);
        values.forEach((_, c) => {
          const found = program.largestMagnitude(address + c * block.channelBytes, block.values);
          largest[c] = Math.max(largest[c], found);
        });
      });
      return largest;
    },
    fillValues(out, value, address) {
      const request = { sample: 'float', channels: 1, N, block, stored: address, packed: address } as const;
      const copyOut = blockCopier(kernel, { planes: [out] }, request);
      forEachBlock((place) => {
        fillBlock([value], place, 'south', address);
        copyOut(place);
      });
    },
  };
}

function requireServable(requests: readonly SamplesRequest[]): void {
  if (requests.length > MOST_REQUESTS) throw new RangeError(`more than ${MOST_REQUESTS} maps in one pass`);
  for (const { sample, channels, target } of requests) {
    const wanted = 'texels' in target ? [1, 3] : [1, 2, 3];
    const fits = isInteger(sample) || 'planes' in target;
    if (!wanted.includes(channels.length) || !fits) {
      throw new RangeError(`${channels.length} channels of ${sample} cannot be stored so`);
    }
  }
}

function isNormal(value: SampledValue): value is 'normalEast' | 'normalNorth' | 'normalUp' {
  return value.startsWith('normal');
}
