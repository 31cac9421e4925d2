import { resolve } from 'node:path';
import { StoppedError, UsageError } from '../errors.ts';
import type { Manifest, ManifestCascade } from '../manifest/manifest.ts';
import type { BakeFacts } from './bake-facts.ts';
import { type CascadeFacts, cascadeFacts } from './cascade-facts.ts';
import type { Check, SeenLoop } from './check.ts';
import { frameReader, type SeenFrame } from './frame-reader.ts';
import { keyedIndices } from './keyed.ts';
import { soundManifest } from './manifest-file.ts';
import { type WaveProjection, waveProjection } from './measured-waves.ts';
import { CHECKS } from './registry.ts';
import type { CheckResult, VerifyReport } from './report.ts';
import { statisticsWatch } from './statistics.ts';
import { heightOf } from './surface.ts';
import type { Verdict } from './verdict.ts';
import { wavesRequest } from './waves-of-manifest.ts';

export interface VerifyOptions {
  /** Look at these frames only (numbers as in file names, inclusive); what needs the whole loop is then not judged. */
  readonly frames?: { readonly first: number; readonly last: number } | null;
  /** `quick` reads a few frames and leaves out what needs the whole loop; default `all`. */
  readonly checks?: VerifyExtent;
  readonly onProgress?: ((progress: VerifyProgress) => void) | null;
  /** Stops after the frame in hand. */
  readonly signal?: AbortSignal | null;
}

export type VerifyExtent = 'all' | 'quick';

/** How many frames of all cascades have been read, of how many. */
export interface VerifyProgress {
  readonly done: number;
  readonly total: number;
}

export const VERIFY_DEFAULTS: Readonly<{ checks: VerifyExtent }> = Object.freeze({ checks: 'all' });

/** Frames that are looked at texel by texel, in a full and in a quick verification. */
const KEYED_FRAMES = { all: 8, quick: 3 } as const;

/**
 * Verifies a finished bake from its manifest and files alone, by another route than the one that made them.
 *
 * @param folder bake folder
 * @returns a report; that a check fails is no error
 * @throws InputError (65) where the manifest is none or contradicts itself; ReadWriteError (74) where it or a file cannot
 *   be read; StoppedError (75) after `signal`; UsageError (64) for frames outside the loop
 */
export async function verifyBake(folder: string, options: VerifyOptions = {}): Promise<VerifyReport> {
  const root = resolve(folder);
  const manifest = soundManifest(root);
  const extent = options.checks ?? VERIFY_DEFAULTS.checks;
  const range = options.frames ?? null;
  requireFrameRange(manifest, range);
  const bake: BakeFacts = {
    folder: root,
    manifest,
    request: wavesRequest(manifest),
    range,
    everyFrame: extent === 'all',
  };
  const whole = extent === 'all' && range === null;
  const checks = CHECKS.filter(({ quick }) => quick || extent === 'all');
  const inspections = checks.map((check) => ({
    check,
    inspection: check.begin(bake),
    results: [] as CheckResult[],
  }));
  const statistics = whole ? statisticsWatch(bake) : null;

  const passes = manifest.cascades.map((cascade) => framePasses(bake, cascade));
  const progress = progressOf(passes, options);
  const listed = new Map(manifest.files.map((file) => [file.path, file]));
  for (const [c, { every, keyed }] of passes.entries()) {
    const facts = cascadeFacts(bake, c, keyed);
    const reader = frameReader(root, manifest, facts.cascade, listed);
    const watch = statistics?.cascade(facts);
    const observers = inspections.map((one) => ({ ...one, at: one.inspection.cascade(facts) }));
    const projection = whole ? loopProjection(facts) : null;
    let readable = false;
    for (const index of every) {
      await progress.step();
      const frame = reader.read(index, { digest: true });
      readable ||= frame.files.some(({ image }) => image !== null);
      for (const { at } of observers) at.frame?.(frame);
      watch?.frame(frame);
      projection?.add(frame);
    }
    const loop: SeenLoop = { readable, ...seenWaves(facts, projection) };
    for (const index of keyed) {
      await progress.step();
      const frame = reader.read(index, { digest: false });
      for (const { at } of observers) at.keyedFrame?.(frame, loop);
      watch?.keyedFrame(frame);
    }
    for (const { at, check, results } of observers) {
      for (const verdict of at.verdicts(loop)) results.push(resultOf(check, facts.cascade.id, verdict));
    }
    watch?.finish(loop);
  }

  const results = inspections.flatMap(({ check, inspection, results }) => [
    ...results,
    ...(inspection.whole?.() ?? []).map((verdict) => resultOf(check, null, verdict)),
  ]);
  return {
    title: manifest.title,
    planHash: manifest.planHash,
    checks: results,
    statistics: statistics?.statistics() ?? null,
    passed: results.every(({ passed }) => passed !== false),
  };
}

function resultOf({ name, question }: Check, cascade: string | null, verdict: Verdict): CheckResult {
  return { name, cascade, ...verdict, question: verdict.question ?? question };
}

/** Indices of the frames to be read of one cascade. */
interface FramePasses {
  /** Seen by every check, in order. */
  readonly every: readonly number[];
  /** Of those, the ones looked at texel by texel once the loop is known. */
  readonly keyed: readonly number[];
}

function framePasses({ manifest, range, everyFrame }: BakeFacts, { id, loop }: ManifestCascade): FramePasses {
  const { firstFrame, frameCount } = loop;
  const from = Math.max(0, (range?.first ?? 0) - firstFrame);
  const to = Math.min(frameCount - 1, (range?.last ?? Infinity) - firstFrame);
  const count = Math.max(0, to - from + 1);
  const wanted = everyFrame ? KEYED_FRAMES.all : KEYED_FRAMES.quick;
  const keyed = keyedIndices(wanted, count, `${manifest.planHash} ${id}`).map((index) => from + index);
  if (everyFrame) return { every: Array.from({ length: count }, (_, i) => from + i), keyed };
  const some = new Set([from, ...keyed, to].filter((index) => index <= to));
  return { every: [...some].sort((a, b) => a - b), keyed };
}

function requireFrameRange(
  { loop }: Manifest,
  range: { readonly first: number; readonly last: number } | null,
): void {
  if (range === null) return;
  const [first, last] = [loop.firstFrame, loop.firstFrame + loop.frameCount - 1];
  const { first: from, last: to } = range;
  if (Number.isInteger(from) && Number.isInteger(to) && first <= from && from <= to && to <= last) return;
  throw new UsageError(`Frames ${from}-${to} are not in the loop, which has ${first}-${last}.`);
}

/** Takes the height frames of a loop; memory only once there is one. */
interface LoopProjection {
  readonly add: (frame: SeenFrame) => void;
  readonly projection: () => WaveProjection | null;
}

function loopProjection(facts: CascadeFacts): LoopProjection {
  const { frameCount, periodS } = facts.request;
  let projection: WaveProjection | null = null;
  return {
    add(frame) {
      const height = heightOf(frame);
      if (height === null) return;
      projection ??= waveProjection(facts.request, frameCount, periodS, facts.turns(), facts.transform());
      projection.add(frame.index, height);
    },
    projection: () => projection,
  };
}

function seenWaves(
  facts: CascadeFacts,
  loop: LoopProjection | null,
): Pick<SeenLoop, 'waves' | 'withoutWaves'> {
  if (loop === null) return { waves: null, withoutWaves: 'it needs every frame of the loop' };
  const projection = loop.projection();
  if (projection === null)
    return { waves: null, withoutWaves: 'no map that holds the height was there to be read' };
  const { frameCount } = facts.request;
  if (projection.frames() < frameCount) {
    const withoutWaves = `only ${projection.frames()} of ${frameCount} height frames could be read`;
    return { waves: null, withoutWaves };
  }
  return { waves: projection.waves(), withoutWaves: '' };
}

/** Counts frames, lets signals in, and stops when asked to. */
function progressOf(
  passes: readonly FramePasses[],
  { onProgress, signal }: VerifyOptions,
): { readonly step: () => Promise<void> } {
  const total = passes.reduce((sum, { every, keyed }) => sum + every.length + keyed.length, 0);
  let done = 0;
  return {
    async step() {
      onProgress?.({ done, total });
      done++;
      await new Promise((resume) => setImmediate(resume));
      if (signal?.aborted === true) throw new StoppedError('Verification was stopped.');
    },
  };
}
