import type { Manifest, ManifestCascade, ManifestChannel } from '../../manifest/manifest.ts';
import { halfStep } from '../../math/half.ts';
import {
  kurtosis,
  mergedPowerSums,
  NO_VALUES,
  type PowerSums,
  powerSums,
  skewness,
  variance,
} from '../../math/statistics.ts';
import { type ChannelTallier, channelTallier } from '../channel-tally.ts';
import type { Check } from '../check.ts';
import { siPerUnit } from '../field-values.ts';
import { figure, figuresVerdict, type StatedFigure } from '../stated-figures.ts';
import { heightOf } from '../surface.ts';
import { answering, notApplicable } from '../verdict.ts';

/**
 * The figures in the manifest that describe the files: smallest, largest, mean and deviation of every channel, clipped
 * texels, heights, their skewness and kurtosis, crests and troughs, foam coverage.
 */
export const FIGURES: Check = {
  name: 'figures',
  question: 'Are the figures of the manifest those of its files?',
  quick: false,
  begin({ manifest }) {
    const heights: PowerSums[] = [];
    let whole = true;
    return {
      cascade({ cascade }) {
        const talliers = new Map(channelsOf(cascade).map((channel) => [channel, channelTallier()]));
        let sums = NO_VALUES;
        return {
          frame(frame) {
            for (const [channel, tallier] of talliers) {
              const field = frame.field(channel.quantity);
              if (field !== null) tallier.add(field);
            }
            const height = heightOf(frame);
            if (height === null) return;
            const thinned = thinnedHeights(height.values, cascade, manifest.conventions.rowZero);
            sums = mergedPowerSums(sums, powerSums(thinned));
          },
          verdicts() {
            heights.push(sums);
            const texels = cascade.resolution ** 2 * cascade.loop.frameCount;
            if ([...talliers.values()].some(({ tally }) => tally().count !== texels)) {
              whole = false;
              return [notApplicable('not every frame of the loop was there to be read')];
            }
            return [figuresVerdict(cascadeFigures(cascade, talliers, sums))];
          },
        };
      },
      whole() {
        const question = 'Are its figures of the whole sea those of its cascades?';
        if (!whole) return [answering(question, notApplicable('not every frame was there to be read'))];
        return [answering(question, figuresVerdict(seaFigures(manifest, heights)))];
      },
    };
  },
};

function channelsOf({ maps }: ManifestCascade): readonly ManifestChannel[] {
  return Object.values(maps).flatMap(({ channels }) => channels);
}

function heightChannel(cascade: ManifestCascade): ManifestChannel | undefined {
  const channels = channelsOf(cascade);
  return (
    channels.find(({ quantity }) => quantity === 'displacement-up') ??
    channels.find(({ quantity }) => quantity === 'height')
  );
}

/** From this resolution on moments of the height are those of every second texel each way, in the order of the file. */
const THINNED_FROM = 128;

function thinnedHeights(
  values: Float64Array,
  { resolution: N }: ManifestCascade,
  rowZero: string,
): Float64Array {
  if (N < THINNED_FROM) return values;
  const half = N / 2;
  const thinned = new Float64Array(half * half);
  // Rows of the file are counted from the north where its first one is: every second of them is an odd one here.
  const first = rowZero === 'north' ? 1 : 0;
  for (let row = 0, o = 0; row < half; row++) {
    for (let column = 0, i = (2 * row + first) * N; column < half; column++, i += 2) thinned[o++] = values[i];
  }
  return thinned;
}

function cascadeFigures(
  cascade: ManifestCascade,
  talliers: ReadonlyMap<ManifestChannel, ChannelTallier>,
  heights: PowerSums,
): readonly StatedFigure[] {
  const figures: StatedFigure[] = [];
  for (const [channel, { tally }] of talliers) {
    const { quantity, written } = channel;
    const si = siPerUnit(channel);
    const { min, max, mean, deviation, extremes } = tally();
    const size = Math.max(Math.abs(min), Math.abs(max)) / si;
    figures.push(
      figure(`the smallest ${quantity}`, written.min, min / si, size),
      figure(`the largest ${quantity}`, written.max, max / si, size),
      figure(`the mean ${quantity}`, written.mean, mean / si, size),
      figure(`the deviation of ${quantity}`, written.deviation, deviation / si, size),
      // Which of the texels at the ends of the range were clipped the files do not say, only how many it can be.
      figure(`the clipped texels of ${quantity}`, written.clipped, Math.min(written.clipped, extremes)),
    );
    if (quantity === 'foam') {
      const stated = cascade.foam?.coverage.measured ?? null;
      figures.push(figure('the foam coverage', stated, mean, 1));
    }
  }
  return [...figures, ...heightFigures(cascade, talliers, heights)];
}

function heightFigures(
  cascade: ManifestCascade,
  talliers: ReadonlyMap<ManifestChannel, ChannelTallier>,
  heights: PowerSums,
): readonly StatedFigure[] {
  const { statistics } = cascade;
  const channel = heightChannel(cascade);
  const tally = channel === undefined ? null : (talliers.get(channel)?.tally() ?? null);
  const varied = variance(heights) > 0;
  return [
    figure('the significant height', statistics.significantHeightM.measured, tally && 4 * tally.deviation),
    figure('the skewness', statistics.skewness, varied ? skewness(heights) : null, 1),
    figure('the kurtosis', statistics.kurtosis, varied ? kurtosis(heights) : null),
    figure('the largest crest', statistics.largestCrestM, tally?.max ?? null),
    figure('the deepest trough', statistics.deepestTroughM, tally?.min ?? null),
    figure('the step of the height', statistics.heightStepMm, heightStepMm(cascade)),
  ];
}

function heightStepMm(cascade: ManifestCascade): number | null {
  const channel = heightChannel(cascade);
  const map = cascade.maps.displacement ?? cascade.maps.height;
  if (channel === undefined || map === undefined || map.sample === 'float') return null;
  const scaleMm = 1000 * siPerUnit(channel) * Math.abs(channel.decode.scale);
  if (map.sample !== 'half') return scaleMm / (map.sample === 'uint8' ? 255 : 65535);
  const { min, max } = channel.written;
  return scaleMm * halfStep(Math.max(-min, max) / Math.abs(channel.decode.scale));
}

function seaFigures(
  { cascades, statistics }: Manifest,
  heights: readonly PowerSums[],
): readonly StatedFigure[] {
  const all = cascades.map((cascade) => cascade.statistics);
  const known = all.every(({ significantHeightM }) => significantHeightM.measured !== null);
  const total = (f: (figures: (typeof all)[number]) => number | null): number | null =>
    known ? all.reduce((sum, one) => sum + (f(one) ?? 0), 0) : null;
  const m2 = heights.reduce((sum, one) => sum + variance(one), 0);
  const varying = heights.filter((one) => variance(one) > 0);
  const third = varying.reduce((sum, one) => sum + skewness(one) * variance(one) ** 1.5, 0);
  const fourth = varying.reduce((sum, one) => sum + (kurtosis(one) - 3) * variance(one) ** 2, 0);
  const varied = known && m2 > 0;
  const squares = total(({ significantHeightM }) => (significantHeightM.measured ?? 0) ** 2);
  const foams = cascades.flatMap(({ foam }) => (foam === null ? [] : [foam.coverage.measured]));
  const clear = foams.reduce((product, coverage) => product * (1 - coverage), 1);
  const crests = total(({ largestCrestM }) => largestCrestM);
  const troughs = total(({ deepestTroughM }) => deepestTroughM);
  return [
    figure('the significant height', statistics.significantHeightM.measured, squares && Math.sqrt(squares)),
    figure('the skewness', statistics.skewness, varied ? third / m2 ** 1.5 : null, 1),
    figure('the kurtosis', statistics.kurtosis, varied ? 3 + fourth / m2 ** 2 : null),
    figure('the largest crest', statistics.largestCrestBoundM, crests),
    figure('the deepest trough', statistics.deepestTroughBoundM, troughs),
    figure('the foam coverage', statistics.foamCoverage.measured, foams.length === 0 ? null : 1 - clear, 1),
  ];
}
