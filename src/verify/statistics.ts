import type { ManifestCascade } from '../manifest/manifest.ts';
import { halfStep } from '../math/half.ts';
import {
  kurtosis,
  mergedPowerSums,
  NO_VALUES,
  type PowerSums,
  powerSums,
  skewness,
  variance,
} from '../math/statistics.ts';
import { coxMunkSlopeVariance, type SlopeVariance } from '../physics/slope-variance.ts';
import { STRONGEST_WHITECAP_WIND_MPS, whitecapCoverage } from '../physics/whitecaps.ts';
import { windSpeedAtHeight } from '../physics/wind.ts';
import type { BakeFacts } from './bake-facts.ts';
import type { CascadeFacts } from './cascade-facts.ts';
import { channelTallier } from './channel-tally.ts';
import type { SeenLoop } from './check.ts';
import { siPerUnit } from './field-values.ts';
import { type FoldWatch, foldedShareOfSum, foldWatch } from './folding.ts';
import type { SeenFrame } from './frame-reader.ts';
import { heightOf } from './surface.ts';
import { peakPeriodS, type WaveMoments, waveMoments } from './wave-moments.ts';
import { strongestWind, windDirection } from './wind.ts';

/** What a bake's files hold, measured on them. Lengths in m whatever the unit of the files. */
export interface MeasuredStatistics {
  readonly cascades: readonly CascadeStatistics[];
  readonly sea: SeaStatistics;
}

/** Figures of one cascade; null where no map shows them. */
export interface CascadeStatistics {
  readonly id: string;
  readonly significantHeightM: { readonly expected: number; readonly measured: number | null };
  readonly peakPeriodS: number | null;
  /** sqrt(m0 / m2). */
  readonly meanPeriodS: number | null;
  readonly skewness: number | null;
  readonly kurtosis: number | null;
  readonly largestCrestM: number | null;
  readonly deepestTroughM: number | null;
  readonly slopeVariance: { readonly alongWind: number; readonly acrossWind: number } | null;
  /** Share of the texels of a few keyed frames where J < 0. */
  readonly foldedShare: number | null;
  readonly foamCoverage: number | null;
  /** One step of the height's codes, mm; null for floats. */
  readonly heightStepMm: number | null;
  /** Distance of neighbouring halves at the largest height, mm; null for other samples. */
  readonly halfStepAtLargestMm: number | null;
  /** Values of all maps beyond their range, as the manifest states them; the files hold no fewer at their ends. */
  readonly clippedValues: number;
}

/** Figures of all cascades together. */
export interface SeaStatistics {
  readonly significantHeightM: {
    readonly target: number;
    readonly expected: number;
    readonly measured: number | null;
  };
  readonly peakPeriodS: number | null;
  readonly meanPeriodS: number | null;
  /** Of the sum of independent cascades, from the cumulants of each. */
  readonly skewness: number | null;
  readonly kurtosis: number | null;
  /** No crest of the sum is higher: the sum of each cascade's highest. */
  readonly largestCrestBoundM: number | null;
  readonly deepestTroughBoundM: number | null;
  readonly slopeVariance: {
    readonly alongWind: number;
    readonly acrossWind: number;
    /** Of waves from 0.1 m up that no cascade holds, by the manifest: roughness for the shader. */
    readonly leftOut: number;
    /** Cox & Munk 1954 for the strongest wind, ripples included; null outside the winds that they saw. */
    readonly clean: SlopeVariance | null;
  } | null;
  /** Share of keyed random positions where J of the sum of the strains is below 0. */
  readonly foldedShare: number | null;
  readonly foamCoverage: number | null;
  /** Monahan & O'Muircheartaigh 1980 for the strongest wind; null without one or where the law is not used. */
  readonly whitecapCoverage: number | null;
}

/** Gathers the statistics of a bake while its frames are read. */
export interface StatisticsWatch {
  readonly cascade: (facts: CascadeFacts) => {
    readonly frame: (frame: SeenFrame) => void;
    readonly keyedFrame: (frame: SeenFrame) => void;
    readonly finish: (loop: SeenLoop) => void;
  };
  readonly statistics: () => MeasuredStatistics;
}

interface CascadeMeasures {
  readonly cascade: ManifestCascade;
  readonly heights: PowerSums;
  readonly moments: WaveMoments | null;
  readonly folds: FoldWatch;
  readonly foamCoverage: number | null;
}

export function statisticsWatch(bake: BakeFacts): StatisticsWatch {
  const measures: CascadeMeasures[] = [];
  const windToward = windDirection(bake.manifest);
  return {
    cascade(facts) {
      let heights = NO_VALUES;
      const foam = channelTallier();
      const folds = foldWatch(facts);
      return {
        frame(frame) {
          const height = heightOf(frame);
          if (height !== null) heights = mergedPowerSums(heights, powerSums(height.values));
          const field = frame.field('foam');
          if (field !== null) foam.add(field);
        },
        keyedFrame(frame) {
          const surface = facts.surface(frame);
          if (surface !== null) folds.add(surface, frame.index);
        },
        finish({ waves }) {
          measures.push({
            cascade: facts.cascade,
            heights,
            moments: waves === null ? null : waveMoments(waves, windToward),
            folds,
            foamCoverage: foam.tally().count === 0 ? null : foam.tally().mean,
          });
        },
      };
    },
    statistics: () => ({ cascades: measures.map(cascadeStatistics), sea: seaStatistics(bake, measures) }),
  };
}

function isWithin(wind: number | null, least: number, most: number): wind is number {
  return wind !== null && wind >= least && wind <= most;
}

/** Winds at 12.5 m of the photographs, m/s. Source: Cox & Munk 1954. */
const SLOPE_WINDS_MPS = [1, 14] as const;
const ANY_WIND_MPS = 80;

function cleanSlopeVariance(wind: number | null): SlopeVariance | null {
  if (!isWithin(wind, 0, ANY_WIND_MPS)) return null;
  const W = windSpeedAtHeight(wind, 12.5);
  return isWithin(W, ...SLOPE_WINDS_MPS) ? coxMunkSlopeVariance(W) : null;
}

function cascadeStatistics({
  cascade,
  heights,
  moments,
  folds,
  foamCoverage,
}: CascadeMeasures): CascadeStatistics {
  const seen = heights.count > 0;
  const varied = seen && variance(heights) > 0;
  return {
    id: cascade.id,
    significantHeightM: {
      expected: cascade.statistics.significantHeightM.expected,
      measured: seen ? 4 * Math.sqrt(variance(heights)) : null,
    },
    peakPeriodS: moments === null ? null : peakPeriodS([moments]),
    meanPeriodS: moments === null ? null : meanPeriod([moments]),
    skewness: varied ? skewness(heights) : null,
    kurtosis: varied ? kurtosis(heights) : null,
    largestCrestM: seen ? heights.maximum : null,
    deepestTroughM: seen ? heights.minimum : null,
    slopeVariance: moments === null ? null : { alongWind: moments.alongWind, acrossWind: moments.acrossWind },
    foldedShare: folds.share(),
    foamCoverage,
    ...heightSteps(cascade, heights),
    clippedValues: Object.values(cascade.maps)
      .flatMap(({ channels }) => channels)
      .reduce((sum, { written }) => sum + written.clipped, 0),
  };
}

function meanPeriod(moments: readonly WaveMoments[]): number | null {
  const m0 = moments.reduce((sum, one) => sum + one.m0, 0);
  const m2 = moments.reduce((sum, one) => sum + one.m2, 0);
  return m2 > 0 ? 2 * Math.PI * Math.sqrt(m0 / m2) : null;
}

function heightSteps(
  { maps }: ManifestCascade,
  heights: PowerSums,
): Pick<CascadeStatistics, 'heightStepMm' | 'halfStepAtLargestMm'> {
  for (const map of [maps.displacement, maps.height]) {
    const channel = map?.channels.find(
      ({ quantity }) => quantity === 'displacement-up' || quantity === 'height',
    );
    if (map === undefined || channel === undefined) continue;
    const scaleM = Math.abs(channel.decode.scale) * siPerUnit(channel);
    const codes = map.sample === 'uint8' ? 255 : 65535;
    const largest = Math.max(Math.abs(heights.minimum), Math.abs(heights.maximum));
    const half = map.sample === 'half' && heights.count > 0;
    const integer = map.sample === 'uint8' || map.sample === 'uint16';
    return {
      heightStepMm: integer ? (1000 * scaleM) / codes : null,
      halfStepAtLargestMm: half ? 1000 * scaleM * halfStep(largest / scaleM) : null,
    };
  }
  return { heightStepMm: null, halfStepAtLargestMm: null };
}

function seaStatistics(bake: BakeFacts, measures: readonly CascadeMeasures[]): SeaStatistics {
  const { target, expected } = bake.manifest.statistics.significantHeightM;
  const seen = measures.every(({ heights }) => heights.count > 0);
  const total = (f: (measure: CascadeMeasures) => number): number =>
    measures.reduce((sum, one) => sum + f(one), 0);
  const m2 = total(({ heights }) => variance(heights));
  const varied = seen && m2 > 0;
  const moments = measures.flatMap((one) => one.moments ?? []);
  const shown = moments.length === measures.length;
  const foams = measures.map(({ foamCoverage }) => foamCoverage);
  const wind = strongestWind(bake.manifest);
  return {
    significantHeightM: { target, expected, measured: seen ? 4 * Math.sqrt(m2) : null },
    peakPeriodS: shown ? peakPeriodS(moments) : null,
    meanPeriodS: shown ? meanPeriod(moments) : null,
    skewness: varied ? total(({ heights }) => thirdCumulant(heights)) / m2 ** 1.5 : null,
    kurtosis: varied ? 3 + total(({ heights }) => fourthCumulant(heights)) / m2 ** 2 : null,
    largestCrestBoundM: seen ? total(({ heights }) => heights.maximum) : null,
    deepestTroughBoundM: seen ? total(({ heights }) => heights.minimum) : null,
    slopeVariance: shown
      ? {
          alongWind: moments.reduce((sum, one) => sum + one.alongWind, 0),
          acrossWind: moments.reduce((sum, one) => sum + one.acrossWind, 0),
          leftOut: bake.manifest.losses.slopeVarianceLeftOut,
          clean: cleanSlopeVariance(wind),
        }
      : null,
    foldedShare: foldedShareOfSum(measures.map(({ folds }) => folds)),
    foamCoverage: foams.some((coverage) => coverage !== null)
      ? 1 - foams.reduce<number>((clear, coverage) => clear * (1 - (coverage ?? 0)), 1)
      : null,
    whitecapCoverage: isWithin(wind, 0, STRONGEST_WHITECAP_WIND_MPS) ? whitecapCoverage(wind) : null,
  };
}

function thirdCumulant(sums: PowerSums): number {
  return variance(sums) === 0 ? 0 : skewness(sums) * variance(sums) ** 1.5;
}

function fourthCumulant(sums: PowerSums): number {
  return variance(sums) === 0 ? 0 : (kurtosis(sums) - 3) * variance(sums) ** 2;
}
