import { STATISTICS } from '../kernel/wave/layout.ts';
import type { SampleStatistics } from './float32-requests.ts';

/** Sets the statistics of one channel to those of no samples. */
export function startStatistics(buffer: ArrayBuffer, slot: number, isCode: boolean): void {
  new Uint8Array(buffer, slot, STATISTICS.statisticsBytes).fill(0);
  if (isCode) new Uint16Array(buffer, slot + STATISTICS.statisticsMin, 8).fill(65535);
  else {
    new Float32Array(buffer, slot + STATISTICS.statisticsMin, 4).fill(Infinity);
    new Float32Array(buffer, slot + STATISTICS.statisticsMax, 4).fill(-Infinity);
  }
}

/**
 * The statistics of one channel.
 * @param centre middle code, or null for halves and floats
 */
export function readStatistics(buffer: ArrayBuffer, slot: number, centre: number | null): SampleStatistics {
  const { statisticsSum, statisticsSquares, statisticsMin, statisticsMax } = STATISTICS;
  const total = (offset: number): number => {
    if (centre === null) {
      const [low, high] = new Float64Array(buffer, slot + offset, 2);
      return low + high;
    }
    const [low, high] = new BigInt64Array(buffer, slot + offset, 2);
    return Number(low + high);
  };
  const lanes = (offset: number) =>
    centre === null ? new Float32Array(buffer, slot + offset, 4) : new Uint16Array(buffer, slot + offset, 8);
  const clipped = new Uint32Array(buffer, slot + STATISTICS.statisticsClipped, 4);
  const faults = new Int32Array(buffer, slot + STATISTICS.statisticsFaults, 4);
  return {
    centre: centre ?? 0,
    sum: total(statisticsSum),
    sumOfSquares: total(statisticsSquares),
    min: Math.min(...lanes(statisticsMin)),
    max: Math.max(...lanes(statisticsMax)),
    clipped: clipped.reduce((sum, lane) => sum + lane, 0),
    finite: faults.every((lane) => lane === 0),
  };
}
