import { sha256 } from '../hash.ts';
import type { ChannelStatistics } from '../maps/encoded-map.ts';
import { isSurveyed } from '../plan/encodings.ts';
import type { CascadeFoam, Plan, PlannedCascade } from '../plan/plan.ts';
import type { MapName } from '../sea/sea.ts';
import { writeFileAtomic } from '../store/atomic-file.ts';
import { fillFromFiles } from '../store/scratch.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import { type CascadeMaker, cascadeMaker, encodedFile } from './cascade-maker.ts';
import { secondsNow } from './clock.ts';
import { type CodeReader, foamImages, foamSums } from './foam-loop.ts';
import type {
  FoamJob,
  FoamMeasureJob,
  FrameJob,
  FrameResult,
  Job,
  JobResult,
  Stage,
  SurveyJob,
  SurveyResult,
  WrittenFile,
} from './jobs.ts';
import { codesPath } from './work-folder.ts';

/**
 * Does jobs of one bake in the calling thread. Buffers of a cascade are made when its first job comes and kept.
 *
 * @param plan the plan
 * @param waves wave amplitudes in the order of the plan's cascades; read only
 * @param folder the bake folder, absolute
 */
export function jobRunner(
  plan: Plan,
  waves: readonly WaveAmplitudes[],
  folder: string,
): (job: Job) => JobResult {
  const makers = new Map<number, CascadeMaker>();
  const maker = (c: number): CascadeMaker => {
    const made = makers.get(c) ?? cascadeMaker(plan, plan.cascades[c], waves[c]);
    makers.set(c, made);
    return made;
  };
  return (job) => {
    switch (job.kind) {
      case 'frame':
        return [frameResult(job, plan, maker(job.cascade), folder)];
      case 'survey':
        return surveyResult(job, plan.cascades[job.cascade], maker(job.cascade));
      case 'foam-measure':
        return foamMeasure(job, plan, folder);
      case 'foam':
        return foamResults(job, plan, folder);
    }
  };
}

function frameResult(job: FrameJob, plan: Plan, maker: CascadeMaker, folder: string): FrameResult {
  const cascade = plan.cascades[job.cascade];
  const files: WrittenFile[] = [];
  const statistics: Partial<Record<MapName, readonly ChannelStatistics[]>> = {};
  const timer = stageTimer();
  const fields = maker.fields(job.frame);
  timer.lap('synthesis');
  for (const planned of cascade.maps) {
    if (planned.map === 'foam') continue;
    const made = maker.map(planned, fields, job.surveyed[planned.map]);
    statistics[planned.map] = made.statistics;
    timer.lap('maps');
    const { path, bytes } = encodedFile(plan, cascade, planned, made.image, job.frame);
    timer.lap('encode');
    files.push(written(folder, path, bytes));
    timer.lap('write');
  }
  if (cascade.foam !== null) {
    const codes = maker.jacobianCodes(fields, cascade.foam);
    timer.lap('maps');
    const bytes = new Uint8Array(codes.buffer, codes.byteOffset, codes.byteLength);
    files.push(written(folder, codesPath(cascade.id, job.frame), bytes));
    timer.lap('write');
  }
  return { kind: 'frame', cascade: job.cascade, frame: job.frame, files, statistics, seconds: timer.seconds };
}

function surveyResult(job: SurveyJob, cascade: PlannedCascade, maker: CascadeMaker): SurveyResult {
  const fields = maker.fields(job.frame);
  const surveyed = cascade.maps.filter((planned) => !isSurveyed(planned));
  const extents = surveyed.map((planned) => [planned.map, maker.extents(planned, fields)]);
  return { kind: 'survey', extents: Object.fromEntries(extents) };
}

function foamMeasure(job: FoamMeasureJob, plan: Plan, folder: string): JobResult {
  const cascade = plan.cascades[job.cascade];
  const read = codeReader(cascade, folder);
  return {
    kind: 'foam-measure',
    ...foamSums(plan, cascade, cascade.foam as CascadeFoam, job, job.breakingCodes, read),
  };
}

function foamResults(job: FoamJob, plan: Plan, folder: string): readonly FrameResult[] {
  const cascade = plan.cascades[job.cascade];
  const planned = cascade.maps.find(({ map }) => map === 'foam');
  if (planned === undefined) return [];
  const results: FrameResult[] = [];
  let timer = stageTimer();
  const images = foamImages(plan, cascade, cascade.foam as CascadeFoam, job, codeReader(cascade, folder));
  for (const { frame, image, statistics } of images) {
    timer.lap('foam');
    const { path, bytes } = encodedFile(plan, cascade, planned, image, frame);
    timer.lap('encode');
    const files = [written(folder, path, bytes)];
    timer.lap('write');
    const { seconds } = timer;
    results.push({
      kind: 'foam',
      cascade: job.cascade,
      frame,
      files,
      statistics: { foam: statistics },
      seconds,
    });
    timer = stageTimer();
  }
  return results;
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

function written(folder: string, path: string, bytes: Uint8Array): WrittenFile {
  writeFileAtomic(folder, path, bytes);
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
