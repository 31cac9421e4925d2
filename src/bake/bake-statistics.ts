import type {
  ManifestCascade,
  ManifestCascadeStatistics,
  ManifestMap,
  ManifestSeaStatistics,
  SlopeFigures,
} from '../manifest/manifest.ts';
import { halfStep } from '../math/half.ts';
import {
  kurtosis,
  mergedPowerSums,
  NO_VALUES,
  type PowerSums,
  skewness,
  variance,
} from '../math/statistics.ts';
import { coxMunkSlopeVariance } from '../physics/slope-variance.ts';
import { STRONGEST_WHITECAP_WIND_MPS, whitecapCoverage } from '../physics/whitecaps.ts';
import { windSpeedAtHeight } from '../physics/wind.ts';
import type { Plan, PlannedCascade } from '../plan/plan.ts';
import type { MapName } from '../sea/sea.ts';
import type { FrameEntry } from './journal-entry.ts';

/** Height of the wind that Cox & Munk's fit takes, m. */
const COX_MUNK_HEIGHT_M = 12.5;

type Maps = Readonly<Partial<Record<MapName, ManifestMap>>>;

/** Power sums of a cascade's written heights, m, in the order of frames; of nothing where no map holds them. */
export function writtenHeights(entries: readonly FrameEntry[]): PowerSums {
  return entries.reduce(
    (sums, { heights }) => (heights === null ? sums : mergedPowerSums(sums, heights)),
    NO_VALUES,
  );
}

/** Figures of one cascade. */
export function cascadeStatistics(
  plan: Plan,
  cascade: PlannedCascade,
  entries: readonly FrameEntry[],
  maps: Maps,
): ManifestCascadeStatistics {
  const heights = writtenHeights(entries);
  const varied = variance(heights) > 0;
  const channel = heightChannel(maps);
  const metres = channel?.unit === 'cm' ? 0.01 : 1;
  const figures = channel?.written ?? null;
  return {
    significantHeightM: {
      expected: 4 * cascade.expectedHeightDeviationM,
      measured: figures === null ? null : 4 * figures.deviation * metres,
    },
    skewness: varied ? skewness(heights) : null,
    kurtosis: varied ? kurtosis(heights) : null,
    largestCrestM: figures === null ? null : figures.max * metres,
    deepestTroughM: figures === null ? null : figures.min * metres,
    slopeVariance: slopeFigures(cascade, windDirection(plan)),
    jacobianDeviation: cascade.deviations.compression,
    foldedShare: foldedShare(cascade, entries),
    heightStepMm: heightStepMm(maps),
  };
}

/** Figures of all cascades together. */
export function seaStatistics(
  plan: Plan,
  cascades: readonly ManifestCascade[],
  heights: readonly PowerSums[],
): ManifestSeaStatistics {
  const measured = cascades.map(({ statistics }) => statistics.significantHeightM.measured);
  const known = measured.every((height) => height !== null);
  const total = (value: (one: ManifestCascadeStatistics) => number | null): number =>
    cascades.reduce((sum, { statistics }) => sum + (value(statistics) ?? 0), 0);
  const m2 = heights.reduce((sum, one) => sum + variance(one), 0);
  const varied = known && m2 > 0;
  const cumulants = (f: (sums: PowerSums) => number): number =>
    heights.reduce((sum, one) => sum + (variance(one) > 0 ? f(one) : 0), 0);
  const foams = cascades.flatMap(({ foam }) => (foam === null ? [] : [foam.coverage.measured]));
  const wind = strongestWind(plan);
  const { sea } = plan.report;
  return {
    significantHeightM: {
      target: sea.significantHeightM,
      expected: sea.expectedHeightM,
      measured: known ? Math.hypot(...measured) : null,
    },
    peakPeriodS: sea.peakPeriodS,
    meanZeroCrossingPeriodS: sea.meanZeroCrossingPeriodS,
    skewness: varied ? cumulants((one) => skewness(one) * variance(one) ** 1.5) / m2 ** 1.5 : null,
    kurtosis: varied ? 3 + cumulants((one) => (kurtosis(one) - 3) * variance(one) ** 2) / m2 ** 2 : null,
    largestCrestBoundM: known ? total(({ largestCrestM }) => largestCrestM) : null,
    deepestTroughBoundM: known ? total(({ deepestTroughM }) => deepestTroughM) : null,
    slopeVariance: {
      alongWind: total(({ slopeVariance }) => slopeVariance.alongWind),
      acrossWind: total(({ slopeVariance }) => slopeVariance.acrossWind),
      coxMunk: wind === null ? null : coxMunk(wind),
    },
    foamCoverage: {
      measured: foams.length === 0 ? null : 1 - foams.reduce((clear, coverage) => clear * (1 - coverage), 1),
      whitecapFormula: wind === null || wind > STRONGEST_WHITECAP_WIND_MPS ? null : whitecapCoverage(wind),
    },
  };
}

function coxMunk(windSpeedMps: number): SlopeFigures {
  const { upwind, crosswind } = coxMunkSlopeVariance(windSpeedAtHeight(windSpeedMps, COX_MUNK_HEIGHT_M));
  return { alongWind: upwind, acrossWind: crosswind };
}

function strongestWind({ systems }: Plan): number | null {
  const winds = systems.flatMap(({ windSpeedMps }) => windSpeedMps ?? []);
  return winds.length === 0 ? null : Math.max(...winds);
}

/** Where the strongest wind blows to, or without one the highest system runs; rad counter-clockwise from east. */
function windDirection({ systems }: Plan): number {
  const [first] = [...systems].sort(
    (a, b) => (b.windSpeedMps ?? 0) - (a.windSpeedMps ?? 0) || b.significantHeightM - a.significantHeightM,
  );
  return first.towardRad;
}

/** The variance of slopes in turned axes. */
function slopeFigures({ deviations }: PlannedCascade, towardRad: number): SlopeFigures {
  const [c, s] = [Math.cos(towardRad), Math.sin(towardRad)];
  const { slopeEast: x, slopeNorth: y, slopeProduct: xy } = deviations;
  return {
    alongWind: (c * x) ** 2 + (s * y) ** 2 + 2 * c * s * xy,
    acrossWind: (s * x) ** 2 + (c * y) ** 2 - 2 * c * s * xy,
  };
}

function foldedShare({ resolution }: PlannedCascade, entries: readonly FrameEntry[]): number | null {
  const frames = entries.filter(({ kind }) => kind === 'frame');
  let folded = 0;
  for (const { foldedTexels } of frames) {
    if (foldedTexels === null) return null;
    folded += foldedTexels;
  }
  return folded / (frames.length * resolution ** 2);
}

function heightChannel(maps: Maps): ManifestMap['channels'][number] | undefined {
  return [maps.displacement, maps.height]
    .flatMap((map) => map?.channels ?? [])
    .find(({ quantity }) => quantity === 'displacement-up' || quantity === 'height');
}

function heightStepMm(maps: Maps): number | null {
  const map = maps.displacement ?? maps.height;
  const channel = heightChannel(maps);
  if (map === undefined || channel === undefined || map.sample === 'float') return null;
  const scaleM = Math.abs(channel.decode.scale) * (channel.unit === 'cm' ? 0.01 : 1);
  if (map.sample === 'uint8') return (1000 * scaleM) / 255;
  if (map.sample === 'uint16') return (1000 * scaleM) / 65535;
  const { min, max } = channel.written;
  return 1000 * scaleM * halfStep(Math.max(-min, max) / Math.abs(channel.decode.scale));
}
