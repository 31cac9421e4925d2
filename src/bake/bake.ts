import { resolve } from 'node:path';
import type { Manifest } from '../manifest/manifest.ts';
import type { PlannedBake } from '../plan/plan-bake.ts';
import { requireFolderPlace } from '../store/bake-folder.ts';
import { requireEngine } from './cascade-maker.ts';
import { concluded, type Run, unlessFinishedElsewhere } from './conclusion.ts';
import { type Crew, withCrew } from './crew.ts';
import { finishBake } from './finish.ts';
import { takeStock } from './finished-work.ts';
import { makeFrames, requireFrameRange } from './frame-stage.ts';
import type { FrameId } from './jobs.ts';
import { type BakeOptions, type BakeResult, requirePart, threadCount } from './options.ts';
import { damagedFiles, repaired, repairOf } from './repair.ts';
import { requireResources } from './resources.ts';
import { runTally } from './run-report.ts';
import { wantedFrames } from './shard.ts';
import {
  type DecodeRules,
  needsSurvey,
  rulesOfManifest,
  rulesOfPlan,
  surveyed,
  withRules,
} from './survey.ts';
import { type Told, toldOf } from './told.ts';
import {
  claimFolder,
  isForeign,
  journalsIn,
  type Owner,
  ownerOf,
  planIn,
  refuseForeign,
  removeBake,
} from './work-folder.ts';

/**
 * Bakes a plan into a folder: frames, then foam, then the manifest. Takes up where earlier runs of the same plan
 * stopped; the files are the same bytes with any number of threads and processes. A finished bake is checked, and what
 * is damaged in it made again.
 *
 * @param planned the plan and its waves
 * @param folder bake folder, made where missing
 * @throws UnavailableError (69) where memory or disk will not do; CannotCreateError (73) where the folder belongs to
 *   another plan; ReadWriteError (74); StoppedError (75) after `signal`; UsageError (64) for frames outside the loop
 */
export async function bake(
  planned: PlannedBake,
  folder: string,
  options: BakeOptions = {},
): Promise<BakeResult> {
  const run: BakeRun = {
    root: resolve(folder),
    threads: threadCount(options.threads),
    options,
    tally: runTally(),
  };
  requireFrameRange(planned.plan, options.frames ?? null);
  requirePart(options.shard, 'a shard');
  requireFolderPlace(run.root);
  const owner = ownerOf(run.root);
  const { plan, waves } = await withKnownRanges(planned, owner, run);
  if (isForeign(owner, plan) && options.force !== true) refuseForeign(run.root, owner);

  const found = owner?.planHash === plan.hash ? owner.manifest : null;
  const damaged = found === null ? [] : await damagedFiles(run.root, found, options);
  if (found !== null && damaged.length === 0) {
    run.tally.reuse(wantedFrames(plan, null, null).length);
    return concluded(found, plan.hash, run);
  }
  const amplitudes = waves.map((cascade) => cascade.amplitudes);
  const start = { ...run, plan, waves: amplitudes, folder: run.root };
  const manifest =
    found === null
      ? await unlessFinishedElsewhere(run.root, plan.hash, () =>
          withCrew(start, (crew) => freshManifest(crew, owner, run)),
        )
      : await withCrew(start, (crew) => repairedManifest(crew, found, damaged, run));
  return concluded(manifest, plan.hash, run);
}

/** A call of `bake`. */
type BakeRun = Run & { readonly options: BakeOptions };

/** The bake with its ranges known: from an earlier run's plan or manifest, else by a survey. */
async function withKnownRanges(
  planned: PlannedBake,
  owner: Owner | null,
  { root, threads, options, tally }: BakeRun,
): Promise<PlannedBake> {
  if (!needsSurvey(planned.plan)) return planned;
  if (owner !== null) {
    const plan = withRules(planned.plan, rulesIn(root, owner));
    if (plan.hash === owner.planHash) return { ...planned, plan };
    if (options.force !== true) refuseForeign(root, owner);
  }
  return surveyed(planned, threads, options, tally);
}

function rulesIn(root: string, { manifest }: Owner): readonly DecodeRules[] {
  if (manifest !== null) return rulesOfManifest(manifest);
  const plan = planIn(root);
  return plan === null ? [] : rulesOfPlan(plan);
}

/** Makes what is missing; null where only a part was asked for. */
async function freshManifest(crew: Crew, owner: Owner | null, run: BakeRun): Promise<Manifest | null> {
  const { frames = null, shard = null } = run.options;
  const foreign = isForeign(owner, crew.plan) ? owner : null;
  const partial = frames !== null || shard !== null;
  const wanted = wantedFrames(crew.plan, frames, shard);
  const told = foreign === null ? await resumed(crew, wanted, !partial, run) : NOTHING_TOLD;
  await begin(crew, wanted, taskName(run.options), run, foreign);
  await makeFrames(crew, wanted);
  run.tally.phase('frames');
  return partial ? null : finishBake(crew, told.levels, run.tally);
}

async function repairedManifest(
  crew: Crew,
  found: Manifest,
  damaged: readonly string[],
  run: BakeRun,
): Promise<Manifest> {
  const repair = repairOf(crew, damaged);
  await resumed(crew, repair.frames, false, run);
  await begin(crew, repair.frames, 'repair', run, null);
  return repaired(crew, found, repair, damaged);
}

const NOTHING_TOLD: Told = Object.freeze({ frames: [], levels: [], notices: [] });

/** Takes up the wanted frames, and foam if that is wanted, as far as earlier runs have made them. */
async function resumed(
  crew: Crew,
  wanted: readonly FrameId[],
  withFoam: boolean,
  { options, tally }: BakeRun,
): Promise<Told> {
  const told = toldOf(crew.plan, journalsIn(crew.folder));
  for (const notice of told.notices) options.onNotice?.(notice);
  const keys = new Set(wanted.map(({ cascade, frame }) => `${cascade} ${frame}`));
  await takeStock(
    crew,
    told.frames.filter(({ kind, cascade, frame }) =>
      kind === 'foam' ? withFoam : keys.has(`${cascade} ${frame}`),
    ),
  );
  tally.reuse(wanted.filter((id) => crew.finished.has('frame', id)).length);
  return told;
}

/** Makes sure that there is room, takes the folder, and says so in the journal. */
async function begin(
  crew: Crew,
  wanted: readonly FrameId[],
  task: string,
  { root, threads, tally }: BakeRun,
  foreign: Owner | null,
): Promise<void> {
  const missing = wanted.filter((id) => !crew.finished.has('frame', id));
  requireEngine(crew.plan.engine);
  requireResources(crew.plan, root, Math.max(1, threads), missing);
  if (foreign !== null) removeBake(root, foreign, crew.alone());
  claimFolder(root, crew.plan, crew.alone());
  crew.begin(task);
  tally.phase('start');
}

function taskName({ frames = null, shard = null }: BakeOptions): string {
  const range = frames === null ? [] : [`frames ${frames.first}-${frames.last}`];
  const part = shard === null ? [] : [`shard ${shard.index}/${shard.count}`];
  return [...range, ...part].join(', ') || 'bake';
}
