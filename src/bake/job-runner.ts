import { sha256 } from '../hash.ts';
import type { ChannelStatistics } from '../maps/encoded-map.ts';
import { heightSums } from '../maps/height-sums.ts';
import type { PowerSums } from '../math/statistics.ts';
import { isSurveyed } from '../plan/encodings.ts';
import type { CascadeFoam, Plan, PlannedCascade } from '../plan/plan.ts';
import type { MapName } from '../sea/sea.ts';
import { writeFileAtomic } from '../store/atomic-file.ts';
import { isIntact } from '../store/bake-folder.ts';
import { fillFromFiles } from '../store/scratch.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import { type CascadeMaker, cascadeMakers } from './cascade-maker.ts';
import { secondsNow } from './clock.ts';
import { encodedFile } from './encoded-file.ts';
import { type CodeReader, type FoamBuffers, foamBuffers, foamImages, foamSums } from './foam-loop.ts';
import type {
  FoamJob,
  FoamMeasureJob,
  FrameJob,
  FrameResult,
  Job,
  JobResult,
  Stage,
  SurveyJob,
  WrittenFile,
} from './jobs.ts';
import { codesPath } from './paths.ts';

/** What jobs are done with. */
export interface JobContext {
  readonly plan: Plan;
  /** Wave amplitudes in the order of the plan's cascades, read only; none where no frames are made. */
  readonly waves: readonly WaveAmplitudes[];
  /** The bake folder, absolute; its cascades' folders are there. */
  readonly folder: string;
  /** Wait for the disk after every file. */
  readonly sync: boolean;
}

/**
 * Does jobs of one bake in the calling thread. Buffers of a cascade are made when its first job comes and kept.
 *
 * @returns what does a job: it yields every frame whose files are in place, so that whoever drives it can write that
 *   down, and stop between two
 */
export function jobRunner(context: JobContext): (job: Job) => Generator<FrameResult, JobResult> {
  const { plan, waves, folder } = context;
  // None where no frames are made: a gather on a machine without the plan's engine is as good as any.
  let makers: ((c: number) => CascadeMaker) | null = null;
  const maker = (c: number): CascadeMaker => {
    makers ??= cascadeMakers(plan, waves);
    return makers(c);
  };
  const readers = new Map<number, CodeReader>();
  const reader = (c: number): CodeReader => {
    const made = readers.get(c) ?? codeReader(plan.cascades[c], folder);
    readers.set(c, made);
    return made;
  };
  const buffers = foamBuffers();
  return function* done(job) {
    switch (job.kind) {
      case 'frame':
        yield frameResult(job, context, maker(job.cascade));
        return null;
      case 'survey':
        return surveyResult(job, plan.cascades[job.cascade], maker(job.cascade));
      case 'foam-measure':
        return foamMeasure(job, plan, reader(job.cascade), buffers);
      case 'foam':
        yield* foamResults(job, context, reader(job.cascade));
        return null;
      case 'check':
        return {
          kind: 'check',
          intact: job.groups.map((files) => files.every((file) => isIntact(folder, file))),
        };
    }
  };
}

function frameResult(job: FrameJob, context: JobContext, maker: CascadeMaker): FrameResult {
  const { plan } = context;
  const cascade = plan.cascades[job.cascade];
  const files: WrittenFile[] = [];
  const statistics: Partial<Record<MapName, readonly ChannelStatistics[]>> = {};
  const timer = stageTimer();
  let heights: PowerSums | null = null;
  let foldedTexels: number | null = null;
  maker.turnTo(job.frame);
  timer.lap('synthesis');
  for (const { planned, image, statistics: figures } of maker.maps()) {
    statistics[planned.map] = figures;
    heights ??= heightSums(image);
    timer.lap('maps');
    const { path, bytes } = encodedFile(plan, cascade, planned, image, job.frame);
    timer.lap('encode');
    files.push(written(context, path, bytes));
    timer.lap('write');
  }
  if (cascade.foam !== null) {
    const codes = maker.jacobianCodes();
    foldedTexels = foldedCodes(codes, cascade.foam);
    timer.lap('maps');
    const bytes = new Uint8Array(codes.buffer, codes.byteOffset, codes.byteLength);
    files.push(written(context, codesPath(cascade.id, job.frame), bytes));
    timer.lap('write');
  }
  const { cascade: c, frame } = job;
  return {
    kind: 'frame',
    cascade: c,
    frame,
    files,
    statistics,
    heights,
    foldedTexels,
    seconds: timer.seconds,
  };
}

/** Texels that are folded over, J < 0; null where the codes end above 0 and some are at their end. */
function foldedCodes(codes: Uint16Array, { jacobianCodes: { zeroJ, stepJ } }: CascadeFoam): number | null {
  const codeOfZero = -zeroJ / stepJ;
  if (codeOfZero <= 0) return codes.includes(0) ? null : 0;
  let folded = 0;
  for (const code of codes) if (code < codeOfZero) folded++;
  return folded;
}

function surveyResult(job: SurveyJob, cascade: PlannedCascade, maker: CascadeMaker): JobResult {
  maker.turnTo(job.frame);
  const surveyed = cascade.maps.filter((planned) => !isSurveyed(planned));
  const extents = surveyed.map((planned) => [planned.map, maker.extents(planned)]);
  return { kind: 'survey', extents: Object.fromEntries(extents) };
}

function foamMeasure(job: FoamMeasureJob, plan: Plan, read: CodeReader, buffers: FoamBuffers): JobResult {
  const cascade = plan.cascades[job.cascade];
  const foam = cascade.foam as CascadeFoam;
  return {
    kind: 'foam-measure',
    ...foamSums(plan, cascade, foam, job, job.breakingCodes, read, buffers),
  };
}

function* foamResults(job: FoamJob, context: JobContext, read: CodeReader): Generator<FrameResult> {
  const { plan } = context;
  const cascade = plan.cascades[job.cascade];
  const planned = cascade.maps.find(({ map }) => map === 'foam');
  if (planned === undefined) return;
  let timer = stageTimer();
  const images = foamImages(plan, cascade, cascade.foam as CascadeFoam, job, read);
  for (const { frame, image, statistics } of images) {
    timer.lap('foam');
    const { path, bytes } = encodedFile(plan, cascade, planned, image, frame);
    timer.lap('encode');
    const files = [written(context, path, bytes)];
    timer.lap('write');
    const { seconds } = timer;
    yield {
      kind: 'foam',
      cascade: job.cascade,
      frame,
      files,
      statistics: { foam: statistics },
      heights: null,
      foldedTexels: null,
      seconds,
    };
    timer = stageTimer();
  }
}

/** Reads rows of a frame's J codes from its scratch file; the array is reused. */
function codeReader(cascade: PlannedCascade, folder: string): CodeReader {
  const N = cascade.resolution;
  const codes = new Uint16Array(N * N);
  const bytes = new Uint8Array(codes.buffer);
  return (frame, fromRow, toRow) => {
    const length = (toRow - fromRow) * N * 2;
    fillFromFiles(bytes, folder, [codesPath(cascade.id, frame)], fromRow * N * 2, length);
    return codes.subarray(0, length / 2);
  };
}

/** Folders are not made here: one that is missing was taken away, and what it held with it. */
function written({ folder, sync }: JobContext, path: string, bytes: Uint8Array): WrittenFile {
  writeFileAtomic(folder, path, bytes, { sync, makeFolders: false });
  return { path, bytes: bytes.length, sha256: sha256(bytes) };
}

interface StageTimer {
  /** Adds the time since the last lap to a stage. */
  lap(stage: Stage): void;
  readonly seconds: Partial<Record<Stage, number>>;
}

function stageTimer(): StageTimer {
  let last = secondsNow();
  const seconds: Partial<Record<Stage, number>> = {};
  return {
    seconds,
    lap(stage) {
      const now = secondsNow();
      seconds[stage] = (seconds[stage] ?? 0) + now - last;
      last = now;
    },
  };
}
