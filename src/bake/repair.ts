import { InputError } from '../errors.ts';
import { framePath, isFramePattern } from '../manifest/frame-path.ts';
import type { Manifest } from '../manifest/manifest.ts';
import { isIntact } from '../store/bake-folder.ts';
import { otherTurns } from './clock.ts';
import type { Crew } from './crew.ts';
import { makeFoam } from './foam-stage.ts';
import { makeFrames } from './frame-stage.ts';
import type { FrameId } from './jobs.ts';
import type { RunOptions } from './options.ts';
import { expectedFiles, MANIFEST_PATH } from './paths.ts';
import { throwIfStopped } from './run-jobs.ts';
import { wantedFrames } from './shard.ts';

/** Files are checked this many at a time between looks at the stop signal. */
const FILES_AT_ONCE = 8;

/**
 * Paths of a finished bake's files that are not what its manifest says.
 *
 * @throws InputError where the manifest itself is damaged; StoppedError after the signal
 */
export async function damagedFiles(
  folder: string,
  manifest: Manifest,
  { signal = null, onProgress }: RunOptions,
): Promise<readonly string[]> {
  requireComplete(manifest, `${folder}/${MANIFEST_PATH}`);
  const { files } = manifest;
  const damaged: string[] = [];
  for (const [i, file] of files.entries()) {
    if (i % FILES_AT_ONCE === 0) {
      await otherTurns();
      throwIfStopped(signal);
      onProgress?.({ stage: 'check', done: i, total: files.length });
    }
    if (!isIntact(folder, file)) damaged.push(file.path);
  }
  return damaged;
}

/**
 * Checks that a manifest lists exactly the files that its cascades, maps and loops make, none of them outside.
 *
 * @param source its path, for messages
 * @throws InputError
 */
export function requireComplete(manifest: Manifest, source: string): void {
  const maps = manifest.cascades.flatMap(({ maps, loop }) =>
    Object.values(maps).map(({ pattern }) => ({ pattern, loop })),
  );
  const count = maps.reduce((sum, { loop }) => sum + loop.frameCount, 0);
  const listed = new Set(manifest.files.map(({ path }) => path));
  // Counted first: the list is as long as the file, but a frame count may be any number.
  const whole =
    count === manifest.files.length &&
    maps.every(({ pattern }) => isFramePattern(pattern)) &&
    listed.size === count &&
    maps.every(({ pattern, loop }) =>
      Array.from({ length: loop.frameCount }, (_, n) => framePath(pattern, loop.firstFrame + n)).every(
        (path) => listed.has(path),
      ),
    );
  if (whole) return;
  throw new InputError(source, [
    {
      path: 'files',
      line: 0,
      column: 0,
      expected: `the ${count} files of its maps`,
      found: `${manifest.files.length} others`,
      remedy: 'The manifest is damaged: remove it and bake again.',
    },
  ]);
}

/** The frames that have to be made again so that every damaged file is. */
export interface Repair {
  readonly frames: readonly FrameId[];
  /** Frames whose foam is damaged; foam needs all frames of its cascade. */
  readonly foam: readonly FrameId[];
}

/** What a repair takes. */
export function repairOf({ plan }: Pick<Crew, 'plan'>, damaged: readonly string[]): Repair {
  const paths = new Set(damaged);
  const touched = (kind: 'frame' | 'foam', id: FrameId): boolean =>
    expectedFiles(plan, kind, id).some((path) => paths.has(path));
  const all = wantedFrames(plan, null, null);
  const foam = all.filter((id) => touched('foam', id));
  const foaming = new Set(foam.map(({ cascade }) => cascade));
  return { frames: all.filter((id) => foaming.has(id.cascade) || touched('frame', id)), foam };
}

/**
 * Makes the damaged files of a finished bake again. Its manifest stays: the same plan gives the same bytes.
 *
 * @throws InputError (65) where the files come out otherwise
 */
export async function repaired(
  crew: Crew,
  manifest: Manifest,
  repair: Repair,
  damaged: readonly string[],
): Promise<Manifest> {
  await makeFrames(crew, repair.frames);
  const levels = crew.plan.cascades.map(({ foam }, c) => {
    const made = manifest.cascades[c]?.foam ?? null;
    if (foam === null || made === null || !repair.foam.some(({ cascade }) => cascade === c)) return null;
    const { zeroJ, stepJ } = foam.jacobianCodes;
    const breakingCode = Math.round((made.breakingJ - zeroJ) / stepJ);
    return { breakingCode, coverage: made.coverage.measured, note: made.note };
  });
  const lacking = new Set(repair.foam.map(({ cascade, frame }) => `${cascade} ${frame}`));
  await makeFoam(crew, levels, null, ({ cascade, frame }) => lacking.has(`${cascade} ${frame}`));
  const stated = new Map(manifest.files.map((file) => [file.path, file]));
  for (const path of damaged) {
    const file = stated.get(path);
    if (file !== undefined && !isIntact(crew.folder, file)) throw otherBytes(crew.folder, path);
  }
  return manifest;
}

function otherBytes(folder: string, path: string): InputError {
  return new InputError(folder, [
    {
      path,
      line: 0,
      column: 0,
      expected: 'what the manifest says',
      found: 'other bytes, also when made again',
      remedy: 'The manifest is damaged, or its bake came from elsewhere: bake into another folder.',
    },
  ]);
}
