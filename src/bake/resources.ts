import { UnavailableError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import { freeBytes } from '../store/bake-folder.ts';
import { BLOCK_BYTES } from './foam-level.ts';
import type { FrameId } from './jobs.ts';
import { machineMemoryBytes } from './machine.ts';
import { frameCost } from './shard.ts';

/** A runtime's own memory for the main thread and for each worker, bytes: measured, `test/built` holds it to that. */
const MAIN_THREAD_BYTES = 140e6;
const WORKER_BYTES = 38e6;
/** What planning takes beside the waves it leaves, which the runtime does not give back, by bytes of waves. */
const PLANNING_SHARE = 1.5;

/** Memory a bake is expected to take at its peak, bytes. */
export function expectedMemoryBytes(plan: Plan, threads: number): number {
  const { sharedBytes, bytesPerThread } = plan.report.cost;
  const main = MAIN_THREAD_BYTES + (1 + PLANNING_SHARE) * sharedBytes;
  return main + threads * (WORKER_BYTES + bytesPerThread + foamBlockBytes(plan, threads));
}

/** J codes of the whole loop that one thread holds while the breaking level is sought. */
function foamBlockBytes({ cascades }: Plan, threads: number): number {
  const loops = cascades.map(({ foam, resolution, loop }) =>
    foam === null ? 0 : 2 * resolution ** 2 * loop.frameCount,
  );
  return Math.min(BLOCK_BYTES, Math.max(...loops) / Math.max(1, threads));
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
