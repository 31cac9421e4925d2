import { InputError, type InputProblem } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import type { FinishedWork } from './finished-work.ts';
import type { FrameId } from './jobs.ts';
import { PLAN_PATH } from './paths.ts';
import { wantedFrames } from './shard.ts';

/** Frames of a plan that are not finished. */
export function missingFrames(plan: Plan, finished: Pick<FinishedWork, 'has'>): readonly FrameId[] {
  return wantedFrames(plan, null, null).filter((id) => !finished.has('frame', id));
}

/**
 * The error that names missing frames and the command that makes them.
 *
 * @param folder the bake folder
 * @param missing at least one
 */
export function missingFramesError(plan: Plan, folder: string, missing: readonly FrameId[]): InputError {
  const { firstFrame } = plan.loop;
  const problems = plan.cascades.flatMap(({ id, loop }, c): InputProblem[] => {
    const frames = missing.filter(({ cascade }) => cascade === c).map(({ frame }) => frame + firstFrame);
    if (frames.length === 0) return [];
    return [
      {
        path: id,
        line: 0,
        column: 0,
        expected: `whole frames ${firstFrame}-${firstFrame + loop.frameCount - 1}`,
        found: `${frames.length} missing or damaged: ${frameRuns(frames)}`,
        remedy: `Make them: ${commandToMake(plan, folder, missing)}`,
      },
    ];
  });
  return new InputError(folder, problems);
}

/** A command that makes exactly what is missing: a run of frames where they are one, else whatever is missing. */
function commandToMake({ loop: { firstFrame } }: Plan, folder: string, missing: readonly FrameId[]): string {
  const frames = [...new Set(missing.map(({ frame }) => frame + firstFrame))].sort((a, b) => a - b);
  const [first, last] = [frames[0], frames[frames.length - 1]];
  const part = last - first + 1 === frames.length ? `--frames ${first}-${last}` : '--shard 1/1';
  return `loopswell bake ${quoted(`${folder}/${PLAN_PATH}`)} -o ${quoted(folder)} ${part}`;
}

/** `3, 7-12, 40`; of many runs the first few. */
export function frameRuns(sorted: readonly number[]): string {
  const runs: [number, number][] = [];
  for (const frame of sorted) {
    const last = runs.at(-1);
    if (last !== undefined && frame === last[1] + 1) last[1] = frame;
    else runs.push([frame, frame]);
  }
  const shown = runs
    .slice(0, MOST_RUNS)
    .map(([first, last]) => (first === last ? `${first}` : `${first}-${last}`));
  return shown.join(', ') + (runs.length > MOST_RUNS ? ', …' : '');
}

const MOST_RUNS = 12;

/** An argument as a shell takes it. */
export function quoted(argument: string): string {
  return /^[A-Za-z0-9_./:@%+=,-]+$/.test(argument) ? argument : `'${argument.replaceAll("'", "'\\''")}'`;
}
