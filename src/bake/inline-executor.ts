import { otherTurns } from './clock.ts';
import { droppedJob, jobError, jobFailure } from './job-failure.ts';
import { type JobContext, jobRunner } from './job-runner.ts';
import type { Executor } from './jobs.ts';

/** Runs jobs in the calling thread, one after the other: for tests and for embedding where threads are not wanted. */
export function inlineExecutor(context: JobContext): Executor {
  const runJob = jobRunner(context);
  let stopped = false;
  return {
    width: 1,
    async run(job, keep) {
      try {
        const steps = runJob(job);
        for (;;) {
          await otherTurns();
          if (stopped) throw droppedJob();
          const step = steps.next();
          if (step.done === true) return step.value;
          keep(step.value);
        }
      } catch (error) {
        throw jobError(job, context.plan, jobFailure(error));
      }
    },
    stop() {
      stopped = true;
    },
    async close() {},
  };
}
