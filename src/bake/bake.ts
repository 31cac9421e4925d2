import { resolve } from 'node:path';
import type { Manifest } from '../manifest/manifest.ts';
import { manifestText } from '../manifest/manifest-text.ts';
import type { PlannedBake } from '../plan/plan-bake.ts';
import { writeFileAtomic } from '../store/atomic-file.ts';
import { openJournal } from '../store/journal.ts';
import type { Crew } from './crew.ts';
import { finishedWork, isIntact } from './finished-work.ts';
import { makeFoam } from './foam-stage.ts';
import { makeFrames, requireFrameRange } from './frame-stage.ts';
import { gatheredManifest } from './gather.ts';
import { inlineExecutor } from './inline-executor.ts';
import type { Executor } from './jobs.ts';
import type { JournalEntry } from './journal-entry.ts';
import { machineName, machineThreads } from './machine.ts';
import type { BakeOptions, BakeResult } from './options.ts';
import { requireResources } from './resources.ts';
import { runTally } from './run-report.ts';
import { surveyedRules } from './survey.ts';
import { threadExecutor } from './thread-executor.ts';
import { clearWorkFolder, MANIFEST_PATH, RUN_PATH, takeUpFolder, WORK_FOLDER } from './work-folder.ts';

/** Defaults of a bake's options; `threads: null` is as many as the machine can run at once. */
export const BAKE_DEFAULTS: Readonly<{ threads: number | null; keepScratch: boolean; force: boolean }> =
  Object.freeze({ threads: null, keepScratch: false, force: false });

/**
 * Bakes a plan into a folder: frames, then foam, then the manifest. Takes up where an earlier run of the same plan
 * stopped; the files are the same bytes with any number of threads.
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
  const { plan } = planned;
  const root = resolve(folder);
  const range = options.frames ?? null;
  const threads = options.threads ?? BAKE_DEFAULTS.threads ?? machineThreads();
  requireFrameRange(plan, range);

  const tally = runTally();
  const found = takeUpFolder(root, plan, options.force ?? BAKE_DEFAULTS.force);
  const { manifest } = found;
  if (manifest?.files.every((file) => isIntact(root, file)) === true) {
    tally.reuse(plan.cascades.reduce((sum, { loop }) => sum + loop.frameCount, 0));
    return { folder: root, manifest, run: tally.report(plan.hash, threads) };
  }
  const finished = finishedWork(root, found.entries);
  const kept = finished.entries();
  tally.reuse(kept.filter(({ kind }) => kind === 'frame').length);
  const keptBytes = kept.flatMap(({ files }) => files).reduce((sum, { bytes }) => sum + bytes, 0);
  requireResources(plan, root, Math.max(1, threads), keptBytes);
  tally.phase('start');

  const executor = executorOf(planned, root, threads);
  const journalName = `${machineName()}-${process.pid}-${crypto.randomUUID()}`;
  const journal = openJournal<JournalEntry>(`${root}/${WORK_FOLDER}`, journalName);
  const crew: Crew = {
    plan,
    folder: root,
    executor,
    finished,
    signal: options.signal ?? null,
    report: (stage, done, total) => options.onProgress?.({ stage, done, total }),
    keep(results) {
      for (const result of results) {
        const { seconds: _seconds, ...entry } = result;
        journal.append(entry);
        finished.add(entry);
        tally.add(result);
      }
    },
  };
  let gathered: Manifest | null = null;
  try {
    const rules = await surveyedRules(crew);
    tally.phase('survey');
    await makeFrames(crew, rules, range);
    tally.phase('frames');
    if (range === null) {
      const levels = await makeFoam(crew);
      tally.phase('foam');
      gathered = gatheredManifest(plan, finished.entries(), levels, rules);
    }
  } finally {
    journal.close();
    await executor.close();
  }
  if (gathered === null) return { folder: root, manifest: null, run: tally.report(plan.hash, threads) };
  writeFileAtomic(root, MANIFEST_PATH, manifestText(gathered), { sync: true });
  tally.phase('gather');
  const run = tally.report(plan.hash, threads);
  writeFileAtomic(root, RUN_PATH, `${JSON.stringify(run, null, 2)}\n`);
  if (!(options.keepScratch ?? BAKE_DEFAULTS.keepScratch)) clearWorkFolder(root);
  return { folder: root, manifest: gathered, run };
}

function executorOf({ plan, waves }: PlannedBake, folder: string, threads: number): Executor {
  const amplitudes = waves.map((cascade) => cascade.amplitudes);
  if (threads === 0) return inlineExecutor(plan, amplitudes, folder);
  return threadExecutor({ plan, waves: amplitudes, folder }, threads);
}
