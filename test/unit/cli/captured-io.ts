import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Writable } from 'node:stream';
import type { OutputStream, ProgramIo } from '../../../src/cli/io.ts';
import { run } from '../../../src/cli/program.ts';

/** A stream that keeps what is written to it. */
export class CapturedStream extends Writable {
  text = '';
  readonly isTTY: boolean;
  readonly columns = 80;
  /** Code of the error that every write ends in, e.g. `EPIPE`. */
  readonly #failure: string | null;

  constructor({ isTTY = false, failure = null }: { isTTY?: boolean; failure?: string | null } = {}) {
    super({ decodeStrings: false });
    this.isTTY = isTTY;
    this.#failure = failure;
  }

  override _write(chunk: string | Uint8Array, _encoding: string, done: (error?: Error) => void): void {
    if (this.#failure !== null) {
      done(Object.assign(new Error(`write ${this.#failure}`), { code: this.#failure }));
      return;
    }
    this.text += typeof chunk === 'string' ? chunk : new TextDecoder().decode(chunk);
    done();
  }
}

export interface CapturedOptions {
  readonly stdout?: OutputStream & { readonly text: string };
  readonly stderr?: OutputStream & { readonly text: string };
  readonly env?: ProgramIo['env'];
  /** What a program that is run answers; default: there is none. */
  readonly runProgram?: ProgramIo['runProgram'];
  /** Called for the time, s; default a clock that stands still. */
  readonly secondsNow?: () => number;
}

export interface CapturedIo extends ProgramIo {
  readonly stdout: OutputStream & { readonly text: string };
  readonly stderr: OutputStream & { readonly text: string };
  /** Sends a stop signal; false where nobody listens. */
  readonly signal: (name: string) => boolean;
  /** Statuses given to `exitNow`. */
  readonly exits: readonly number[];
}

/** The outside world in memory. */
export function capturedIo(options: CapturedOptions = {}): CapturedIo {
  const listeners = new Set<(signal: string) => void>();
  const exits: number[] = [];
  return {
    stdout: options.stdout ?? new CapturedStream(),
    stderr: options.stderr ?? new CapturedStream(),
    env: options.env ?? {},
    program: ['loopswell'],
    runProgram: options.runProgram ?? (() => ({ status: null, stdout: '', stderr: '' })),
    secondsNow: options.secondsNow ?? (() => 0),
    onStopSignal(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    exitNow: (status) => exits.push(status),
    signal(name) {
      for (const listener of listeners) listener(name);
      return listeners.size > 0;
    },
    exits,
  };
}

export interface Outcome {
  readonly status: number;
  readonly stdout: string;
  readonly stderr: string;
}

/** Runs a command line in process. */
export async function outcomeOf(argv: readonly string[], io: CapturedIo = capturedIo()): Promise<Outcome> {
  const status = await run(argv, io);
  return { status, stdout: io.stdout.text, stderr: io.stderr.text };
}

/** Calls back with a new folder, which is removed afterwards. */
export async function inNewFolder<T>(use: (folder: string) => Promise<T>): Promise<T> {
  const folder = mkdtempSync(join(tmpdir(), 'loopswell-cli-'));
  try {
    return await use(folder);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
