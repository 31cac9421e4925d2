import type { Stage } from './jobs.ts';

/** `run.json`: what is about the run and not about the files. No part of the contract with readers. */
export interface RunReport {
  readonly format: 'loopswell-run';
  readonly planHash: string;
  readonly host: string;
  readonly node: string;
  readonly threads: number;
  readonly startedAt: string;
  readonly wallSeconds: number;
  /** Seconds of all threads together, by stage. */
  readonly threadSeconds: Readonly<Record<Stage, number>>;
  /** Wall seconds by phase of the bake. */
  readonly phaseSeconds: Readonly<Record<string, number>>;
  readonly framesMade: number;
  /** Frames found finished from an earlier run. */
  readonly framesReused: number;
  readonly bytesWritten: number;
  readonly framesPerSecond: number;
  /** Largest resident memory of the process so far, bytes. */
  readonly peakMemoryBytes: number;
}
