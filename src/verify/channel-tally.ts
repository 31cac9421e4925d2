import type { FieldValues } from './field-values.ts';

/** What a channel's files hold, over the frames seen; SI. */
export interface ChannelTally {
  readonly count: number;
  readonly mean: number;
  readonly deviation: number;
  readonly min: number;
  readonly max: number;
  /** Texels at the ends of an integer channel's range. */
  readonly extremes: number;
}

/** Adds up a channel's fields, one a frame. */
export interface ChannelTallier {
  readonly add: (field: FieldValues) => void;
  readonly tally: () => ChannelTally;
}

export function channelTallier(): ChannelTallier {
  let [count, total, totalSquares, min, max, extremes] = [0, 0, 0, Infinity, -Infinity, 0];
  return {
    add(field) {
      let [sum, squares] = [0, 0];
      for (const value of field.values) {
        sum += value;
        squares += value * value;
        if (value < min) min = value;
        if (value > max) max = value;
      }
      count += field.values.length;
      total += sum;
      totalSquares += squares;
      extremes += field.extremes;
    },
    tally() {
      const mean = total / count;
      const deviation = Math.sqrt(Math.max(0, totalSquares / count - mean * mean));
      return { count, mean, deviation, min, max, extremes };
    },
  };
}
