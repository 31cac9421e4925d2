import { InputError, type InputProblem } from '../errors.ts';
import { quoted } from '../farm/shell.ts';
import type { Plan } from '../plan/plan.ts';
import type { FinishedWork } from './finished-work.ts';
import type { FrameId } from './jobs.ts';
import { MANIFEST_PATH, PLAN_PATH } from './paths.ts';
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

function folderError(
  folder: string,
  problem: Pick<InputProblem, 'expected' | 'found' | 'remedy'>,
): InputError {
  return new InputError(folder, [{ path: '', line: 0, column: 0, ...problem }]);
}

/** @returns the error of a folder without a bake */
export function noBakeError(folder: string): InputError {
  return folderError(folder, {
    expected: 'the folder of a bake',
    found: `neither ${MANIFEST_PATH} nor ${PLAN_PATH}`,
    remedy: 'Give the folder that the shards were baked into.',
  });
}

/** @returns the error of a plan that no bake can have written */
export function unresolvedError(folder: string): InputError {
  return folderError(folder, {
    expected: `all ranges known in ${PLAN_PATH}`,
    found: 'a range that is still to be surveyed',
    remedy: 'The plan was not written by a bake: plan the sea anew and bake it.',
  });
}

/** The error that names damaged files of a finished bake. */
export function damagedError(folder: string, damaged: readonly string[]): InputError {
  const more = damaged.length > 3 ? ` and ${damaged.length - 3} more` : '';
  return folderError(folder, {
    expected: 'the files that its manifest names',
    found: `${damaged.length} missing or damaged: ${damaged.slice(0, 3).join(', ')}${more}`,
    remedy:
      'Run the bake of its sea or saved plan again with the same folder: it makes only what is damaged.',
  });
}
