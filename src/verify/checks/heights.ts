import { oppositeIndex } from '../../waves/lattice.ts';
import type { CascadeFacts } from '../cascade-facts.ts';
import { exponentialSumBounds, FALSE_ALARM_RATE } from '../chance.ts';
import type { Check } from '../check.ts';
import { isStanding, type MeasuredWaves } from '../measured-waves.ts';
import { engineNoise, LARGEST_IN_DEVIATIONS } from '../rounding.ts';
import { answering, notApplicable, type Verdict, verdict } from '../verdict.ts';

/**
 * Significant height 4 sqrt(variance) of the height as written, over the whole loop, against what the manifest expects.
 *
 * With `matchHeight` the waves were scaled to the expected variance and only rounding may differ. Without it one
 * realisation differs from its expectation: sum of the waves' variances, each an exponential number.
 */
export const HEIGHTS: Check = {
  name: 'heights',
  question: 'Is the significant height what the manifest expects?',
  quick: false,
  begin({ manifest }) {
    const cascades: CascadeHeight[] = [];
    return {
      cascade(facts) {
        return {
          verdicts({ waves, withoutWaves }) {
            if (waves === null) return [notApplicable(withoutWaves)];
            const height = cascadeHeight(facts, waves);
            cascades.push(height);
            return [heightVerdict([height], facts.cascade.statistics.significantHeightM.expected)];
          },
        };
      },
      whole() {
        const question = 'Is the significant height of the whole sea what the manifest expects?';
        if (cascades.length < manifest.cascades.length) {
          return [answering(question, notApplicable('not every cascade shows its height'))];
        }
        return [
          answering(question, heightVerdict(cascades, manifest.statistics.significantHeightM.expected)),
        ];
      },
    };
  },
};

interface CascadeHeight {
  /** Variance of the height as written, m^2. */
  readonly variance: number;
  /** Largest error of that variance by rounding and clipping, m^2. */
  readonly rounding: number;
  /** Variances of single waves whose realisation is a matter of chance, m^2; empty where nothing is. */
  readonly chance: readonly number[];
  /** Variance that waves k and -k which stand may add or take by their phases, m^2. */
  readonly standing: number;
}

/** Standard deviations of a mean of many independent rounding errors. */
const DEVIATIONS = 6;
/** Sums of millions of squares. */
const SUMMATION = 1e-10;
/** Steps of floats grow with the value: the mean of value^2 error^2 is up to this many times the product of the means. */
const FLOAT_KURTOSIS = 3;

function cascadeHeight(facts: CascadeFacts, waves: MeasuredWaves): CascadeHeight {
  const { meanSquare, mean, rounding, frameCount } = waves;
  const { shaping } = facts.manifest.sea;
  const variance = meanSquare - mean * mean;
  const samples = frameCount * facts.cascade.resolution ** 2;
  const error = rounding + 2 * DEVIATIONS * Math.sqrt((FLOAT_KURTOSIS * variance * rounding) / samples);
  const clipped = clippedVariance(facts, variance);
  const engine = 2 * LARGEST_IN_DEVIATIONS * engineNoise(facts.manifest.generator.engine) + SUMMATION;
  const height = { variance, rounding: error + clipped + engine * variance };
  if (shaping.matchHeight) return { ...height, chance: [], standing: 0 };
  const target = facts.target().variance;
  if (shaping.amplitudes === 'gaussian')
    return { ...height, chance: [...target].filter((P) => P > 0), standing: 0 };
  return { ...height, chance: [], standing: standingVariance(target, waves) };
}

/** What clipping takes from the variance: E[x^2 - t^2 | x > t] ~ 2 sigma^2 (1 + sigma^2 / t^2) for each clipped texel. */
function clippedVariance({ cascade }: CascadeFacts, variance: number): number {
  const channel = [cascade.maps.displacement, cascade.maps.height]
    .flatMap((map) => map?.channels ?? [])
    .find(({ quantity }) => quantity === 'displacement-up' || quantity === 'height');
  if (channel === undefined || channel.written.clipped === 0) return 0;
  const share = channel.written.clipped / (cascade.loop.frameCount * cascade.resolution ** 2);
  return 4 * share * variance;
}

function standingVariance(
  P: Float64Array,
  { turns, frameCount, lattice: { resolution: N } }: MeasuredWaves,
): number {
  let sum = 0;
  for (let i = 0; i < P.length; i++) {
    const j = oppositeIndex(Math.floor(i / N), N) * N + oppositeIndex(i % N, N);
    if (P[i] > 0 && P[j] > 0 && isStanding(turns, i, j, frameCount)) sum += Math.sqrt(P[i] * P[j]);
  }
  return sum;
}

function heightVerdict(cascades: readonly CascadeHeight[], expectedHeightM: number): Verdict {
  const expected = (expectedHeightM / 4) ** 2;
  const sum = (f: (height: CascadeHeight) => number): number =>
    cascades.reduce((total, one) => total + f(one), 0);
  const measured = sum(({ variance }) => variance);
  const slack = sum(({ rounding, standing }) => rounding + standing);
  const chance = cascades.flatMap((one) => one.chance);
  const below = measured < expected;
  let reach = slack;
  let reason = 'matched height: exact but for the rounding of the files';
  if (chance.length > 0) {
    const mean = chance.reduce((total, P) => total + P, 0);
    reach += Math.abs(exponentialSumBounds(chance, FALSE_ALARM_RATE)[below ? 0 : 1] - mean);
    reason = `one realisation of ${effectiveWaves(chance).toFixed(0)} effective waves stays inside this but for once in ${1 / FALSE_ALARM_RATE}`;
  } else if (slack > sum(({ rounding }) => rounding)) {
    reason =
      'every wave has its expected amplitude; standing waves add by their phases, the files are rounded';
  }
  const bound = Math.max(0, expected + (below ? -reach : reach));
  const inPercent = (variance: number): number =>
    variance === expected ? 0 : 100 * Math.abs(Math.sqrt(variance / expected) - 1);
  return verdict(inPercent(measured), { limit: inPercent(bound), unit: '%', reason }, [
    `${(4 * Math.sqrt(measured)).toPrecision(6)} m measured, ${expectedHeightM.toPrecision(6)} m expected`,
  ]);
}

/** m0^2 / sum of squares. */
function effectiveWaves(variances: readonly number[]): number {
  const sum = variances.reduce((total, P) => total + P, 0);
  return (sum * sum) / variances.reduce((total, P) => total + P * P, 0);
}
