import { amplitudesHash } from '../../plan/plan-bake.ts';
import { fieldDeviations } from '../../waves/field-deviations.ts';
import type { CascadeFacts } from '../cascade-facts.ts';
import type { Check } from '../check.ts';
import { notApplicable, verdict } from '../verdict.ts';

/**
 * The manifest holds all that the waves were drawn from: drawn anew they must be the same to the bit, and give the
 * manifest's expected height, slope variance and compression.
 */
export const WAVES: Check = {
  name: 'waves',
  question: 'Do the waves drawn from the manifest alone have the hash and the figures that it states?',
  quick: true,
  begin() {
    return {
      cascade(facts) {
        return {
          verdicts({ readable }) {
            // The memory for the waves of a large tile is taken only for a bake that shows one.
            if (!readable) return [notApplicable('no file of the cascade can be used')];
            const faults = waveFaults(facts);
            const reason =
              'the same numbers give the same waves; a runtime whose mathematics rounds otherwise shows here too';
            return [verdict(faults.length, { limit: 0, unit: 'faults', reason }, faults)];
          },
        };
      },
    };
  },
};

function waveFaults({ cascade, manifest, waves, water }: CascadeFacts): readonly string[] {
  const { amplitudes, expectedVariance } = waves();
  const faults: string[] = [];
  const hash = amplitudesHash(amplitudes);
  if (hash !== cascade.amplitudesHash) {
    faults.push(`the amplitudes hash to ${hash}, not to ${cascade.amplitudesHash}`);
  }
  const { significantHeightM, slopeVariance, jacobianDeviation } = cascade.statistics;
  const deviations = fieldDeviations(amplitudes, water.depthM, manifest.sea.horizontalScale);
  const expect = (what: string, stated: number, drawn: number): void => {
    // Sums of a hundred thousand terms in one order: another runtime may differ in the last digits.
    if (!(Math.abs(stated - drawn) <= 1e-9 * Math.abs(drawn)))
      faults.push(`${what} is ${drawn}, stated ${stated}`);
  };
  expect('the expected significant height', significantHeightM.expected, 4 * Math.sqrt(expectedVariance));
  const bothAxes = deviations.slopeEast ** 2 + deviations.slopeNorth ** 2;
  expect('the slope variance', slopeVariance.alongWind + slopeVariance.acrossWind, bothAxes);
  expect('the deviation of J', jacobianDeviation, deviations.compression);
  return faults;
}
