import { StoppedError } from '../errors.ts';
import type { Manifest } from '../manifest/manifest.ts';
import { writeFileAtomic } from '../store/atomic-file.ts';
import { isIdleAt } from './crew.ts';
import { BAKE_DEFAULTS, type BakeResult, type RunOptions } from './options.ts';
import { RUN_PATH } from './paths.ts';
import type { RunTally } from './run-report.ts';
import { clearWorkFolder, manifestIn } from './work-folder.ts';

/** What one call of `bake` or `gather` works with. */
export interface Run {
  /** The bake folder, absolute. */
  readonly root: string;
  readonly threads: number;
  readonly options: RunOptions;
  readonly tally: RunTally;
}

/**
 * Does the work of a bake. Should it fail because another process has finished the very same bake meanwhile, and
 * cleared its working files away under our feet, then nothing has failed.
 */
export async function unlessFinishedElsewhere(
  root: string,
  planHash: string,
  work: () => Promise<Manifest | null>,
): Promise<Manifest | null> {
  try {
    return await work();
  } catch (error) {
    const manifest = error instanceof StoppedError ? null : finishedElsewhere(root, planHash);
    if (manifest === null) throw error;
    return manifest;
  }
}

/** The manifest of this plan's bake if it is in the folder; a folder that cannot be read has none. */
function finishedElsewhere(root: string, planHash: string): Manifest | null {
  try {
    const manifest = manifestIn(root);
    return manifest?.planHash === planHash ? manifest : null;
  } catch {
    return null;
  }
}

/**
 * The result of a run. Of a finished bake the working files go, also those that a run left which was killed at its very
 * end, or that ran on while another process finished.
 *
 * @param made null where a part was made
 */
export function concluded(
  made: Manifest | null,
  planHash: string,
  { root, threads, options, tally }: Run,
): BakeResult {
  const manifest = made ?? finishedElsewhere(root, planHash);
  const run = tally.report(planHash, threads);
  if (made !== null && tally.made()) writeFileAtomic(root, RUN_PATH, `${JSON.stringify(run, null, 2)}\n`);
  if (manifest !== null && !(options.keepScratch ?? BAKE_DEFAULTS.keepScratch))
    clearWorkFolder(root, isIdleAt(root));
  return { folder: root, manifest: made, run };
}
