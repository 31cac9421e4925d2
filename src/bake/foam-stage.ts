import type { Crew } from './crew.ts';
import { type FoamLevel, foamLevel } from './foam-level.ts';
import type { FoamJob, FrameId } from './jobs.ts';
import type { LevelEntry } from './journal-entry.ts';
import type { Part } from './options.ts';
import { runJobs } from './run-jobs.ts';
import { foamRun } from './shard.ts';

/**
 * Finds the breaking level of every cascade that foams, once all its frames are there. What an earlier run found is
 * taken over: a level follows from the frames alone.
 *
 * @returns by cascade; null where it has no foam
 */
export async function findLevels(
  crew: Crew,
  found: readonly LevelEntry[],
): Promise<readonly (FoamLevel | null)[]> {
  const foaming = crew.plan.cascades.filter(({ foam }) => foam !== null).length;
  // The search takes about ten rounds a cascade; the count is for the progress display only.
  let rounds = 0;
  const onRound = (): void => crew.report('foam-level', ++rounds, Math.max(rounds, 10 * foaming));
  const levels: (FoamLevel | null)[] = [];
  for (const [c, { foam }] of crew.plan.cascades.entries()) {
    const known = found.find(({ cascade }) => cascade === c);
    if (foam === null || known !== undefined) {
      levels.push(foam === null ? null : (known ?? null));
      continue;
    }
    const level = await foamLevel(crew, c, onRound);
    crew.note({ kind: 'level', cascade: c, ...level });
    levels.push(level);
  }
  return levels;
}

/**
 * Makes the foam frames that are not there yet, of all or of one part.
 *
 * @param isLacking whether a frame's foam is to be made
 */
export async function makeFoam(
  crew: Crew,
  levels: readonly (FoamLevel | null)[],
  part: Part | null,
  isLacking: (id: FrameId) => boolean = (id) => !crew.finished.has('foam', id),
): Promise<void> {
  const jobs = levels.flatMap((level, cascade) => {
    if (level === null) return [];
    const [from, to] = foamRun(crew.plan.cascades[cascade].loop.frameCount, part ?? { index: 1, count: 1 });
    const lacking = Array.from({ length: to - from }, (_, i) => from + i).filter((frame) =>
      isLacking({ cascade, frame }),
    );
    return foamRuns(lacking, Math.ceil((to - from) / crew.executor.width)).map(
      ([fromFrame, toFrame]): FoamJob => ({
        kind: 'foam',
        cascade,
        fromFrame,
        toFrame,
        breakingCode: level.breakingCode,
      }),
    );
  });
  const total = jobs.reduce((sum, { fromFrame, toFrame }) => sum + toFrame - fromFrame, 0);
  let done = 0;
  const counting: Crew = {
    ...crew,
    keep(result) {
      crew.keep(result);
      crew.report('foam', ++done, total);
    },
  };
  await runJobs(counting, jobs, () => {});
}

/**
 * Runs [from, to) of neighbouring frames, none longer than `longest`. Each run is warmed up by a loop of its own, which
 * costs about a fifth of making the frames, so few long runs are best.
 *
 * @param frames in order
 */
function foamRuns(frames: readonly number[], longest: number): readonly (readonly [number, number])[] {
  const runs: [number, number][] = [];
  for (const frame of frames) {
    const run = runs.at(-1);
    if (run !== undefined && frame === run[1] && run[1] - run[0] < longest) run[1]++;
    else runs.push([frame, frame + 1]);
  }
  return runs;
}
