import { EXIT_STATUS, type ExitStatus, LoopswellError } from '../errors.ts';
import { coloursOf } from './colours.ts';
import { type ProgramIo, say } from './io.ts';

/**
 * Tells of an error: its message alone, which says what to do. What is our fault asks to be reported.
 *
 * @param debug whether to print where it happened as well
 * @returns the exit status it leads to
 */
export function reportFailure(io: ProgramIo, error: unknown, debug: boolean): ExitStatus {
  const { error: red } = coloursOf(io.stderr, io.env);
  const exitStatus = error instanceof LoopswellError ? error.exitStatus : EXIT_STATUS.internal;
  const message = error instanceof Error ? error.message : String(error);
  if (exitStatus === EXIT_STATUS.internal) {
    const hint = debug ? '' : ' and what --debug adds';
    say(
      io,
      `${red('error:')} ${oneLine(message)} This is our fault: please report it with your command${hint}.`,
    );
  } else {
    say(io, exitStatus === EXIT_STATUS.stopped ? message : `${red('error:')} ${message}`);
  }
  if (debug) say(io, stackText(error));
  return exitStatus;
}

function oneLine(message: string): string {
  const line = message.replaceAll(/\s+/g, ' ').trim();
  return /[.!?]$/.test(line) ? line : `${line}.`;
}

/** The stack, and those of the errors it came from. */
function stackText(error: unknown): string {
  if (!(error instanceof Error)) return String(error);
  const own = error.stack ?? error.message;
  return error.cause === undefined ? own : `${own}\ncaused by ${stackText(error.cause)}`;
}
