import { HIGHEST_BREAKING_J } from '../plan/foam-plan.ts';
import type { CascadeFoam, Plan, PlannedCascade } from '../plan/plan.ts';
import { foamLevels } from './foam-loop.ts';
import type { Executor, FoamMeasureResult } from './jobs.ts';

/** The breaking level of a cascade and the coverage it gives. */
export interface FoamLevel {
  /** J code at which foam starts. */
  readonly breakingCode: number;
  readonly breakingJ: number;
  /** Mean of the written map over the loop and all texels. */
  readonly coverage: number;
  /** Why the target was missed, or null. */
  readonly note: string | null;
}

/** The written coverage must meet its target within this, relatively. */
const TOLERANCE = 0.02;
/** The search stops well inside the tolerance. */
const AIM = 0.002;
/** Levels tried at once in a round of the bracketing search: each round divides the bracket by one more. */
const LEVELS_A_ROUND = 4;
/** Codes of a block of rows that a job may hold, bytes. */
const BLOCK_BYTES = 64 * 2 ** 20;

/**
 * Finds the breaking level whose written foam has the target's mean: coverage rises with the level, so brackets close
 * on every second texel each way, and then on all texels by false position.
 */
export async function foamLevel(
  plan: Plan,
  c: number,
  executor: Executor,
  onRound: () => void,
): Promise<FoamLevel> {
  const cascade = plan.cascades[c];
  const foam = cascade.foam as CascadeFoam;
  const { zeroJ, stepJ } = foam.jacobianCodes;
  const codeOf = (J: number): number => Math.round((J - zeroJ) / stepJ);
  const level = (breakingCode: number, coverage: number, note: string | null): FoamLevel => ({
    breakingCode,
    breakingJ: zeroJ + breakingCode * stepJ,
    coverage,
    note,
  });
  const measure = async (codes: readonly number[], stride: number): Promise<readonly number[]> => {
    onRound();
    return coverages(cascade, c, codes, stride, executor);
  };

  const highest = codeOf(HIGHEST_BREAKING_J);
  if (foam.breakingJ !== null) {
    const code = codeOf(foam.breakingJ);
    return level(code, (await measure([code], 1))[0], null);
  }
  const target = foam.coverage as number;
  if (target === 0) return level(0, 0, null);
  const [most] = await measure([highest], 1);
  if (most < target * (1 - TOLERANCE)) {
    return level(
      highest,
      most,
      `even with the highest breaking level (J = ${HIGHEST_BREAKING_J}) foam covers ${most.toPrecision(3)}, short of ${target.toPrecision(3)}`,
    );
  }

  let [low, high] = [0, highest];
  const stride = cascade.resolution >= 128 ? 2 : 1;
  while (high - low > 32) {
    const step = (high - low) / (LEVELS_A_ROUND + 1);
    const codes = Array.from({ length: LEVELS_A_ROUND }, (_, i) => Math.round(low + (i + 1) * step));
    const found = await measure(codes, stride);
    const above = found.findIndex((coverage) => coverage >= target);
    high = above < 0 ? high : codes[above];
    low = above === 0 ? low : codes[above < 0 ? LEVELS_A_ROUND - 1 : above - 1];
  }
  return closeIn(target, low, high, highest, measure, level);
}

/** On all texels: steps the bracket outward until it holds the target, then closes it by false position. */
async function closeIn(
  target: number,
  low: number,
  high: number,
  highest: number,
  measure: (codes: readonly number[], stride: number) => Promise<readonly number[]>,
  level: (code: number, coverage: number, note: string | null) => FoamLevel,
): Promise<FoamLevel> {
  let [atLow, atHigh] = await measure([low, high], 1);
  for (let reach = 256; atLow > target || atHigh < target; reach *= 4) {
    if (atLow > target) low = Math.max(0, low - reach);
    if (atHigh < target) high = Math.min(highest, high + reach);
    [atLow, atHigh] = await measure([low, high], 1);
    if (low === 0 && high === highest) break;
  }
  for (let round = 0; round < 12 && high - low > 1; round++) {
    const guess = low + ((target - atLow) / (atHigh - atLow)) * (high - low);
    const code = Math.min(high - 1, Math.max(low + 1, Math.round(guess)));
    const [coverage] = await measure([code], 1);
    if (Math.abs(coverage / target - 1) <= AIM) return level(code, coverage, null);
    if (coverage < target) [low, atLow] = [code, coverage];
    else [high, atHigh] = [code, coverage];
  }
  const nearer = target - atLow < atHigh - target ? level(low, atLow, null) : level(high, atHigh, null);
  const error = nearer.coverage / target - 1;
  if (Math.abs(error) <= TOLERANCE) return nearer;
  const note = `the written map's steps allow ${nearer.coverage.toPrecision(3)} for a target of ${target.toPrecision(3)}`;
  return { ...nearer, note };
}

/** Mean of the written foam for several breaking codes; rows are split into blocks that fit in memory. */
async function coverages(
  cascade: PlannedCascade,
  c: number,
  breakingCodes: readonly number[],
  stride: number,
  executor: Executor,
): Promise<readonly number[]> {
  const N = cascade.resolution;
  const bytesPerRow = (2 * N * cascade.loop.frameCount) / stride ** 2;
  const most = Math.max(stride, Math.floor(BLOCK_BYTES / bytesPerRow / stride) * stride);
  const even = Math.ceil(N / executor.width / stride) * stride;
  const rows = Math.min(most, even);
  const jobs: Promise<FoamMeasureResult>[] = [];
  for (let fromRow = 0; fromRow < N; fromRow += rows) {
    const toRow = Math.min(N, fromRow + rows);
    const job = { kind: 'foam-measure', cascade: c, fromRow, toRow, stride, breakingCodes } as const;
    jobs.push(executor.run(job) as Promise<FoamMeasureResult>);
  }
  const results = await Promise.all(jobs);
  const texels = results.reduce((sum, result) => sum + result.texels, 0);
  const codes = foamLevels(cascade) * texels * cascade.loop.frameCount;
  return breakingCodes.map((_, i) => results.reduce((sum, { sums }) => sum + sums[i], 0) / codes);
}
