import { parentPort, workerData } from 'node:worker_threads';
import { droppedJob, jobFailure } from './job-failure.ts';
import { jobRunner } from './job-runner.ts';
import type { Job } from './jobs.ts';
import type { WorkerReply, WorkerStart } from './thread-executor.ts';

/** The body of a worker thread: one job in, its frames as they are done and one last reply out. */
const { stopFlag, ...context } = workerData as WorkerStart;
const runJob = jobRunner(context);
const reply = (message: WorkerReply): void => parentPort?.postMessage(message);

parentPort?.on('message', (job: Job) => {
  try {
    const steps = runJob(job);
    for (;;) {
      if (Atomics.load(stopFlag, 0) !== 0) throw droppedJob();
      const step = steps.next();
      if (step.done === true) return reply({ result: step.value });
      reply({ frame: step.value });
    }
  } catch (error) {
    reply({ failure: jobFailure(error) });
  }
});
