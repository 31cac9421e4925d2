import type { Quantity } from '../../image/image.ts';
import type { Check } from '../check.ts';
import { relativeToMedian, STEADINESS_REASON, steadyLimit } from '../steadiness.ts';
import { firstOf, notApplicable, verdict } from '../verdict.ts';
import { watchedChannels } from '../watched-channels.ts';

/**
 * The mean square difference of neighbouring columns and rows of texels, over all frames seen: across the seam, where
 * the tile meets its repeat, it must be like that inside.
 */
export const TILE: Check = {
  name: 'tile',
  question: 'Is the seam of the tile no rougher than its inside?',
  quick: true,
  begin() {
    return {
      cascade({ cascade }) {
        const N = cascade.resolution;
        const watched = watchedChannels(cascade).map((quantity) => roughness(quantity, N));
        return {
          frame({ field }) {
            for (const { quantity, add } of watched) {
              const values = field(quantity)?.values;
              if (values !== undefined) add(values);
            }
          },
          verdicts() {
            const seen = watched.filter(({ frames }) => frames() > 0);
            if (seen.length === 0) return [notApplicable('no map but foam was there to be read')];
            const rows = seen.flatMap(({ quantity, columns, rows }) => [
              seam(`${quantity}, west to east`, columns),
              seam(`${quantity}, south to north`, rows),
            ]);
            const [most] = [...rows].sort((a, b) => b.step / b.limit - a.step / a.limit);
            const reason = `mean square differences of neighbours: ${STEADINESS_REASON}`;
            return [
              verdict(
                most.step,
                { limit: most.limit, unit: 'x median', reason },
                firstOf(
                  rows.map(
                    ({ name, step, limit }) =>
                      `${name}: ${step.toPrecision(4)} of at most ${limit.toPrecision(4)}`,
                  ),
                  6,
                ),
              ),
            ];
          },
        };
      },
    };
  },
};

interface Roughness {
  readonly quantity: Quantity;
  /** Sum of squared differences between a column (row) and the next, the seam last; Float64Array N. */
  readonly columns: Float64Array;
  readonly rows: Float64Array;
  readonly frames: () => number;
  readonly add: (values: Float64Array) => void;
}

function roughness(quantity: Quantity, N: number): Roughness {
  const columns = new Float64Array(N);
  const rows = new Float64Array(N);
  let frames = 0;
  return {
    quantity,
    columns,
    rows,
    frames: () => frames,
    add(values) {
      frames++;
      for (let y = 0; y < N; y++) {
        const row = y * N;
        const next = y + 1 < N ? row + N : 0;
        let sum = 0;
        for (let x = 0; x < N; x++) {
          const here = values[row + x];
          const up = values[next + x] - here;
          const right = values[x + 1 < N ? row + x + 1 : row] - here;
          sum += up * up;
          columns[x] += right * right;
        }
        rows[y] += sum;
      }
    },
  };
}

function seam(
  name: string,
  sums: Float64Array,
): { readonly name: string; readonly step: number; readonly limit: number } {
  const inside = [...sums.subarray(0, -1)];
  return { name, step: relativeToMedian(sums[sums.length - 1], inside), limit: steadyLimit(inside) };
}
