import { resolve } from 'node:path';
import type { Manifest } from '../manifest/manifest.ts';
import type { Plan } from '../plan/plan.ts';
import { concluded, type Run, unlessFinishedElsewhere } from './conclusion.ts';
import { type Crew, withCrew } from './crew.ts';
import { finishBake } from './finish.ts';
import { takeStock } from './finished-work.ts';
import { findLevels, makeFoam } from './foam-stage.ts';
import type { FrameEntry } from './journal-entry.ts';
import { damagedError, missingFrames, missingFramesError, noBakeError, unresolvedError } from './missing.ts';
import { type BakeResult, type GatherOptions, type Part, requirePart, threadCount } from './options.ts';
import { isCodesPath } from './paths.ts';
import { damagedFiles } from './repair.ts';
import { runTally } from './run-report.ts';
import { foamRun } from './shard.ts';
import { needsSurvey } from './survey.ts';
import { toldOf } from './told.ts';
import { claimFolder, journalsIn, manifestIn, planIn } from './work-folder.ts';

/**
 * Joins what shards have made to a finished bake: checks that every frame is there, whole and of one plan, makes foam,
 * and writes the manifest last. A finished bake is only checked.
 *
 * @param folder the bake folder
 * @throws InputError (65) that names what is missing and the command that makes it; ReadWriteError (74), StoppedError
 *   (75)
 */
export async function gather(folder: string, options: GatherOptions = {}): Promise<BakeResult> {
  const run: Run = {
    root: resolve(folder),
    threads: threadCount(options.threads),
    options,
    tally: runTally(),
  };
  requirePart(options.part, 'a part');
  const found = manifestIn(run.root);
  if (found !== null) {
    const damaged = await damagedFiles(run.root, found, options);
    if (damaged.length > 0) throw damagedError(run.root, damaged);
    return concluded(found, found.planHash, run);
  }
  const plan = planIn(run.root);
  if (plan === null) throw noBakeError(run.root);
  if (needsSurvey(plan)) throw unresolvedError(run.root);
  const start = { ...run, plan, waves: [], folder: run.root };
  const work = (crew: Crew): Promise<Manifest | null> => gathered(crew, run, options);
  const made = await unlessFinishedElsewhere(run.root, plan.hash, () => withCrew(start, work));
  return concluded(made, plan.hash, run);
}

async function gathered(
  crew: Crew,
  { root, tally }: Run,
  { part = null, onNotice }: GatherOptions,
): Promise<Manifest | null> {
  const { plan, finished } = crew;
  const told = toldOf(plan, journalsIn(root));
  for (const notice of told.notices) onNotice?.(notice);
  await takeStock(crew, part === null ? told.frames : ofPart(plan, told.frames, part));
  const missing = missingFrames(plan, finished);
  if (missing.length > 0) throw missingFramesError(plan, root, missing);
  tally.reuse(finished.entries().filter(({ kind }) => kind === 'frame').length);
  claimFolder(root, plan, crew.alone());
  crew.begin(part === null ? 'gather' : `gather part ${part.index}/${part.count}`);
  tally.phase('start');
  if (part === null) return finishBake(crew, told.levels, tally);
  await makeFoam(crew, await findLevels(crew, told.levels), part);
  tally.phase('foam');
  return null;
}

/** What a part of the foam reads: the codes of all frames, and its own foam; the last gather looks at the rest. */
function ofPart(plan: Plan, frames: readonly FrameEntry[], part: Part): readonly FrameEntry[] {
  return frames.flatMap((entry) => {
    if (entry.kind === 'frame') {
      return [{ ...entry, files: entry.files.filter(({ path }) => isCodesPath(path)) }];
    }
    const [from, to] = foamRun(plan.cascades[entry.cascade].loop.frameCount, part);
    return entry.frame >= from && entry.frame < to ? [entry] : [];
  });
}
