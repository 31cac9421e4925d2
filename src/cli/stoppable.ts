import { EXIT_STATUS } from '../errors.ts';
import type { ProgramIo } from './io.ts';

/**
 * A second signal this soon is the first one over again, s: schedulers and terminals signal every process of a job, and
 * what started this one may pass it on as well.
 */
const ONE_REQUEST_S = 0.5;

/** Runs what can be stopped: the first signal asks it to, the second ends the process. */
export async function stoppable<T>(
  io: ProgramIo,
  onFirst: (signal: string) => void,
  run: (signal: AbortSignal) => Promise<T>,
): Promise<T> {
  const controller = new AbortController();
  let firstAtS = 0;
  const release = io.onStopSignal((signal) => {
    const nowS = io.secondsNow();
    if (!controller.signal.aborted) {
      firstAtS = nowS;
      onFirst(signal);
      controller.abort();
    } else if (nowS - firstAtS >= ONE_REQUEST_S) {
      io.exitNow(EXIT_STATUS.stopped);
    }
  });
  try {
    return await run(controller.signal);
  } finally {
    release();
  }
}
