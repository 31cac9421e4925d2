import type { Check } from '../check.ts';
import { engineNoise, LARGEST_IN_DEVIATIONS } from '../rounding.ts';
import { FLAT, notApplicable, verdict } from '../verdict.ts';

/**
 * The share of the height's variance that does not turn as the dispersion relation says, quantised to whole turns per
 * loop, with depth, surface tension and current. By Parseval the variance of all waves and turns together is the mean
 * square of the height; what rounding and clipping add is spread over all of them and lies off the shell.
 */
export const DISPERSION: Check = {
  name: 'dispersion',
  question: 'Does every wave move at the speed of its length, depth and current?',
  quick: false,
  begin({ manifest }) {
    const engine = LARGEST_IN_DEVIATIONS * engineNoise(manifest.generator.engine);
    return {
      cascade() {
        return {
          verdicts({ waves, withoutWaves }) {
            if (waves === null) return [notApplicable(withoutWaves)];
            const { meanSquare, onShell, rounding } = waves;
            if (meanSquare === 0) return [notApplicable(FLAT)];
            const allowed = ROUNDING_MARGIN * (rounding / meanSquare) + SUMMATION + engine * engine;
            return [
              verdict(
                1 - onShell / meanSquare,
                {
                  limit: allowed,
                  unit: 'of the variance',
                  reason: `rounding of the files puts ${(rounding / meanSquare).toExponential(1)} off the shell; half as much again is allowed`,
                },
                [`${(100 * (onShell / meanSquare)).toFixed(7)} % of the variance lies on the shell`],
              ),
            ];
          },
        };
      },
    };
  },
};

/** The mean square error of rounding is a model, right to some ten percent. */
const ROUNDING_MARGIN = 1.5;
/** Sums of millions of squares, and the transforms' own rounding. */
const SUMMATION = 1e-11;
