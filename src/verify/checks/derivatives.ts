import type { Quantity } from '../../image/image.ts';
import type { CascadeFacts } from '../cascade-facts.ts';
import type { Check, SeenLoop } from '../check.ts';
import type { SeenFrame } from '../frame-reader.ts';
import { type Residual, residual } from '../residual.ts';
import type { Surface } from '../surface.ts';
import { jacobianOf, normalsOf, type Prediction } from '../surface-shape.ts';
import { velocityMaker } from '../velocity.ts';
import { answering, notApplicable, type Verdict } from '../verdict.ts';

/**
 * Slope, strain, normal and Jacobian are made anew from the displacement by differentiating it in the spectrum, and the
 * velocity by turning the waves that the loop of height frames shows; all in double precision and compared texel by
 * texel on a few keyed frames, with the rounding of both sides allowed for and no more.
 */
export const DERIVATIVES: Check = {
  name: 'derivatives',
  question: 'Do slope, strain, normal, Jacobian and velocity follow from the displacement?',
  quick: true,
  begin({ manifest }) {
    return {
      cascade(facts) {
        const rows = MAPS.filter(({ map }) => facts.cascade.maps[map] !== undefined).map((row) => ({
          ...row,
          difference: residual(manifest.generator.engine),
        }));
        return {
          keyedFrame(frame, loop) {
            const surface = facts.surface(frame);
            if (surface === null) return;
            for (const { predictions, difference } of rows) {
              addPredictions(difference, frame, predictions(surface, frame, loop, facts));
            }
          },
          verdicts({ waves, withoutWaves }) {
            if (rows.length === 0) return [notApplicable('the bake has none of these maps')];
            return rows.map(({ map, what, difference }): Verdict => {
              const question = `Does the ${map} map hold ${what}?`;
              if (difference.frames() > 0) return answering(question, difference.verdict());
              const reason =
                map === 'velocity' && waves === null
                  ? withoutWaves
                  : 'no map that holds the height, or not its frames, to be read';
              return answering(question, notApplicable(reason));
            });
          },
        };
      },
    };
  },
};

type Predictions = readonly (readonly [Quantity, Prediction])[];

interface DerivedMap {
  readonly map: 'slope' | 'strain' | 'normal' | 'jacobian' | 'velocity';
  readonly what: string;
  readonly predictions: (
    surface: Surface,
    frame: SeenFrame,
    loop: SeenLoop,
    facts: CascadeFacts,
  ) => Predictions;
}

const MAPS: readonly DerivedMap[] = [
  {
    map: 'slope',
    what: 'the gradient of the height',
    predictions: ({ Sx, Sy, noise }) => [
      ['slope-east', { values: Sx, errorSquare: noise.Sx }],
      ['slope-north', { values: Sy, errorSquare: noise.Sy }],
    ],
  },
  {
    map: 'strain',
    what: 'the symmetric gradient of the horizontal displacement',
    predictions: ({ Dxx, Dyy, Dxy, noise }) => [
      ['strain-east-east', { values: Dxx, errorSquare: noise.Dxx }],
      ['strain-north-north', { values: Dyy, errorSquare: noise.Dyy }],
      ['strain-east-north', { values: Dxy, errorSquare: noise.Dxy }],
    ],
  },
  {
    map: 'normal',
    what: 'the unit normal of the displaced surface',
    predictions(surface) {
      const [east, north, up] = normalsOf(surface);
      return [
        ['normal-east', east],
        ['normal-north', north],
        ['normal-up', up],
      ];
    },
  },
  {
    map: 'jacobian',
    what: 'the area of a displaced texel',
    predictions: (surface) => [['jacobian', jacobianOf(surface)]],
  },
  {
    map: 'velocity',
    what: 'the rate of change of the displacement',
    predictions(_surface, frame, { waves }, facts) {
      if (waves === null) return [];
      const [east, north, up] = velocityMaker(facts, waves)(frame.index);
      return [
        ['velocity-east', east],
        ['velocity-north', north],
        ['velocity-up', up],
      ];
    },
  },
];

function addPredictions(difference: Residual, frame: SeenFrame, predictions: Predictions): void {
  for (const [quantity, { values, errorSquare }] of predictions) {
    const field = frame.field(quantity);
    if (field !== null) difference.add(field, values, errorSquare);
  }
}
