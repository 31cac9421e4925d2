/** The exit statuses of the command line; every error class carries the one it leads to. */
export const EXIT_STATUS = {
  done: 0,
  verificationFailed: 1,
  usage: 64,
  badInput: 65,
  unavailable: 69,
  internal: 70,
  cannotCreate: 73,
  readWrite: 74,
  stopped: 75,
} as const;

export type ExitStatus = (typeof EXIT_STATUS)[keyof typeof EXIT_STATUS];

/** The root of every error this package raises on purpose: a message for a person and an exit status. */
export class LoopswellError extends Error {
  readonly exitStatus: ExitStatus;

  constructor(message: string, exitStatus: ExitStatus, options?: ErrorOptions) {
    super(message, options);
    this.name = new.target.name;
    this.exitStatus = exitStatus;
  }
}

/** The command line itself is wrong (64). */
export class UsageError extends LoopswellError {
  constructor(message: string, options?: ErrorOptions) {
    super(message, EXIT_STATUS.usage, options);
  }
}

/** One thing wrong with an input file: where it is, what was expected, what was found, what to do. */
export interface InputProblem {
  /** Path inside the document, e.g. `systems[0].peakPeriod`; empty for the document as a whole. */
  readonly path: string;
  /** Line and column counted from 1; 0 where the input has no text (a sea built in memory). */
  readonly line: number;
  readonly column: number;
  readonly expected: string;
  readonly found: string;
  /** What the user can do about it. */
  readonly remedy: string;
}

/** A sea file, plan, manifest or bake cannot be used (65). All its problems are reported at once. */
export class InputError extends LoopswellError {
  /** The file's name, or `<sea>` for one built in memory. */
  readonly source: string;
  readonly problems: readonly InputProblem[];

  constructor(source: string, problems: readonly InputProblem[], options?: ErrorOptions) {
    const lines = problems.map((problem) => inputProblemText(source, problem));
    const head = problems.length === 1 ? '' : `${problems.length} problems in ${source}\n`;
    super(head + lines.join('\n'), EXIT_STATUS.badInput, options);
    this.source = source;
    this.problems = problems;
  }
}

function inputProblemText(source: string, problem: InputProblem): string {
  const place = problem.line > 0 ? `${source}:${problem.line}:${problem.column}` : source;
  const path = problem.path === '' ? '' : ` ${problem.path}:`;
  return `${place}:${path} expected ${problem.expected}, found ${problem.found}. ${problem.remedy}`;
}

/** Asked for what this machine cannot do: memory, disk space, an engine (69). */
export class UnavailableError extends LoopswellError {
  constructor(message: string, options?: ErrorOptions) {
    super(message, EXIT_STATUS.unavailable, options);
  }
}

/** A bug of ours (70). */
export class InternalError extends LoopswellError {
  constructor(message: string, options?: ErrorOptions) {
    super(message, EXIT_STATUS.internal, options);
  }
}

/** The output folder or file cannot be created (73). */
export class CannotCreateError extends LoopswellError {
  constructor(message: string, options?: ErrorOptions) {
    super(message, EXIT_STATUS.cannotCreate, options);
  }
}

/** A read or a write failed (74). */
export class ReadWriteError extends LoopswellError {
  constructor(message: string, options?: ErrorOptions) {
    super(message, EXIT_STATUS.readWrite, options);
  }
}

/** Stopped early by a signal; running the same command again resumes (75). */
export class StoppedError extends LoopswellError {
  constructor(message: string, options?: ErrorOptions) {
    super(message, EXIT_STATUS.stopped, options);
  }
}
