import { isTerminal, type ProgramIo, say } from './io.ts';
import { paceOf, paceWords, type ShownStage, STAGE_WORDS } from './pace.ts';

/** How far a stage is. */
export interface ShownProgress {
  readonly stage: ShownStage;
  readonly done: number;
  readonly total: number;
}

/** Shows how far a bake or a verification is. */
export interface ProgressDisplay {
  readonly update: (progress: ShownProgress) => void;
  /** Ends the display; later updates are not shown. May be called twice. */
  readonly end: () => void;
}

/** Off a terminal one line says how far it is, this often, s. */
const LINE_EVERY_S = 30;

/** How progress is shown here: a bar on a terminal, else a line now and then, or not at all. */
export async function progressDisplay(io: ProgramIo, quiet: boolean): Promise<ProgressDisplay> {
  if (quiet) return { update() {}, end() {} };
  if (!isTerminal(io.stderr, io.env)) return progressLines(io);
  const { progressBar } = await import('./progress-bar.ts');
  return progressBar(io);
}

/** Lines for a log: nothing in the first half minute. */
export function progressLines(io: ProgramIo): ProgressDisplay {
  let stage: ShownStage | null = null;
  let pace = paceOf({ timeS: 0, done: 0 });
  let lastLine = io.secondsNow();
  let ended = false;
  return {
    update(progress) {
      const now = { timeS: io.secondsNow(), done: progress.done };
      if (progress.stage !== stage) {
        stage = progress.stage;
        pace = paceOf(now);
      }
      if (ended || now.timeS - lastLine < LINE_EVERY_S) return;
      lastLine = now.timeS;
      say(
        io,
        `${STAGE_WORDS[stage]} ${progress.done}/${progress.total}${paceWords(pace(now, progress.total))}`,
      );
    },
    end() {
      ended = true;
    },
  };
}
