import { framePath } from '../manifest/frame-path.ts';
import type { Plan } from '../plan/plan.ts';
import type { FrameId } from './jobs.ts';

/*
 * A bake folder holds the files of one plan. While a bake is unfinished, `.loopswell/` in it holds the plan, the
 * journals of the processes that work on it, and the scratch files of the foam; a finished bake has a manifest instead.
 */

export const MANIFEST_PATH = 'manifest.json';
export const RUN_PATH = 'run.json';
export const WORK_FOLDER = '.loopswell';
export const PLAN_PATH: string = `${WORK_FOLDER}/plan.json`;

const CODES_EXTENSION = '.codes';

/** Scratch file of one frame's J codes. */
export function codesPath(cascadeId: string, frame: number): string {
  return `${WORK_FOLDER}/${cascadeId}.${String(frame).padStart(5, '0')}${CODES_EXTENSION}`;
}

/** Whether a path is one of a scratch file. */
export function isCodesPath(path: string): boolean {
  return path.startsWith(`${WORK_FOLDER}/`) && path.endsWith(CODES_EXTENSION);
}

/** Paths of the files of one frame, in the order in which they are written: of its maps, or of its foam. */
export function expectedFiles(
  plan: Plan,
  kind: 'frame' | 'foam',
  { cascade: c, frame }: FrameId,
): readonly string[] {
  const cascade = plan.cascades[c];
  const paths = cascade.maps
    .filter(({ map }) => (map === 'foam') === (kind === 'foam'))
    .map(({ pattern }) => framePath(pattern, plan.loop.firstFrame + frame));
  if (kind === 'frame' && cascade.foam !== null) paths.push(codesPath(cascade.id, frame));
  return paths;
}
