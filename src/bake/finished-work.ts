import type { Crew } from './crew.ts';
import type { CheckJob, CheckResult, FrameId, WrittenFile } from './jobs.ts';
import type { FrameEntry } from './journal-entry.ts';
import { runJobs } from './run-jobs.ts';

/** Which frames of a bake are done, and what was written in them. */
export interface FinishedWork {
  has(kind: FrameEntry['kind'], id: FrameId): boolean;
  add(entry: FrameEntry): void;
  /** All entries, by cascade, kind and frame: an order that does not depend on who finished first. */
  entries(): readonly FrameEntry[];
}

export function finishedWork(): FinishedWork {
  const done = new Map<string, FrameEntry>();
  return {
    has: (kind, id) => done.has(frameKey(kind, id)),
    add: (entry) => done.set(frameKey(entry.kind, entry), entry),
    entries: () =>
      [...done.values()].sort(
        (a, b) => a.cascade - b.cascade || order(a.kind) - order(b.kind) || a.frame - b.frame,
      ),
  };
}

function order(kind: FrameEntry['kind']): number {
  return kind === 'frame' ? 0 : 1;
}

/** One frame's maps, or its foam, as the key of a table. */
export function frameKey(kind: FrameEntry['kind'], { cascade, frame }: FrameId): string {
  return `${kind} ${cascade} ${frame}`;
}

/** Files of one job of checking: enough to be worth handing to a thread, few enough to stop soon. */
const JOB_BYTES = 64e6;
const JOB_GROUPS = 64;

/**
 * Takes up what journals tell of, as far as it can be trusted: an entry counts only while each of its files hashes to
 * what the journal says.
 *
 * @param entries of all journals, in any order; of two that tell of the same frame, either will do
 */
export async function takeStock(crew: Crew, entries: readonly FrameEntry[]): Promise<void> {
  const intact = await intactGroups(
    crew,
    entries.map(({ files }) => files),
  );
  entries.forEach((entry, i) => {
    if (intact[i]) crew.finished.add(entry);
  });
}

/** For each group of files whether all of them are what they should be. */
export async function intactGroups(
  crew: Crew,
  groups: readonly (readonly WrittenFile[])[],
): Promise<readonly boolean[]> {
  const jobs: CheckJob[] = [];
  let batch: (readonly WrittenFile[])[] = [];
  let bytes = 0;
  for (const [i, group] of groups.entries()) {
    batch.push(group);
    for (const file of group) bytes += file.bytes;
    if (bytes < JOB_BYTES && batch.length < JOB_GROUPS && i < groups.length - 1) continue;
    jobs.push({ kind: 'check', groups: batch });
    [batch, bytes] = [[], 0];
  }
  const results = new Map<CheckJob, readonly boolean[]>();
  let done = 0;
  await runJobs<CheckJob, CheckResult>(crew, jobs, ({ intact }, job) => {
    results.set(job, intact);
    done += job.groups.length;
    crew.report('check', done, groups.length);
  });
  return jobs.flatMap((job) => results.get(job) ?? []);
}
