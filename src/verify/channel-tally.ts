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
      const { values } = field;
      // Local, as writing to captured variables in the loop takes twice as long.
      let sum = 0;
      let squares = 0;
      let least = min;
      let most = max;
      for (let i = 0; i < values.length; i++) {
        const value = values[i];
        sum += value;
        squares += value * value;
        if (value < least) least = value;
        if (value > most) most = value;
      }
      min = least;
      max = most;
      count += values.length;
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
