import { dateNow, secondsNow } from './clock.ts';
import type { FrameResult, Stage } from './jobs.ts';
import { machineName, runtimeFacts } from './machine.ts';

/** `run.json`: what is about the run and not about the files. No part of the contract with readers. */
export interface RunReport {
  readonly format: 'loopswell-run';
  readonly planHash: string;
  readonly host: string;
  readonly node: string;
  readonly threads: number;
  readonly startedAt: string;
  readonly wallSeconds: number;
  /** Wall seconds by phase of the bake. */
  readonly phaseSeconds: Readonly<Record<string, number>>;
  /** Seconds of all threads together, by stage of a frame's work. */
  readonly threadSeconds: Readonly<Partial<Record<Stage, number>>>;
  readonly framesMade: number;
  /** Frames found finished from an earlier run. */
  readonly framesReused: number;
  readonly bytesWritten: number;
  /** Frames made in a second of wall time; a frame is one cascade's. */
  readonly framesPerSecond: number;
  /** Largest resident memory of the process so far, bytes. */
  readonly peakMemoryBytes: number;
}

/** Collects the figures of a run while it goes on. */
export interface RunTally {
  /** Ends a phase: the time since the last one is its. */
  phase(name: string): void;
  add(result: FrameResult): void;
  reuse(frames: number): void;
  /** Whether anything was made. */
  made(): boolean;
  report(planHash: string, threads: number): RunReport;
}

export function runTally(): RunTally {
  const startedAt = dateNow();
  const start = secondsNow();
  let last = start;
  const phaseSeconds: Record<string, number> = {};
  const threadSeconds: Partial<Record<Stage, number>> = {};
  let [framesMade, framesReused, bytesWritten] = [0, 0, 0];
  return {
    phase(name) {
      const now = secondsNow();
      phaseSeconds[name] = (phaseSeconds[name] ?? 0) + now - last;
      last = now;
    },
    add({ kind, files, seconds }) {
      if (kind === 'frame') framesMade++;
      for (const { bytes } of files) bytesWritten += bytes;
      for (const [stage, spent] of Object.entries(seconds) as [Stage, number][]) {
        threadSeconds[stage] = (threadSeconds[stage] ?? 0) + spent;
      }
    },
    reuse(frames) {
      framesReused += frames;
    },
    made: () => bytesWritten > 0,
    report(planHash, threads) {
      const wallSeconds = secondsNow() - start;
      return {
        format: 'loopswell-run',
        planHash,
        host: machineName(),
        node: runtimeFacts().node,
        threads,
        startedAt,
        wallSeconds,
        phaseSeconds,
        threadSeconds,
        framesMade,
        framesReused,
        bytesWritten,
        framesPerSecond: framesMade / wallSeconds,
        peakMemoryBytes: runtimeFacts().peakMemoryBytes,
      };
    },
  };
}
