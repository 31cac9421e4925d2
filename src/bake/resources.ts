import { UnavailableError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import { freeBytes } from '../store/bake-folder.ts';
import type { FrameId } from './jobs.ts';
import { machineMemoryBytes } from './machine.ts';
import { frameCost } from './shard.ts';

/** A runtime's own memory for the main thread and for each worker, bytes: measured, `test/built` holds it to that. */
const MAIN_THREAD_BYTES = 108e6;
const WORKER_BYTES = 36e6;

/** Memory a bake is expected to take at its peak, bytes. */
export function expectedMemoryBytes({ report: { cost } }: Plan, threads: number): number {
  return MAIN_THREAD_BYTES + cost.sharedBytes + threads * (WORKER_BYTES + cost.bytesPerThread);
}

/**
 * Refuses a bake that this machine cannot hold, before anything is written.
 *
 * @param missing frames that are still to be made
 * @throws UnavailableError with the figures
 */
export function requireResources(
  plan: Plan,
  folder: string,
  threads: number,
  missing: readonly FrameId[],
): void {
  const memory = expectedMemoryBytes(plan, threads);
  if (memory > machineMemoryBytes()) {
    throw new UnavailableError(
      `The bake needs about ${gigabytes(memory)} of memory with ${threads} threads; this machine has ${gigabytes(machineMemoryBytes())}. Use fewer threads or a lower resolution.`,
    );
  }
  const { outputBytes, scratchBytes } = plan.report.cost;
  const share = shareOfWork(plan, missing);
  const disk = share * (outputBytes + scratchBytes);
  const free = freeBytes(folder);
  if (disk > free) {
    throw new UnavailableError(
      `The bake needs about ${gigabytes(disk)} of disk (${gigabytes(share * scratchBytes)} of it only while it runs); ${folder} has ${gigabytes(free)} free. Free some or choose another folder.`,
    );
  }
}

function shareOfWork(plan: Plan, frames: readonly FrameId[]): number {
  const costs = plan.cascades.map(frameCost);
  const all = plan.cascades.reduce((sum, { loop }, c) => sum + loop.frameCount * costs[c], 0);
  return frames.reduce((sum, { cascade }) => sum + costs[cascade], 0) / all;
}

function gigabytes(bytes: number): string {
  return bytes < 1e9 ? `${(bytes / 1e6).toFixed(0)} MB` : `${(bytes / 1e9).toFixed(1)} GB`;
}
