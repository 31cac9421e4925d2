import pLimit from 'p-limit';
import { StoppedError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import type { FinishedWork } from './finished-work.ts';
import type { Executor, FrameResult, Job } from './jobs.ts';
import type { BakeStage } from './options.ts';

/** What the stages of a bake share. */
export interface Crew {
  readonly plan: Plan;
  /** Absolute path of the bake folder. */
  readonly folder: string;
  readonly executor: Executor;
  readonly finished: FinishedWork;
  readonly signal: AbortSignal | null;
  readonly report: (stage: BakeStage, done: number, total: number) => void;
  /** Writes finished frames down. */
  readonly keep: (results: readonly FrameResult[]) => void;
}

/** Jobs handed out at once for each thread: one being done and one waiting, so that no thread idles. */
const JOBS_PER_THREAD = 2;

/**
 * Has jobs done, a bounded number at a time. After a failure or a stop no further job is begun; those in flight finish
 * and are kept.
 *
 * @throws the first job's error; StoppedError after the crew's signal
 */
export async function runJobs<R>(
  crew: Crew,
  jobs: readonly Job[],
  keep: (result: R, job: Job) => void,
): Promise<void> {
  const limit = pLimit(JOBS_PER_THREAD * crew.executor.width);
  let failure: unknown = null;
  const runOne = async (job: Job): Promise<void> => {
    if (failure !== null || crew.signal?.aborted === true) return;
    try {
      keep((await crew.executor.run(job)) as R, job);
    } catch (error) {
      failure ??= error;
    }
  };
  await Promise.all(jobs.map((job) => limit(runOne, job)));
  if (failure !== null) throw failure;
  throwIfStopped(crew);
}

/** @throws StoppedError if the bake was told to stop */
export function throwIfStopped({ signal, folder }: Pick<Crew, 'signal' | 'folder'>): void {
  if (signal?.aborted === true) {
    throw new StoppedError(
      `Stopped early; what is finished is kept in ${folder}. Run the same command again to resume.`,
    );
  }
}
