import { amplitudesHash } from '../../plan/plan-bake.ts';
import { fieldDeviations } from '../../waves/field-deviations.ts';
import type { CascadeFacts } from '../cascade-facts.ts';
import type { Check } from '../check.ts';
import { figure, figuresVerdict, type StatedFigure } from '../stated-figures.ts';
import { answering, notApplicable, verdict } from '../verdict.ts';
import { windDirection } from '../wind.ts';

/**
 * The manifest holds all that the waves were drawn from: drawn anew they must be the same to the bit, and give the
 * manifest's expected height, slope variance and deviation of the Jacobian.
 */
export const WAVES: Check = {
  name: 'waves',
  question: 'Are the waves drawn from the manifest alone the ones that it was baked from?',
  quick: true,
  begin() {
    return {
      cascade(facts) {
        return {
          verdicts({ readable }) {
            // The memory for the waves of a large tile is taken only for a bake that shows one.
            if (!readable) return [notApplicable('no file of the cascade can be used')];
            const question = 'Do these waves have the figures that the manifest states?';
            return [hashVerdict(facts), answering(question, figuresVerdict(waveFigures(facts)))];
          },
        };
      },
    };
  },
};

function hashVerdict({ cascade, waves }: CascadeFacts): ReturnType<typeof verdict> {
  const hash = amplitudesHash(waves().amplitudes);
  const same = hash === cascade.amplitudesHash;
  const reason =
    'the same numbers give the same waves to the bit; a runtime whose mathematics rounds otherwise shows here too';
  const details = same ? [] : [`the amplitudes hash to ${hash}, stated is ${cascade.amplitudesHash}`];
  return verdict(same ? 0 : 1, { limit: 0, unit: 'hashes that differ', reason }, details);
}

function waveFigures({ cascade, manifest, waves, water }: CascadeFacts): readonly StatedFigure[] {
  const { amplitudes, expectedVariance } = waves();
  const { significantHeightM, slopeVariance, jacobianDeviation } = cascade.statistics;
  const { slopeEast, slopeNorth, slopeProduct, compression } = fieldDeviations(
    amplitudes,
    water.depthM,
    manifest.sea.horizontalScale,
  );
  const toward = windDirection(manifest);
  const [c, s] = [Math.cos(toward), Math.sin(toward)];
  const both = slopeEast ** 2 + slopeNorth ** 2;
  const along = (c * slopeEast) ** 2 + (s * slopeNorth) ** 2 + 2 * c * s * slopeProduct;
  const expected = 4 * Math.sqrt(expectedVariance);
  return [
    figure('the expected significant height', significantHeightM.expected, expected),
    figure('the slope variance along the wind', slopeVariance.alongWind, along, both),
    figure('the slope variance across it', slopeVariance.acrossWind, both - along, both),
    figure('the deviation of J', jacobianDeviation, compression),
  ];
}
