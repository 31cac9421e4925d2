import pLimit from 'p-limit';
import { LoopswellError, StoppedError } from '../errors.ts';
import type { Crew } from './crew.ts';
import { type Job, type JobResult, jobName } from './jobs.ts';

/** Jobs handed out at once for each thread: one being done and one waiting, so that no thread idles. */
const JOBS_PER_THREAD = 2;

/** A frame that fails does not keep the others from being made; where this many fail it is not the frames. */
const MOST_FAILURES = 4;

/**
 * Has jobs done, a bounded number at a time. A job that fails does not keep the others from being done, up to a few;
 * after a stop no further job is begun.
 *
 * @param done what to do with a job's result
 * @throws the first job's error, which names the others; StoppedError after the crew's signal
 */
export async function runJobs<J extends Job, R extends JobResult>(
  crew: Crew,
  jobs: readonly J[],
  done: (result: R, job: J) => void,
): Promise<void> {
  const limit = pLimit(JOBS_PER_THREAD * crew.executor.width);
  const failures: { readonly job: J; readonly error: unknown }[] = [];
  const runOne = async (job: J): Promise<void> => {
    if (failures.length >= MOST_FAILURES || crew.signal?.aborted === true) return;
    try {
      done((await crew.executor.run(job, crew.keep)) as R, job);
    } catch (error) {
      if (!(error instanceof StoppedError)) failures.push({ job, error });
    }
  };
  await Promise.all(jobs.map((job) => limit(runOne, job)));
  if (failures.length > 0) throw failureOf(crew, failures);
  throwIfStopped(crew.signal);
}

/** The first failure; of several, with the names of the jobs. */
function failureOf(crew: Crew, failures: readonly { readonly job: Job; readonly error: unknown }[]): unknown {
  const [{ error }] = failures;
  if (failures.length === 1 || !(error instanceof LoopswellError)) return error;
  const names = failures.map(({ job }) => jobName(job, crew.plan.loop.firstFrame)).join(', ');
  const gaveUp = failures.length >= MOST_FAILURES ? ' The rest was not tried.' : '';
  return new LoopswellError(
    `${error.message}\n${failures.length} failed: ${names}.${gaveUp}`,
    error.exitStatus,
    {
      cause: error,
    },
  );
}

/** @throws StoppedError if the run was told to stop */
export function throwIfStopped(signal: AbortSignal | null): void {
  if (signal?.aborted !== true) return;
  throw new StoppedError('Stopped early; what is finished is kept. Run the same command again to resume.');
}
