import type { ManifestCascade, ManifestChannel } from '../../manifest/manifest.ts';
import type { Check } from '../check.ts';
import { type FieldValues, siPerUnit } from '../field-values.ts';
import { answering, firstOf, notApplicable, verdict } from '../verdict.ts';

/** Sums of millions of numbers, added in another order. */
const LIMIT = {
  limit: 1e-9,
  unit: 'relative',
  reason: 'the same numbers are added up in another order',
} as const;

/**
 * The figures in the manifest that describe the files: smallest, largest, mean and deviation of every channel, clipped
 * texels, measured heights and foam coverage.
 */
export const FIGURES: Check = {
  name: 'figures',
  question: 'Are the figures of the manifest those of its files?',
  quick: false,
  begin({ manifest }) {
    const heights: (number | null)[] = [];
    return {
      cascade({ cascade }) {
        const tallies = new Map<ManifestChannel, ChannelTally>();
        for (const { channels } of Object.values(cascade.maps)) {
          for (const channel of channels) tallies.set(channel, emptyTally());
        }
        return {
          frame({ field }) {
            for (const [channel, tally] of tallies) {
              const seen = field(channel.quantity);
              if (seen !== null) addValues(tally, seen);
            }
          },
          verdicts() {
            heights.push(cascade.statistics.significantHeightM.measured);
            const texels = cascade.resolution ** 2 * cascade.loop.frameCount;
            if ([...tallies.values()].some(({ count }) => count !== texels)) {
              return [notApplicable('not every frame of the loop was there to be read')];
            }
            const rows = [...tallies].flatMap(([channel, tally]) => channelRows(channel, tally));
            rows.push(...cascadeRows(cascade, tallies));
            return [verdictOf(rows)];
          },
        };
      },
      whole() {
        const { measured } = manifest.statistics.significantHeightM;
        const question = 'Is the measured height of the sea that of its cascades?';
        const known = heights.filter((height) => height !== null);
        if (measured === null || known.length < heights.length) {
          return [answering(question, notApplicable('not every cascade has a map that holds the height'))];
        }
        const sum = Math.sqrt(known.reduce((total, height) => total + height * height, 0));
        return [
          answering(
            question,
            verdictOf([{ what: 'significant height', stated: measured, found: sum, size: sum }]),
          ),
        ];
      },
    };
  },
};

interface Row {
  readonly what: string;
  readonly stated: number;
  readonly found: number;
  /** What a difference is compared with. */
  readonly size: number;
}

function verdictOf(rows: readonly Row[]): ReturnType<typeof verdict> {
  const differences = rows.map(({ stated, found, size }) =>
    stated === found ? 0 : Math.abs(stated - found) / Math.max(Math.abs(size), Number.MIN_VALUE),
  );
  const wrong = rows
    .filter((_, r) => !(differences[r] <= LIMIT.limit))
    .map(({ what, stated, found }) => `${what} is ${found}, stated ${stated}`);
  return verdict(Math.max(0, ...differences), LIMIT, firstOf(wrong));
}

interface ChannelTally {
  count: number;
  sum: number;
  squares: number;
  min: number;
  max: number;
  /** Texels at the ends of an integer channel's range. */
  extremes: number;
}

function emptyTally(): ChannelTally {
  return { count: 0, sum: 0, squares: 0, min: Infinity, max: -Infinity, extremes: 0 };
}

function addValues(tally: ChannelTally, { values, extremes }: FieldValues): void {
  let [sum, squares, min, max] = [0, 0, tally.min, tally.max];
  for (const value of values) {
    sum += value;
    squares += value * value;
    if (value < min) min = value;
    if (value > max) max = value;
  }
  tally.extremes += extremes;
  tally.count += values.length;
  tally.sum += sum;
  tally.squares += squares;
  tally.min = min;
  tally.max = max;
}

function meanOf({ sum, count }: ChannelTally): number {
  return sum / count;
}

function deviationOf(tally: ChannelTally): number {
  return Math.sqrt(Math.max(0, tally.squares / tally.count - meanOf(tally) ** 2));
}

function channelRows(channel: ManifestChannel, tally: ChannelTally): readonly Row[] {
  const si = siPerUnit(channel);
  const { quantity, written } = channel;
  const size = Math.max(Math.abs(tally.min), Math.abs(tally.max)) / si;
  const row = (what: string, stated: number, found: number): Row => {
    return { what: `${what} of ${quantity}`, stated, found: found / si, size };
  };
  return [
    row('smallest', written.min, tally.min),
    row('largest', written.max, tally.max),
    row('mean', written.mean, meanOf(tally)),
    row('deviation', written.deviation, deviationOf(tally)),
    // Which of the texels at the ends of the range were clipped the files do not say, only how many it can be.
    {
      what: `clipped texels of ${quantity}`,
      stated: written.clipped,
      found: Math.min(written.clipped, tally.extremes),
      size: 1,
    },
  ];
}

function cascadeRows(
  cascade: ManifestCascade,
  tallies: ReadonlyMap<ManifestChannel, ChannelTally>,
): readonly Row[] {
  const rows: Row[] = [];
  const { measured } = cascade.statistics.significantHeightM;
  const all = [...tallies];
  const height =
    all.find(([{ quantity }]) => quantity === 'displacement-up') ??
    all.find(([{ quantity }]) => quantity === 'height');
  if (height !== undefined) {
    const found = 4 * deviationOf(height[1]);
    rows.push({ what: 'significant height', stated: measured ?? Number.NaN, found, size: found });
  }
  const foam = all.find(([{ quantity }]) => quantity === 'foam');
  if (foam !== undefined) {
    const found = meanOf(foam[1]);
    rows.push({
      what: 'foam coverage',
      stated: cascade.foam?.coverage.measured ?? Number.NaN,
      found,
      size: 1,
    });
  }
  return rows;
}
