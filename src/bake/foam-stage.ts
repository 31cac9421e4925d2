import { type Crew, runJobs, throwIfStopped } from './crew.ts';
import { type FoamLevel, foamLevel } from './foam-level.ts';
import type { FoamJob, FrameResult } from './jobs.ts';

/**
 * Makes the foam of every cascade that has any, once all its frames are there.
 *
 * @returns the breaking level of each cascade; null where it has no foam
 */
export async function makeFoam(crew: Crew): Promise<readonly (FoamLevel | null)[]> {
  const foaming = crew.plan.cascades.filter(({ foam }) => foam !== null).length;
  // The search takes about ten rounds a cascade; the count is for the progress display only.
  let rounds = 0;
  const onRound = (): void => crew.report('foam-level', ++rounds, Math.max(rounds, 10 * foaming));
  const levels = await Promise.all(
    crew.plan.cascades.map(({ foam }, c) =>
      foam === null
        ? null
        : foamLevel(crew.plan, c, crew.executor, () => {
            throwIfStopped(crew);
            onRound();
          }),
    ),
  );

  const jobs = levels.flatMap((level, c) => (level === null ? [] : foamJobs(crew, c, level.breakingCode)));
  const total = crew.plan.cascades.reduce(
    (sum, { foam, loop }) => sum + (foam === null ? 0 : loop.frameCount),
    0,
  );
  let done = total - jobs.reduce((sum, { fromFrame, toFrame }) => sum + toFrame - fromFrame, 0);
  await runJobs<readonly FrameResult[]>(crew, jobs, (results) => {
    crew.keep(results);
    done += results.length;
    crew.report('foam', done, total);
  });
  return levels;
}

/**
 * Runs of frames that still lack foam, one a thread where possible. Each run is warmed up by a loop of its own, which
 * costs about a fifth of making the frames, so few long runs are best.
 */
function foamJobs(
  { plan, executor, finished }: Crew,
  cascade: number,
  breakingCode: number,
): readonly FoamJob[] {
  const { frameCount } = plan.cascades[cascade].loop;
  const length = Math.ceil(frameCount / executor.width);
  const jobs: FoamJob[] = [];
  let fromFrame = 0;
  for (let frame = 0; frame <= frameCount; frame++) {
    const lacking = frame < frameCount && !finished.has('foam', cascade, frame);
    if (lacking && frame - fromFrame < length) continue;
    if (frame > fromFrame) jobs.push({ kind: 'foam', cascade, fromFrame, toFrame: frame, breakingCode });
    fromFrame = lacking ? frame : frame + 1;
  }
  return jobs;
}
