import { InvalidArgumentError, Option } from 'commander';
import { BAKE_DEFAULTS, machineThreads, type RunOptions, SYNC_POLICIES } from '../index.ts';
import { type ProgramIo, say } from './io.ts';
import { progressDisplay } from './progress.ts';
import { stoppable } from './stoppable.ts';

/** More threads than any machine has are a slip of the finger. */
const MOST_THREADS = 1024;

/** `--threads`, of every command that works on a bake. */
export function threadsOption(): Option {
  return new Option('--threads <n>', 'worker threads; 0 works in the main thread')
    .argParser(threadCount)
    .default(BAKE_DEFAULTS.threads ?? machineThreads(), `${machineThreads()}, all of this machine`);
}

/** `--sync`: when to wait for the disk. */
export function syncOption(): Option {
  return new Option(
    '--sync <when>',
    'wait until the disk itself has the manifest and journals, or every file',
  )
    .choices(SYNC_POLICIES)
    .default(BAKE_DEFAULTS.sync);
}

function threadCount(text: string): number {
  const count = Number(text);
  if (/^\d+$/.test(text) && count <= MOST_THREADS) return count;
  throw new InvalidArgumentError(`Expected a whole number from 0 to ${MOST_THREADS}.`);
}

/**
 * Runs what works on a bake folder: shows how far it is, passes on what it has to say, and stops it at a signal.
 *
 * @param quiet whether to say nothing
 */
export async function watchedRun<T>(
  io: ProgramIo,
  quiet: boolean,
  run: (watch: Required<Pick<RunOptions, 'signal' | 'onProgress' | 'onNotice'>>) => Promise<T>,
): Promise<T> {
  const progress = await progressDisplay(io, quiet);
  const announce = (signal: string): void => {
    progress.end();
    say(io, `${signal}: stopping after the frames in flight; once more stops at once.`);
  };
  const onNotice = (notice: string): void => {
    if (!quiet) say(io, notice);
  };
  return stoppable(io, announce, async (signal) => {
    try {
      return await run({ signal, onProgress: progress.update, onNotice });
    } finally {
      progress.end();
    }
  });
}
