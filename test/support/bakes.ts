import { createHash } from 'node:crypto';
import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { bake } from '../../src/bake/bake.ts';
import type { BakeOptions, BakeResult } from '../../src/bake/options.ts';
import type { PlannedBake } from '../../src/plan/plan-bake.ts';

/** Calls `body` with a new folder that is gone afterwards. */
export async function inTemporaryFolder<Result>(body: (folder: string) => Promise<Result>): Promise<Result> {
  const folder = mkdtempSync(join(tmpdir(), 'loopswell-test-'));
  try {
    return await body(folder);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** All files below a folder with their hashes, sorted; without `run.json`, which is about the run. */
export function fileHashes(folder: string): Readonly<Record<string, string>> {
  const paths = (readdirSync(folder, { recursive: true }) as string[])
    .filter((path) => path !== 'run.json' && !statSync(join(folder, path)).isDirectory())
    .sort();
  return Object.fromEntries(
    paths.map((path) => [
      path,
      createHash('sha256')
        .update(readFileSync(join(folder, path)))
        .digest('hex'),
    ]),
  );
}

/** Bakes in the calling thread. */
export function inlineBake(
  planned: PlannedBake,
  folder: string,
  options: BakeOptions = {},
): Promise<BakeResult> {
  return bake(planned, folder, { threads: 0, ...options });
}

/** A signal that stops a run once a number of frames are done in a stage. */
export function stopAfter(stage: string, frames: number): Pick<BakeOptions, 'signal' | 'onProgress'> {
  const controller = new AbortController();
  return {
    signal: controller.signal,
    onProgress: (progress) => {
      if (progress.stage === stage && progress.done >= frames) controller.abort();
    },
  };
}
