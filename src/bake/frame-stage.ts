import { UsageError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import { type Crew, runJobs } from './crew.ts';
import type { FrameJob, FrameResult, SurveyedRules } from './jobs.ts';

/** Frames as file numbers, inclusive. */
export interface FrameRange {
  readonly first: number;
  readonly last: number;
}

/** Makes the frames that are not there yet: of all cascades, those in the range or all. */
export async function makeFrames(
  crew: Crew,
  rules: readonly SurveyedRules[],
  range: FrameRange | null,
): Promise<void> {
  const wanted = frameJobs(crew.plan, rules, range);
  const missing = wanted.filter(({ cascade, frame }) => !crew.finished.has('frame', cascade, frame));
  let done = wanted.length - missing.length;
  crew.report('frames', done, wanted.length);
  await runJobs<readonly FrameResult[]>(crew, missing, (results) => {
    crew.keep(results);
    done += results.length;
    crew.report('frames', done, wanted.length);
  });
}

/** All frame jobs of a plan, the frames of all cascades side by side. */
function frameJobs(
  plan: Plan,
  rules: readonly SurveyedRules[],
  range: FrameRange | null,
): readonly FrameJob[] {
  const { firstFrame } = plan.loop;
  const jobs = plan.cascades.flatMap(({ loop }, cascade) =>
    Array.from({ length: loop.frameCount }, (_, frame): FrameJob => {
      return { kind: 'frame', cascade, frame, surveyed: rules[cascade] };
    }),
  );
  return jobs
    .filter(
      ({ frame }) =>
        range === null || (frame + firstFrame >= range.first && frame + firstFrame <= range.last),
    )
    .sort((a, b) => a.frame - b.frame);
}

/**
 * Checks a range of frames against the loop.
 *
 * @throws UsageError where it is empty or outside
 */
export function requireFrameRange(plan: Plan, range: FrameRange | null): void {
  if (range === null) return;
  const { firstFrame, frameCount } = plan.loop;
  const lastFrame = firstFrame + frameCount - 1;
  if (range.first > range.last || range.first < firstFrame || range.last > lastFrame) {
    throw new UsageError(
      `--frames ${range.first}-${range.last} is not within the loop's frames ${firstFrame}-${lastFrame}.`,
    );
  }
}
