import { StoppedError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import { newJournal } from '../store/journal.ts';
import { removeOwnTemporaries } from '../store/temporaries.ts';
import { journalName, THIS_PROCESS } from '../store/temporary-name.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import { type FinishedWork, finishedWork } from './finished-work.ts';
import { inlineExecutor } from './inline-executor.ts';
import type { Executor, FrameResult } from './jobs.ts';
import type { Begin, End, JournalLine, LevelEntry } from './journal-entry.ts';
import type { BakeStage, RunOptions } from './options.ts';
import { WORK_FOLDER } from './paths.ts';
import { throwIfStopped } from './run-jobs.ts';
import type { RunTally } from './run-report.ts';
import { threadExecutor } from './thread-executor.ts';

/** What the stages of a run share. */
export interface Crew {
  readonly plan: Plan;
  /** Absolute path of the bake folder. */
  readonly folder: string;
  readonly executor: Executor;
  readonly finished: FinishedWork;
  readonly signal: AbortSignal | null;
  readonly report: (stage: BakeStage, done: number, total: number) => void;
  /** Whether no other run of this process is at work on the folder. */
  readonly alone: () => boolean;
  /** Writes a finished frame down. */
  readonly keep: (result: FrameResult) => void;
  /** Writes down that work begins: nothing is written into the folder before. */
  readonly begin: (task: string) => void;
  /** Writes a breaking level down. */
  readonly note: (line: LevelEntry) => void;
}

export interface CrewStart {
  readonly plan: Plan;
  /** None where no frames are made. */
  readonly waves: readonly WaveAmplitudes[];
  readonly folder: string;
  readonly threads: number;
  readonly options: RunOptions;
  readonly tally: RunTally;
}

/** Runs of this process by the folder they are at work on. A farm runs one; a program with the library may run more. */
const runsAt = new Map<string, number>();

/** Whether no run of this process is at work on a folder. */
export function isIdleAt(folder: string): boolean {
  return !runsAt.has(folder);
}

function countRun(folder: string, by: 1 | -1): void {
  const runs = (runsAt.get(folder) ?? 0) + by;
  if (runs === 0) runsAt.delete(folder);
  else runsAt.set(folder, runs);
}

/**
 * Lets `work` have threads and a journal, and puts everything away afterwards, however it ended: no thread runs on, no
 * file is left half written.
 */
export async function withCrew<T>(start: CrewStart, work: (crew: Crew) => Promise<T>): Promise<T> {
  const { plan, folder, options, tally } = start;
  const executor = executorOf(start);
  const journal = newJournal<JournalLine>(`${folder}/${WORK_FOLDER}`, journalName());
  const append = (line: Begin | LevelEntry | End): void => journal.append({ plan: plan.hash, ...line });
  let begun = false;
  const signal = options.signal ?? null;
  const crew: Crew = {
    plan,
    folder,
    executor,
    finished: finishedWork(),
    signal,
    alone: () => runsAt.get(folder) === 1,
    report: (stage, done, total) => options.onProgress?.({ stage, done, total }),
    keep(result) {
      const { seconds: _seconds, ...entry } = result;
      journal.append({ plan: plan.hash, ...entry });
      crew.finished.add(entry);
      tally.add(result);
    },
    begin(task) {
      begun = true;
      append({ kind: 'begin', task, ...THIS_PROCESS });
    },
    note: append,
  };
  const end = (outcome: End['outcome']): void => {
    if (begun) append({ kind: 'end', outcome });
  };
  const stop = (): void => executor.stop();
  signal?.addEventListener('abort', stop);
  if (signal?.aborted === true) stop();
  countRun(folder, 1);
  try {
    throwIfStopped(signal);
    const value = await work(crew);
    await executor.close();
    end('done');
    journal.close();
    return value;
  } catch (error) {
    await executor.close();
    tidyUp(() => end(error instanceof StoppedError ? 'stopped' : 'failed'));
    tidyUp(journal.close);
    if (begun && crew.alone()) tidyUp(() => removeOwnTemporaries(folder));
    throw error;
  } finally {
    countRun(folder, -1);
    signal?.removeEventListener('abort', stop);
  }
}

/** The run has failed already: that is the error to report. */
function tidyUp(step: () => void): void {
  try {
    step();
  } catch {
    // What is left undone here the next run does.
  }
}

function executorOf({ plan, waves, folder, threads, options }: CrewStart): Executor {
  const context = { plan, waves, folder, sync: options.sync === 'every-file' };
  return threads === 0 ? inlineExecutor(context) : threadExecutor(context, threads);
}
