import { EXIT_STATUS, type ExitStatus, InternalError, LoopswellError, StoppedError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import { type Job, jobName } from './jobs.ts';

/** An error as it crosses threads, where classes are lost. */
export interface JobFailure {
  readonly message: string;
  readonly exitStatus: ExitStatus | null;
  readonly stack: string | undefined;
}

/** Buffers that the system refuses, and a thread whose heap is full: the messages of V8 and the code of Node. */
const OUT_OF_MEMORY = /allocation failed|out of memory|could not allocate/i;
const OUT_OF_MEMORY_CODE = 'ERR_WORKER_OUT_OF_MEMORY';

/** An error as plain data. Running out of memory is the machine's limit, not our fault. */
export function jobFailure(error: unknown): JobFailure {
  if (!(error instanceof Error)) return { message: String(error), exitStatus: null, stack: undefined };
  const { message, stack } = error;
  if (error instanceof LoopswellError) return { message, exitStatus: error.exitStatus, stack };
  const code = 'code' in error ? error.code : null;
  if (code === OUT_OF_MEMORY_CODE || (error instanceof RangeError && OUT_OF_MEMORY.test(message))) {
    return {
      message: 'There is not enough memory. Use fewer threads, or free some memory.',
      exitStatus: EXIT_STATUS.unavailable,
      stack,
    };
  }
  return { message, exitStatus: null, stack };
}

/** The error of a job that failed; its message begins with the job's name. */
export function jobError(job: Job, { loop }: Pick<Plan, 'loop'>, failure: JobFailure): LoopswellError {
  if (failure.exitStatus === EXIT_STATUS.stopped) return droppedJob();
  const text = `${jobName(job, loop.firstFrame)}: ${failure.message}`;
  const cause = new Error(failure.message);
  if (failure.stack !== undefined) cause.stack = failure.stack;
  return failure.exitStatus === null
    ? new InternalError(text, { cause })
    : new LoopswellError(text, failure.exitStatus, { cause });
}

/** What a job ends with that was not done because the bake is to stop. */
export function droppedJob(): StoppedError {
  return new StoppedError('Dropped, because the bake was told to stop.');
}
