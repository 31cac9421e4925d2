import { UsageError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import type { Crew } from './crew.ts';
import type { FrameId, FrameJob } from './jobs.ts';
import type { FrameRange } from './options.ts';
import { runJobs } from './run-jobs.ts';

/** Makes the wanted frames that are not there yet. */
export async function makeFrames(crew: Crew, wanted: readonly FrameId[]): Promise<void> {
  const missing = wanted.filter((id) => !crew.finished.has('frame', id));
  let done = wanted.length - missing.length;
  crew.report('frames', done, wanted.length);
  const jobs = missing.map(({ cascade, frame }): FrameJob => ({ kind: 'frame', cascade, frame }));
  await runJobs(crew, jobs, () => crew.report('frames', ++done, wanted.length));
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
  const whole = Number.isInteger(range.first) && Number.isInteger(range.last);
  if (!whole || range.first > range.last || range.first < firstFrame || range.last > lastFrame) {
    throw new UsageError(
      `--frames ${range.first}-${range.last} is not within the loop's frames ${firstFrame}-${lastFrame}.`,
    );
  }
}
