import { Worker } from 'node:worker_threads';
import { droppedJob, type JobFailure, jobError, jobFailure } from './job-failure.ts';
import type { JobContext } from './job-runner.ts';
import type { Executor, FrameResult, Job, JobResult } from './jobs.ts';

/** What a worker is started with. Wave amplitudes are in shared memory: nothing is copied. */
export interface WorkerStart extends JobContext {
  /** Int32Array of 1, shared: not 0 once the bake is to stop. */
  readonly stopFlag: Int32Array;
}

/** A worker's answers to a job: any number of frames, then one of the others. */
export type WorkerReply =
  | { readonly frame: FrameResult }
  | { readonly result: JobResult }
  | { readonly failure: JobFailure };

interface Pending {
  readonly job: Job;
  readonly keep: (result: FrameResult) => void;
  readonly resolve: (result: JobResult) => void;
  readonly reject: (error: Error) => void;
}

/** One thread and the job it is on. A thread that died is replaced when the next job comes. */
interface Lane {
  worker: Worker | null;
  busy: Pending | null;
}

/** Jobs still going this long after a stop are dropped, so that a process is gone within 5 s of being told, ms. */
const GRACE_MS = 3000;

/** Runs jobs on worker threads, one job a thread at a time; whoever is free takes the next. */
export function threadExecutor(context: JobContext, threads: number): Executor {
  const script = new URL('./worker.js', import.meta.url);
  const stopFlag = new Int32Array(new SharedArrayBuffer(4));
  const workerData: WorkerStart = { ...context, stopFlag };
  const queue: Pending[] = [];
  const lanes: Lane[] = Array.from({ length: threads }, () => ({ worker: null, busy: null }));
  let stopped = false;
  let patience: NodeJS.Timeout | undefined;

  function newWorker(lane: Lane): Worker {
    const worker = new Worker(script, { workerData });
    worker.on('message', (reply: WorkerReply) => take(lane, worker, reply));
    const died = (failure: JobFailure): void => {
      // Both events come for one death, and a lane that was closed or has a new thread does not care.
      if (lane.worker !== worker) return;
      lane.worker = null;
      free(lane, (lost) => lost.reject(jobError(lost.job, context.plan, failure)));
    };
    worker.on('error', (error) => died(jobFailure(error)));
    worker.on('exit', (code) =>
      died({ message: `its thread ended with code ${code}`, exitStatus: null, stack: undefined }),
    );
    return worker;
  }

  function take(lane: Lane, worker: Worker, reply: WorkerReply): void {
    if (lane.worker !== worker || lane.busy === null) return;
    const { job, keep } = lane.busy;
    if ('result' in reply) free(lane, ({ resolve }) => resolve(reply.result));
    else if ('failure' in reply)
      free(lane, ({ reject }) => reject(jobError(job, context.plan, reply.failure)));
    else {
      try {
        keep(reply.frame);
      } catch (error) {
        // The journal cannot be written: the thread's further frames would be of no use.
        void end(lane);
        free(lane, ({ reject }) => reject(error as Error));
      }
    }
  }

  /** Settles a lane's job and gives it the next. */
  function free(lane: Lane, settle: (pending: Pending) => void): void {
    const done = lane.busy;
    lane.busy = null;
    if (done !== null) settle(done);
    next(lane);
  }

  function next(lane: Lane): void {
    const pending = queue.shift();
    if (pending === undefined) return;
    lane.busy = pending;
    try {
      lane.worker ??= newWorker(lane);
      lane.worker.postMessage(pending.job);
    } catch (error) {
      // The system may have no further thread to give.
      lane.busy = null;
      pending.reject(jobError(pending.job, context.plan, jobFailure(error)));
    }
  }

  async function end(lane: Lane): Promise<void> {
    const { worker } = lane;
    lane.worker = null;
    await worker?.terminate();
  }

  function drop(): void {
    for (const pending of queue.splice(0)) pending.reject(droppedJob());
  }

  async function close(): Promise<void> {
    stopped = true;
    clearTimeout(patience);
    drop();
    await Promise.all(
      lanes.map(async (lane) => {
        await end(lane);
        free(lane, ({ reject }) => reject(droppedJob()));
      }),
    );
  }

  return {
    width: threads,
    run: (job, keep) =>
      new Promise((resolve, reject) => {
        if (stopped) return reject(droppedJob());
        queue.push({ job, keep, resolve, reject });
        const idle = lanes.find(({ busy }) => busy === null);
        if (idle !== undefined) next(idle);
      }),
    stop() {
      if (stopped) return;
      stopped = true;
      Atomics.store(stopFlag, 0, 1);
      drop();
      patience = setTimeout(close, GRACE_MS);
    },
    close,
  };
}
