import { SingleBar } from 'cli-progress';
import type { ProgramIo } from './io.ts';
import { paceOf, paceWords, type ShownStage, STAGE_WORDS } from './pace.ts';
import type { ProgressDisplay } from './progress.ts';

/** A bar on a terminal, one a stage, cleared when the bake is done. */
export function progressBar(io: ProgramIo): ProgressDisplay {
  const bar = new SingleBar({
    stream: io.stderr,
    format: '{stage} [{bar}] {value}/{total}{pace}',
    barsize: 30,
    barCompleteChar: '#',
    barIncompleteChar: '.',
    clearOnComplete: true,
    // Signals are the command's own business.
    gracefulExit: false,
  });
  let stage: ShownStage | null = null;
  let pace = paceOf({ timeS: 0, done: 0 });
  let ended = false;
  return {
    update({ stage: current, done, total }) {
      if (ended) return;
      const now = { timeS: io.secondsNow(), done };
      if (current !== stage) {
        if (stage !== null) bar.stop();
        stage = current;
        pace = paceOf(now);
        bar.start(total, done, { stage: STAGE_WORDS[stage], pace: '' });
        return;
      }
      bar.setTotal(total);
      bar.update(done, { pace: paceWords(pace(now, total)) });
    },
    end() {
      if (!ended && stage !== null) bar.stop();
      ended = true;
    },
  };
}
