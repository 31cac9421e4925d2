import type { Manifest } from '../manifest/manifest.ts';
import type { RunReport } from './run-report.ts';

export interface BakeOptions {
  /** Worker threads; 0 makes frames in the calling thread. Default: as many as the machine can run at once. */
  readonly threads?: number;
  /** Make only these frames (numbers as in file names, inclusive): no foam, no manifest; a later bake reuses them. */
  readonly frames?: { readonly first: number; readonly last: number } | null;
  /** Keep the working files of an unfinished or finished bake (Jacobian codes, journals). */
  readonly keepScratch?: boolean;
  /** Replace a bake of another plan in the same folder: only files that its manifest or journals name. */
  readonly force?: boolean;
  /** Stops the bake after the frames in flight; running it again resumes. */
  readonly signal?: AbortSignal | null;
  readonly onProgress?: ((progress: BakeProgress) => void) | null;
}

/** What is being done and how far it is; `total` may be a guess while `stage` is `foam-level`. */
export interface BakeProgress {
  readonly stage: BakeStage;
  readonly done: number;
  readonly total: number;
}

export type BakeStage = 'survey' | 'frames' | 'foam-level' | 'foam';

export interface BakeResult {
  /** Absolute path of the bake folder. */
  readonly folder: string;
  /** Null for a run of some frames only. */
  readonly manifest: Manifest | null;
  readonly run: RunReport;
}
