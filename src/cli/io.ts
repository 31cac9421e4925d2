import { ReadWriteError } from '../errors.ts';

/** A stream to write to; a terminal has `isTTY`. */
export type OutputStream = NodeJS.WritableStream & { readonly isTTY?: boolean; readonly columns?: number };

/** All that a command touches outside itself, so that tests run commands in process. */
export interface ProgramIo {
  /** Results. */
  readonly stdout: OutputStream;
  /** Messages and progress. */
  readonly stderr: OutputStream;
  readonly env: Readonly<Record<string, string | undefined>>;
  /** Words that start this program again: for what others are to run. */
  readonly program: readonly string[];
  /** Runs a program to its end: its exit status, null where it cannot be run, and what it said. */
  readonly runProgram: (command: string) => {
    readonly status: number | null;
    readonly stdout: string;
    readonly stderr: string;
  };
  /** A clock that only goes forward, s. */
  readonly secondsNow: () => number;
  /** Calls back at each SIGINT and SIGTERM, instead of what the system would do; returns what ends that. */
  readonly onStopSignal: (listener: (signal: string) => void) => () => void;
  /** Ends the process at once. */
  readonly exitNow: (status: number) => void;
}

/** Whether a person looks at this stream as it is written. */
export function isTerminal(stream: OutputStream, env: ProgramIo['env']): boolean {
  return stream.isTTY === true && env.TERM !== 'dumb';
}

/**
 * Writes a result and waits until it is out. A reader that has gone away (`| head`) is no error.
 *
 * @throws ReadWriteError where it cannot be written, e.g. on a full disk
 */
export async function writeResult(stream: OutputStream, text: string): Promise<void> {
  const failure = await new Promise<NodeJS.ErrnoException | null>((resolve) => {
    stream.write(text, (error) => resolve(error ?? null));
  });
  if (failure === null || isReaderGone(failure)) return;
  throw new ReadWriteError(`The result cannot be written: ${failure.message}.`, { cause: failure });
}

/** Writes a message; where even that fails there is nobody left to tell. */
export function say(io: ProgramIo, text: string): void {
  io.stderr.write(`${text}\n`);
}

/**
 * Listens to errors of the streams, for good: Node ends the process for one that nobody listens to, and it comes after
 * the write. Failed results are dealt with where they are written.
 */
export function guardStreams(io: ProgramIo): void {
  for (const stream of [io.stdout, io.stderr]) {
    if (!stream.listeners('error').includes(ignore)) stream.on('error', ignore);
  }
}

function ignore(): void {}

function isReaderGone({ code }: NodeJS.ErrnoException): boolean {
  return code === 'EPIPE' || code === 'ERR_STREAM_DESTROYED';
}
