import type { ChannelStatistics } from '../maps/encoded-map.ts';
import type { PowerSums } from '../math/statistics.ts';
import type { MapName } from '../sea/sea.ts';

/** A piece of work that one thread does on its own. Plain and cloneable, as are the results. */
export type Job = FrameJob | SurveyJob | FoamMeasureJob | FoamJob | CheckJob;

/** A frame of a cascade's own loop, from 0. */
export interface FrameId {
  readonly cascade: number;
  readonly frame: number;
}

/** All maps but foam of one frame of one cascade, and its Jacobian codes where foam will need them. */
export interface FrameJob extends FrameId {
  readonly kind: 'frame';
}

/** Largest magnitudes of one frame's quantities, for the maps whose range is surveyed. */
export interface SurveyJob extends FrameId {
  readonly kind: 'survey';
}

/** Sums of the written foam codes over the loop for several breaking levels, on a grid of texels. */
export interface FoamMeasureJob {
  readonly kind: 'foam-measure';
  readonly cascade: number;
  /** Rows [from, to) of the tile, and the step from texel to texel along both axes. */
  readonly fromRow: number;
  readonly toRow: number;
  readonly stride: number;
  /** Breaking levels to try, as J codes. */
  readonly breakingCodes: readonly number[];
}

/** The foam maps of a run of frames [fromFrame, toFrame) of one cascade. */
export interface FoamJob {
  readonly kind: 'foam';
  readonly cascade: number;
  readonly fromFrame: number;
  readonly toFrame: number;
  readonly breakingCode: number;
}

/** Whether files are what was written: groups of files that count together. */
export interface CheckJob {
  readonly kind: 'check';
  readonly groups: readonly (readonly WrittenFile[])[];
}

/** A file that is in place under its final name. */
export interface WrittenFile {
  /** Below the bake folder, with forward slashes. */
  readonly path: string;
  readonly bytes: number;
  readonly sha256: string;
}

/** One finished frame of one cascade. */
export interface FrameResult extends FrameId {
  readonly kind: 'frame' | 'foam';
  readonly files: readonly WrittenFile[];
  /** What was written, by map, in channel order. */
  readonly statistics: Readonly<Partial<Record<MapName, readonly ChannelStatistics[]>>>;
  /** Of the heights as written; null where the frame holds none. */
  readonly heights: PowerSums | null;
  /** Texels whose J code is below that of J = 0; null where there are no codes or they do not reach so low. */
  readonly foldedTexels: number | null;
  /** Seconds by stage; for `run.json` only. */
  readonly seconds: StageSeconds;
}

export type StageSeconds = Readonly<Partial<Record<Stage, number>>>;
export type Stage = 'synthesis' | 'maps' | 'encode' | 'write' | 'foam';

export interface SurveyResult {
  readonly kind: 'survey';
  /** Largest magnitude by map, in channel order, in the channel's unit (of J - 1 for jacobian). */
  readonly extents: Readonly<Partial<Record<MapName, readonly number[]>>>;
}

export interface FoamMeasureResult {
  readonly kind: 'foam-measure';
  readonly texels: number;
  /** Sum of written codes over texels and frames for each breaking code: exact integers. */
  readonly sums: readonly number[];
}

export interface CheckResult {
  readonly kind: 'check';
  /** For each group whether all its files are whole. */
  readonly intact: readonly boolean[];
}

/** What a job comes to in the end; jobs that make frames have handed those over one by one. */
export type JobResult = SurveyResult | FoamMeasureResult | CheckResult | null;

/** Does jobs; several at a time if it can. */
export interface Executor {
  /** How many jobs it can do at once. */
  readonly width: number;
  /**
   * @param keep receives each frame as soon as its files are in place
   * @throws LoopswellError naming the cascade and frame where a job fails; StoppedError for a job that was dropped
   */
  run(job: Job, keep: (result: FrameResult) => void): Promise<JobResult>;
  /** Begins no further job and has those in flight finish soon; what takes too long is dropped. */
  stop(): void;
  close(): Promise<void>;
}

/** `c1 frame 17`, as messages name a job; frames as in file names. */
export function jobName(job: Job, firstFrame: number): string {
  switch (job.kind) {
    case 'frame':
      return `c${job.cascade} frame ${job.frame + firstFrame}`;
    case 'survey':
      return `c${job.cascade} frame ${job.frame + firstFrame} (range survey)`;
    case 'foam-measure':
      return `c${job.cascade} foam level, rows ${job.fromRow} to ${job.toRow - 1}`;
    case 'foam':
      return `c${job.cascade} foam of frames ${job.fromFrame + firstFrame} to ${job.toFrame - 1 + firstFrame}`;
    case 'check':
      return 'check of finished files';
  }
}
