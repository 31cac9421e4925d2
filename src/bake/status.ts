import { resolve } from 'node:path';
import type { Plan } from '../plan/plan.ts';
import { hasSize } from '../store/bake-folder.ts';
import type { JournalContents } from '../store/journal.ts';
import { isAlive } from '../store/temporaries.ts';
import { HOST } from '../store/temporary-name.ts';
import { millisecondsSince1970 } from './clock.ts';
import { frameKey } from './finished-work.ts';
import type { FrameEntry, JournalLine } from './journal-entry.ts';
import { noBakeError } from './missing.ts';
import { toldOf } from './told.ts';
import { journalsIn, manifestIn, planIn } from './work-folder.ts';

/** How far the bake in a folder is. A look at names and sizes: `gather` and `verify` look into the files. */
export interface BakeStatus {
  /** Absolute path of the bake folder. */
  readonly folder: string;
  readonly title: string;
  readonly planHash: string;
  /** Whether its manifest is there. */
  readonly finished: boolean;
  /** None once the bake is finished. */
  readonly cascades: readonly CascadeStatus[];
  readonly processes: readonly ProcessStatus[];
  /** Sentences about what is odd. */
  readonly notices: readonly string[];
}

export interface CascadeStatus {
  readonly id: string;
  /** Frames of the loop, and of the foam loop where there is one. */
  readonly frames: Progress;
  readonly foam: Progress | null;
}

export interface Progress {
  readonly total: number;
  /** Numbers of the files that are missing, as in their names. */
  readonly missing: readonly number[];
}

/** A process that works on the bake or has done so, by its journal. */
export interface ProcessStatus {
  readonly task: string;
  readonly host: string;
  readonly pid: number;
  /**
   * `running`: alive on this host, or on another and heard of in the last ten minutes; `silent`: neither, so killed or
   * stuck; else how it ended.
   */
  readonly state: 'running' | 'silent' | 'done' | 'stopped' | 'failed';
  /** Frames and foam frames it has finished. */
  readonly made: number;
  /** Since its last sign of life, s; by the clocks of this host and of the disk, which need not agree. */
  readonly lastSignS: number;
}

/** The longest that a frame is thought to take. */
const SILENT_AFTER_S = 600;

/**
 * How far the bake in a folder is.
 *
 * @throws InputError where there is none, or its plan or manifest is damaged; ReadWriteError
 */
export function bakeStatus(folder: string): BakeStatus {
  const root = resolve(folder);
  const manifest = manifestIn(root);
  const journals = journalsIn(root);
  const processes = journals.flatMap(processOf);
  if (manifest !== null) {
    const { title, planHash } = manifest;
    return { folder: root, title, planHash, finished: true, cascades: [], processes, notices: [] };
  }
  const plan = planIn(root);
  if (plan === null) throw noBakeError(root);
  const { frames, notices } = toldOf(plan, journals);
  return {
    folder: root,
    title: plan.title,
    planHash: plan.hash,
    finished: false,
    cascades: cascadeStatuses(plan, root, frames),
    processes,
    notices,
  };
}

function cascadeStatuses(plan: Plan, root: string, entries: readonly FrameEntry[]): CascadeStatus[] {
  const there = entries.filter(({ files }) => files.every((file) => hasSize(root, file)));
  const done = new Set(there.map((entry) => frameKey(entry.kind, entry)));
  const progress = (kind: FrameEntry['kind'], cascade: number, total: number): Progress => {
    const frames = Array.from({ length: total }, (_, frame) => frame);
    const missing = frames.filter((frame) => !done.has(frameKey(kind, { cascade, frame })));
    return { total, missing: missing.map((frame) => frame + plan.loop.firstFrame) };
  };
  return plan.cascades.map(({ id, loop, foam }, c) => ({
    id,
    frames: progress('frame', c, loop.frameCount),
    foam: foam === null ? null : progress('foam', c, loop.frameCount),
  }));
}

/** None where the process has not said who it is, or its first line is damaged. */
function processOf({ entries, changedMs }: JournalContents<JournalLine>): ProcessStatus[] {
  const begin = entries.find((line) => line.kind === 'begin');
  if (begin === undefined) return [];
  const { task, host, pid } = begin;
  const lastSignS = Math.max(0, (millisecondsSince1970() - changedMs) / 1000);
  const end = entries.find((line) => line.kind === 'end');
  const alive = host === HOST ? isAlive(pid) : lastSignS < SILENT_AFTER_S;
  return [
    {
      task,
      host,
      pid,
      state: end?.outcome ?? (alive ? 'running' : 'silent'),
      made: entries.filter(({ kind }) => kind === 'frame' || kind === 'foam').length,
      lastSignS,
    },
  ];
}
