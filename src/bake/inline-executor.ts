import { InternalError, LoopswellError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import { jobRunner } from './job-runner.ts';
import { type Executor, jobName } from './jobs.ts';

/** Runs jobs in the calling thread, one after the other: for tests and for embedding where threads are not wanted. */
export function inlineExecutor(plan: Plan, waves: readonly WaveAmplitudes[], folder: string): Executor {
  const runJob = jobRunner(plan, waves, folder);
  return {
    width: 1,
    async run(job) {
      try {
        return runJob(job);
      } catch (error) {
        const text = `${jobName(job, plan.loop.firstFrame)}: ${(error as Error).message}`;
        if (error instanceof LoopswellError)
          throw new LoopswellError(text, error.exitStatus, { cause: error });
        throw new InternalError(text, { cause: error });
      }
    },
    async close() {},
  };
}
