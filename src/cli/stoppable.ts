import { EXIT_STATUS } from '../errors.ts';
import type { ProgramIo } from './io.ts';

/** Runs what can be stopped: the first signal asks it to, the second ends the process. */
export async function stoppable<T>(
  io: ProgramIo,
  onFirst: (signal: string) => void,
  run: (signal: AbortSignal) => Promise<T>,
): Promise<T> {
  const controller = new AbortController();
  const release = io.onStopSignal((signal) => {
    if (controller.signal.aborted) io.exitNow(EXIT_STATUS.stopped);
    onFirst(signal);
    controller.abort();
  });
  try {
    return await run(controller.signal);
  } finally {
    release();
  }
}
