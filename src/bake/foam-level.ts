import { HIGHEST_BREAKING_J } from '../plan/foam-plan.ts';
import type { CascadeFoam, PlannedCascade } from '../plan/plan.ts';
import type { Crew } from './crew.ts';
import { foamLevels } from './foam-loop.ts';
import type { FoamMeasureJob, FoamMeasureResult } from './jobs.ts';
import type { LevelEntry } from './journal-entry.ts';
import { runJobs } from './run-jobs.ts';

/** The breaking level of a cascade and the coverage it gives. */
export type FoamLevel = Pick<LevelEntry, 'breakingCode' | 'coverage' | 'note'>;

/** Written coverages of some breaking codes, on every `stride`-th texel each way. */
export type CoverageMeter = (codes: readonly number[], stride: number) => Promise<readonly number[]>;

/** The written coverage must meet its target within this, relatively. */
const TOLERANCE = 0.02;
/** The search stops well inside the tolerance. */
const AIM = 0.002;
/** Levels tried at once in a round of the bracketing search: each round divides the bracket by one more. */
const LEVELS_A_ROUND = 4;
/** A bracket this wide is left to false position, codes. */
const NARROW = 32;
/** Rounds of false position; the bracket of at most some hundred codes is closed long before. */
const MOST_ROUNDS = 16;
/** Codes of a block of rows that a job may hold, bytes. */
export const BLOCK_BYTES: number = 16 * 2 ** 20;

/** Finds a cascade's breaking level: the given one, or the one whose written foam has the target's mean. */
export async function foamLevel(crew: Crew, c: number, onRound: () => void): Promise<FoamLevel> {
  const cascade = crew.plan.cascades[c];
  const foam = cascade.foam as CascadeFoam;
  const { zeroJ, stepJ } = foam.jacobianCodes;
  const codeOf = (J: number): number => Math.min(65535, Math.max(0, Math.round((J - zeroJ) / stepJ)));
  const measure: CoverageMeter = (codes, stride) => {
    onRound();
    return coverages(crew, c, codes, stride);
  };
  if (foam.breakingJ !== null) {
    const breakingCode = codeOf(foam.breakingJ);
    return { breakingCode, coverage: (await measure([breakingCode], 1))[0], note: null };
  }
  const stride = cascade.resolution >= 128 ? 2 : 1;
  return levelOfCoverage(foam.coverage as number, codeOf(HIGHEST_BREAKING_J), measure, stride);
}

/** J at a breaking code. */
export function breakingJ({ jacobianCodes: { zeroJ, stepJ } }: CascadeFoam, breakingCode: number): number {
  return zeroJ + breakingCode * stepJ;
}

/**
 * The level whose coverage is the target's: coverage rises with the level, so brackets close on every `stride`-th texel
 * each way, and then on all texels by false position.
 *
 * @param target coverage 0..1
 * @param highest the highest code allowed
 */
export async function levelOfCoverage(
  target: number,
  highest: number,
  measure: CoverageMeter,
  stride: number,
): Promise<FoamLevel> {
  if (target === 0) return { breakingCode: 0, coverage: 0, note: null };
  const [most] = await measure([highest], 1);
  if (most <= target) {
    const note = `even with the highest breaking level (J = ${HIGHEST_BREAKING_J}) foam covers ${most.toPrecision(3)}, short of ${target.toPrecision(3)}`;
    return { breakingCode: highest, coverage: most, note: most < target * (1 - TOLERANCE) ? note : null };
  }
  let [low, high] = [0, highest];
  while (high - low > NARROW) {
    const step = (high - low) / (LEVELS_A_ROUND + 1);
    const codes = Array.from({ length: LEVELS_A_ROUND }, (_, i) => Math.round(low + (i + 1) * step));
    const found = await measure(codes, stride);
    const above = found.findIndex((coverage) => coverage >= target);
    high = above < 0 ? high : codes[above];
    low = above === 0 ? low : codes[above < 0 ? LEVELS_A_ROUND - 1 : above - 1];
  }
  return closeIn(target, { low, high, highest }, measure);
}

/** On all texels: steps the bracket outward until it holds the target, then closes it by false position. */
async function closeIn(
  target: number,
  bracket: { readonly low: number; readonly high: number; readonly highest: number },
  measure: CoverageMeter,
): Promise<FoamLevel> {
  const { highest } = bracket;
  let { low, high } = bracket;
  let [atLow, atHigh] = await measure([low, high], 1);
  // No foam at code 0 and more than the target at the highest: this ends at the latest there.
  for (let reach = 8 * NARROW; atLow > target || atHigh < target; reach *= 4) {
    if (atLow > target) low = Math.max(0, low - reach);
    if (atHigh < target) high = Math.min(highest, high + reach);
    [atLow, atHigh] = await measure([low, high], 1);
  }
  for (let round = 0; round < MOST_ROUNDS && high - low > 1; round++) {
    if (isNear(atLow, target) || isNear(atHigh, target)) break;
    // Every third step halves, so that a bent curve does not hold one end for long.
    const share = round % 3 === 2 ? 0.5 : (target - atLow) / (atHigh - atLow);
    const guess = Math.round(low + share * (high - low));
    const code = Math.min(high - 1, Math.max(low + 1, guess));
    const [coverage] = await measure([code], 1);
    if (coverage < target) [low, atLow] = [code, coverage];
    else [high, atHigh] = [code, coverage];
  }
  const [breakingCode, coverage] = target - atLow < atHigh - target ? [low, atLow] : [high, atHigh];
  const missed = Math.abs(coverage / target - 1) > TOLERANCE;
  const note = `the written map's steps allow ${coverage.toPrecision(3)} for a target of ${target.toPrecision(3)}`;
  return { breakingCode, coverage, note: missed ? note : null };
}

function isNear(coverage: number, target: number): boolean {
  return Math.abs(coverage / target - 1) <= AIM;
}

/** Mean of the written foam for several breaking codes; rows are split into blocks that fit in memory. */
async function coverages(
  crew: Crew,
  c: number,
  breakingCodes: readonly number[],
  stride: number,
): Promise<readonly number[]> {
  const cascade = crew.plan.cascades[c];
  const jobs = rowBlocks(cascade, stride, crew.executor.width).map(
    ([fromRow, toRow]): FoamMeasureJob => ({
      kind: 'foam-measure',
      cascade: c,
      fromRow,
      toRow,
      stride,
      breakingCodes,
    }),
  );
  let texels = 0;
  const sums = breakingCodes.map(() => 0);
  await runJobs<FoamMeasureJob, FoamMeasureResult>(crew, jobs, (result) => {
    texels += result.texels;
    for (const [i, sum] of result.sums.entries()) sums[i] += sum;
  });
  const codes = foamLevels(cascade) * texels * cascade.loop.frameCount;
  return sums.map((sum) => sum / codes);
}

/** Rows [from, to) of each block: one a thread, or as many as keep a block's codes in bounds. */
function rowBlocks(
  { resolution: N, loop }: PlannedCascade,
  stride: number,
  width: number,
): readonly (readonly [number, number])[] {
  const bytesPerRow = (2 * N * loop.frameCount) / stride ** 2;
  const most = Math.max(stride, Math.floor(BLOCK_BYTES / bytesPerRow / stride) * stride);
  const even = Math.ceil(N / width / stride) * stride;
  const rows = Math.min(most, even);
  return Array.from({ length: Math.ceil(N / rows) }, (_, i) => [i * rows, Math.min(N, (i + 1) * rows)]);
}
