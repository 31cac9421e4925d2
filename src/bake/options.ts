import { UsageError } from '../errors.ts';
import type { Manifest } from '../manifest/manifest.ts';
import { machineThreads } from './machine.ts';
import type { RunReport } from './run-report.ts';

/** What every run on a bake folder can be told. */
export interface RunOptions {
  /** Worker threads; 0 works in the calling thread. Default (null): as many as the machine can run at once. */
  readonly threads?: number | null;
  /**
   * When to wait until the disk itself has the bytes. `manifest`: for the manifest and the journal; a frame that a power
   * cut takes is found out by its hash and made again. `every-file`: for frames as well.
   */
  readonly sync?: SyncPolicy;
  /** Keep the working files of the bake (Jacobian codes, journals). */
  readonly keepScratch?: boolean;
  /** Stops the run within 5 s; running it again resumes. */
  readonly signal?: AbortSignal | null;
  readonly onProgress?: ((progress: BakeProgress) => void) | null;
  /** Told in a sentence of what is odd but no reason to stop, e.g. a damaged journal. */
  readonly onNotice?: ((notice: string) => void) | null;
}

export const SYNC_POLICIES = ['manifest', 'every-file'] as const;
export type SyncPolicy = (typeof SYNC_POLICIES)[number];

export interface BakeOptions extends RunOptions {
  /** Make only these frames: no foam, no manifest; a later bake reuses them. */
  readonly frames?: FrameRange | null;
  /** Make only this part of the frames: no foam, no manifest, which `gather` makes. */
  readonly shard?: Part | null;
  /** Replace a bake of another plan in the same folder: only files that its manifest or journals name. */
  readonly force?: boolean;
}

export interface GatherOptions extends RunOptions {
  /** Make only this part of the foam and no manifest, which a gather without it makes. */
  readonly part?: Part | null;
}

/** Frames as file numbers, inclusive. */
export interface FrameRange {
  readonly first: number;
  readonly last: number;
}

/** One of `count` parts of the work; `index` from 1. */
export interface Part {
  readonly index: number;
  readonly count: number;
}

/** What is being done and how far it is; `total` may be a guess while `stage` is `foam-level`. */
export interface BakeProgress {
  readonly stage: BakeStage;
  readonly done: number;
  readonly total: number;
}

export type BakeStage = 'check' | 'survey' | 'frames' | 'foam-level' | 'foam';

export interface BakeResult {
  /** Absolute path of the bake folder. */
  readonly folder: string;
  /** Null for a run that makes a part only. */
  readonly manifest: Manifest | null;
  readonly run: RunReport;
}

/** Defaults of the options; `threads: null` is as many as the machine can run at once. */
export const BAKE_DEFAULTS: Readonly<{
  threads: number | null;
  sync: SyncPolicy;
  keepScratch: boolean;
  force: boolean;
}> = Object.freeze({ threads: null, sync: 'manifest', keepScratch: false, force: false });

/** More than any machine runs, and any farm takes in one array. */
const MOST_THREADS = 1024;
const MOST_PARTS = 100_000;

/** @throws UsageError unless it is a number of threads */
export function threadCount(threads: number | null | undefined): number {
  const count = threads ?? BAKE_DEFAULTS.threads ?? machineThreads();
  if (Number.isInteger(count) && count >= 0 && count <= MOST_THREADS) return count;
  throw new UsageError(`Expected a whole number of threads from 0 to ${MOST_THREADS}, found ${count}.`);
}

/** @throws UsageError unless it is one of a number of parts */
export function requirePart(part: Part | null | undefined, name: string): void {
  if (part == null) return;
  const { index, count } = part;
  const whole = Number.isInteger(index) && Number.isInteger(count);
  if (whole && index >= 1 && index <= count && count <= MOST_PARTS) return;
  throw new UsageError(
    `Expected ${name} as part/parts, from 1/1 to ${MOST_PARTS}/${MOST_PARTS}; found ${index}/${count}.`,
  );
}
