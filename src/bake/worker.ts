import { parentPort, workerData } from 'node:worker_threads';
import { LoopswellError } from '../errors.ts';
import { jobRunner } from './job-runner.ts';
import type { Job } from './jobs.ts';
import type { JobFailure, WorkerReply, WorkerStart } from './thread-executor.ts';

/** The body of a worker thread: one job in, one reply out. */
const { plan, waves, folder } = workerData as WorkerStart;
const runJob = jobRunner(plan, waves, folder);

parentPort?.on('message', (job: Job) => parentPort?.postMessage(reply(job)));

function reply(job: Job): WorkerReply {
  try {
    return { result: runJob(job) };
  } catch (error) {
    return { failure: jobFailure(error) };
  }
}

function jobFailure(error: unknown): JobFailure {
  if (!(error instanceof Error)) return { message: String(error), exitStatus: null, stack: undefined };
  const exitStatus = error instanceof LoopswellError ? error.exitStatus : null;
  return { message: error.message, exitStatus, stack: error.stack };
}
