import type { FieldValues } from './field-values.ts';
import { engineNoise, roundingBound, roundingExcess } from './rounding.ts';
import { type Verdict, verdict } from './verdict.ts';

/**
 * How far a map lies from what another map predicts of it, in units of what rounding explains:
 *
 *     r^2 = mean of (excess / s)^2
 *
 * where the excess is what is left of the difference after the map's own rounding, which is at most half a step, and s
 * is the standard error that the rounding of the other map puts on the prediction. It can only be above 1 where the
 * difference is more than rounding.
 */
export interface Residual {
  /**
   * Adds one field of one frame.
   *
   * @param predicted values by another route, Float64Array N*N
   * @param errorSquare mean square error of a prediction; one for all texels, or Float64Array N*N
   */
  readonly add: (field: FieldValues, predicted: Float64Array, errorSquare: number | Float64Array) => void;
  readonly frames: () => number;
  readonly verdict: () => Verdict;
}

/** White rounding noise is a model: it is right to a few percent, coarse codes of smooth waves are the worst of it. */
const LIMIT = 1.2;

/** @param engine the engine that made the frames, whose own noise counts too */
export function residual(engine: string): Residual {
  const noise = engineNoise(engine);
  const worst = new Map<string, { readonly sum: number; readonly count: number; readonly largest: number }>();
  let frames = 0;
  return {
    add({ quantity, values, rounding, size }, predicted, errorSquare) {
      frames++;
      const floor = (noise * size) ** 2 + Number.MIN_VALUE;
      const sofar = worst.get(quantity) ?? { sum: 0, count: 0, largest: 0 };
      let { sum, largest } = sofar;
      for (let i = 0; i < values.length; i++) {
        const excess = roundingExcess(rounding, predicted[i], values[i]);
        if (excess === 0) continue;
        const square = typeof errorSquare === 'number' ? errorSquare : errorSquare[i];
        const ratio = (excess * excess) / (square + floor);
        sum += ratio;
        if (ratio > largest) largest = ratio;
      }
      worst.set(quantity, { sum, count: sofar.count + values.length, largest });
    },
    frames: () => frames,
    verdict() {
      const rows = [...worst].map(([quantity, { sum, count, largest }]) => ({
        r: Math.sqrt(sum / count),
        sentence: `${quantity}: ${Math.sqrt(sum / count).toPrecision(3)}, largest of a texel ${Math.sqrt(largest).toPrecision(3)}`,
      }));
      const limit = {
        limit: LIMIT,
        unit: 'x rounding',
        reason:
          'the files are rounded; beyond half a step of the map itself, no more difference is allowed than the rounding of its source causes (standard error by white noise, right to 20 %)',
      };
      return verdict(
        Math.max(...rows.map(({ r }) => r)),
        limit,
        rows.map(({ sentence }) => sentence),
      );
    },
  };
}

/**
 * Distance of a value known exactly, but for `noise`, from what was stored of it, in units of the most that rounding can
 * do: at most 1 for a stored value that is right, clipped ones included.
 */
export function shareOfRounding(
  { rounding }: FieldValues,
  exact: number,
  stored: number,
  noise: number,
): number {
  const share = Math.max(0, Math.abs(exact - stored) - noise) / roundingBound(rounding, stored);
  return roundingExcess(rounding, exact, stored) === 0 ? Math.min(1, share) : share;
}
