import { roundedUp64 } from '../kernel/alignment.ts';
import { STATISTICS } from '../kernel/wave/layout.ts';
import type { WaveKernel } from '../kernel/wave/wave-kernel.ts';
import type { SamplesRequest } from './float32-requests.ts';

/**
 * Samples are made block by block: large enough that what is read of a strip fills a memory page (32 rows), small
 * enough that all values and samples of a block stay in the second cache. Measured at 1024 x 1024: eight rows of the
 * whole width, 1 kB of each strip at a time, take 1.3 to 1.7 times as long.
 */
const BLOCK_COLUMNS = 256;
const BLOCK_VALUES = 8192;
export const MOST_CHANNELS = 3;
/** Requests served in one pass: every map of a frame, and the Jacobian for foam. */
export const MOST_REQUESTS = 8;

export interface Block {
  readonly columns: number;
  readonly rows: number;
  readonly values: number;
  /** Bytes of one channel's values, and the room for its codes, halves or floats. */
  readonly channelBytes: number;
  readonly bytes: number;
}

export function blockOf(N: number): Block {
  const columns = Math.min(N, BLOCK_COLUMNS);
  const rows = Math.min(N, BLOCK_VALUES / columns);
  const values = columns * rows;
  const channelBytes = 4 * values;
  // Values and samples of three channels, packed texels, offsets of one channel.
  const statistics = MOST_REQUESTS * MOST_CHANNELS * STATISTICS.statisticsBytes;
  const bytes = roundedUp64((2 * MOST_CHANNELS + 2 + 1) * channelBytes + statistics);
  return { columns, rows, values, channelBytes, bytes };
}

/** Bytes of a kernel's memory that making samples of N x N takes. */
export function blockBytes(N: number): number {
  return blockOf(N).bytes;
}

/** First row and column of a block. */
export interface BlockPlace {
  readonly row: number;
  readonly column: number;
}

/** Fills the offsets of a block: dither and shift together. */
export function fillOffsets(
  buffer: ArrayBuffer,
  address: number,
  dither: Float32Array,
  shift: number,
  { row, column }: BlockPlace,
  { rows, columns, values }: Block,
  N: number,
): void {
  const offsets = new Float32Array(buffer, address, values);
  for (let r = 0; r < rows; r++) {
    const first = (row + r) * N + column;
    for (let i = 0; i < columns; i++) offsets[r * columns + i] = dither[first + i] + shift;
  }
}

export interface StoredBlock {
  readonly sample: SamplesRequest['sample'];
  readonly channels: number;
  readonly N: number;
  readonly block: Block;
  /** Addresses of the samples, channel behind channel, and of room for packed ones. */
  readonly stored: number;
  readonly packed: number;
}

/** How the samples of a block are copied out of the kernel. */
export function blockCopier(
  { program, buffer }: WaveKernel,
  target: SamplesRequest['target'],
  { sample, channels, N, block, stored, packed }: StoredBlock,
): (place: BlockPlace) => void {
  const { columns, rows, values, channelBytes } = block;
  type Samples = Uint8Array | Uint16Array | Float32Array;
  /** @param per array elements a texel */
  const copyRows = (out: Samples, from: Samples, { row, column }: BlockPlace, per: number): void => {
    if (columns === N) {
      out.set(from, row * N * per);
      return;
    }
    for (let r = 0; r < rows; r++) {
      out.set(from.subarray(r * columns * per, (r + 1) * columns * per), ((row + r) * N + column) * per);
    }
  };
  if ('texels' in target) {
    const perTexel = channels * (sample === 'uint8' ? 1 : 2);
    const texels = new Uint8Array(buffer, packed, values * perTexel);
    return (place) => {
      if (sample === 'uint8' && channels === 1) program.pack8(packed, stored, values);
      else if (sample === 'uint8') program.packThree8(packed, stored, channelBytes, values);
      else if (channels === 1) program.pack16(packed, stored, values);
      else program.packThree16(packed, stored, channelBytes, values);
      copyRows(target.texels, texels, place, perTexel);
    };
  }
  const bytes = new Uint8Array(buffer, packed, values);
  const sources = target.planes.map((_, c) => {
    const from = stored + c * channelBytes;
    return sample === 'float'
      ? new Float32Array(buffer, from, values)
      : new Uint16Array(buffer, from, values);
  });
  return (place) => {
    target.planes.forEach((plane, c) => {
      if (sample === 'uint8') program.pack8(packed, stored + c * channelBytes, values);
      copyRows(plane, sample === 'uint8' ? bytes : sources[c], place, 1);
    });
  };
}
