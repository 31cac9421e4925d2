import { Worker } from 'node:worker_threads';
import { type ExitStatus, InternalError, LoopswellError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import { type Executor, type Job, type JobResult, jobName } from './jobs.ts';

/** What a worker is started with. Wave amplitudes are in shared memory: nothing is copied. */
export interface WorkerStart {
  readonly plan: Plan;
  readonly waves: readonly WaveAmplitudes[];
  readonly folder: string;
}

export type WorkerReply = { readonly result: JobResult } | { readonly failure: JobFailure };

/** An error as it crosses threads, where classes are lost. */
export interface JobFailure {
  readonly message: string;
  readonly exitStatus: ExitStatus | null;
  readonly stack: string | undefined;
}

interface Pending {
  readonly job: Job;
  readonly resolve: (result: JobResult) => void;
  readonly reject: (error: Error) => void;
}

/** One thread and the job it is on. A thread that died is replaced when the next job comes. */
interface Lane {
  worker: Worker | null;
  busy: Pending | null;
}

/** Runs jobs on worker threads, one job a thread at a time; whoever is free takes the next. */
export function threadExecutor(start: WorkerStart, threads: number): Executor {
  const script = new URL('./worker.js', import.meta.url);
  const queue: Pending[] = [];
  const lanes: Lane[] = Array.from({ length: threads }, () => ({ worker: null, busy: null }));

  function newWorker(lane: Lane): Worker {
    const worker = new Worker(script, { workerData: start });
    worker.on('message', (reply: WorkerReply) => {
      const done = lane.busy;
      lane.busy = null;
      if (done !== null) settle(done, reply);
      next(lane);
    });
    const died = (error: Error): void => {
      // Both events come for one death, and a lane that was closed or has a new thread does not care.
      if (lane.worker !== worker) return;
      const lost = lane.busy;
      lane.worker = null;
      lane.busy = null;
      lost?.reject(named(lost.job, { message: error.message, exitStatus: null, stack: error.stack }));
      next(lane);
    };
    worker.on('error', died);
    worker.on('exit', (code) => died(new Error(`its thread ended with code ${code}`)));
    return worker;
  }

  function next(lane: Lane): void {
    if (lane.busy !== null) return;
    const pending = queue.shift();
    if (pending === undefined) return;
    lane.busy = pending;
    lane.worker ??= newWorker(lane);
    lane.worker.postMessage(pending.job);
  }

  function settle(pending: Pending, reply: WorkerReply): void {
    if ('result' in reply) pending.resolve(reply.result);
    else pending.reject(named(pending.job, reply.failure));
  }

  function named(job: Job, failure: JobFailure): LoopswellError {
    const text = `${jobName(job, start.plan.loop.firstFrame)}: ${failure.message}`;
    const cause = new Error(failure.message);
    if (failure.stack !== undefined) cause.stack = failure.stack;
    return failure.exitStatus === null
      ? new InternalError(text, { cause })
      : new LoopswellError(text, failure.exitStatus, { cause });
  }

  return {
    width: threads,
    run: (job) =>
      new Promise((resolve, reject) => {
        queue.push({ job, resolve, reject });
        const idle = lanes.find(({ busy }) => busy === null);
        if (idle !== undefined) next(idle);
      }),
    async close() {
      const workers = lanes.map(({ worker }) => worker);
      for (const lane of lanes) lane.worker = null;
      await Promise.all(workers.map((worker) => worker?.terminate()));
    },
  };
}
