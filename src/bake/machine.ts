import { availableParallelism, hostname, totalmem } from 'node:os';

/** The machine a bake runs on, as far as a bake asks. */

/** Threads the machine can run at once. */
export function machineThreads(): number {
  return availableParallelism();
}

/** Memory this process may have, bytes: what is installed, or less where the system holds it to a limit. */
export function machineMemoryBytes(): number {
  const limit = process.constrainedMemory();
  return limit > 0 ? Math.min(limit, totalmem()) : totalmem();
}

export function machineName(): string {
  return hostname();
}

/** Version of the runtime, and the largest resident memory of this process so far, bytes. */
export function runtimeFacts(): { readonly node: string; readonly peakMemoryBytes: number } {
  return { node: process.version, peakMemoryBytes: process.resourceUsage().maxRSS * 1024 };
}
