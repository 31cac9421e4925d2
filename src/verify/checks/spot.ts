import type { Quantity } from '../../image/image.ts';
import type { CascadeFacts } from '../cascade-facts.ts';
import type { Check } from '../check.ts';
import { directSum, type TexelValues } from '../direct-sum.ts';
import type { FieldValues } from '../field-values.ts';
import type { SeenFrame } from '../frame-reader.ts';
import { keyedIndices } from '../keyed.ts';
import { shareOfRounding } from '../residual.ts';
import { engineNoise } from '../rounding.ts';
import { firstOf, notApplicable, verdict } from '../verdict.ts';

/**
 * At a few keyed texels of a few keyed frames every map but foam is computed by adding up all waves one by one, with the
 * amplitudes drawn anew from the manifest and no transform: what is stored must be that, rounded.
 */
export const SPOT: Check = {
  name: 'spot',
  question: 'Do single texels hold the sum of the waves that the manifest gives?',
  quick: true,
  begin() {
    return {
      cascade(facts) {
        const frames = facts.keyedFrames.slice(0, FRAMES);
        const spots: Spot[] = [];
        return {
          keyedFrame(frame) {
            if (frames.includes(frame.index)) spots.push(...spotsOf(frame, facts));
          },
          verdicts() {
            if (spots.length === 0) return [notApplicable('no map but foam was there to be read')];
            const [worst] = [...spots].sort((a, b) => b.share - a.share);
            const wrong = spots.filter(({ share }) => !(share <= LIMIT));
            const reason =
              'what is stored is the nearest sample to the value: off by half a step at most (a whole one where dithered)';
            return [
              verdict(worst.share, { limit: LIMIT, unit: 'x rounding', reason }, [
                `${spots.length} values of ${frames.length} frames`,
                ...firstOf(
                  wrong.map(({ sentence }) => sentence),
                  6,
                ),
              ]),
            ];
          },
        };
      },
    };
  },
};

const FRAMES = 4;
const TEXELS = 16;
/** Values that lie on the border of two samples to the last digits of a double may go either way. */
const LIMIT = 1 + 1e-6;

interface Spot {
  readonly share: number;
  readonly sentence: string;
}

const VALUES: readonly (readonly [Quantity, (at: TexelValues) => number])[] = [
  ['displacement-east', ({ east }) => east],
  ['displacement-north', ({ north }) => north],
  ['displacement-up', ({ height }) => height],
  ['height', ({ height }) => height],
  ['velocity-east', ({ eastRate }) => eastRate],
  ['velocity-north', ({ northRate }) => northRate],
  ['velocity-up', ({ heightRate }) => heightRate],
  ['slope-east', ({ Sx }) => Sx],
  ['slope-north', ({ Sy }) => Sy],
  ['strain-east-east', ({ Dxx }) => Dxx],
  ['strain-north-north', ({ Dyy }) => Dyy],
  ['strain-east-north', ({ Dxy }) => Dxy],
  ['jacobian', ({ Dxx, Dyy, Dxy }) => (1 + Dxx) * (1 + Dyy) - Dxy * Dxy],
  ['normal-east', (at) => normalOf(at)[0]],
  ['normal-north', (at) => normalOf(at)[1]],
  ['normal-up', (at) => normalOf(at)[2]],
];

function normalOf({ Sx, Sy, Dxx, Dyy, Dxy }: TexelValues): readonly [number, number, number] {
  const v = [
    Dxy * Sy - Sx * (1 + Dyy),
    Sx * Dxy - (1 + Dxx) * Sy,
    (1 + Dxx) * (1 + Dyy) - Dxy * Dxy,
  ] as const;
  const length = Math.hypot(...v);
  return [v[0] / length, v[1] / length, v[2] / length];
}

function spotsOf(frame: SeenFrame, facts: CascadeFacts): readonly Spot[] {
  const fields = VALUES.flatMap(([quantity, exactOf]) => {
    const field = frame.field(quantity);
    return field === null ? [] : [{ field, exactOf }];
  });
  if (fields.length === 0) return [];
  const N = facts.cascade.resolution;
  const { planHash, generator } = facts.manifest;
  const texels = keyedIndices(TEXELS, N * N, `${planHash} ${facts.cascade.id} ${frame.index}`);
  const sum = directSum(facts, frame.index);
  return texels.flatMap((texel) => {
    const at = sum(texel % N, Math.floor(texel / N));
    return fields.map(({ field, exactOf }) =>
      spot(field, exactOf(at), texel, N, frame.number, engineNoise(generator.engine)),
    );
  });
}

function spot(
  field: FieldValues,
  exact: number,
  texel: number,
  N: number,
  frameNumber: number,
  engine: number,
): Spot {
  const stored = field.values[texel];
  // The transforms' own noise goes with the largest field of its kind.
  const noise = engine * field.size;
  const share = shareOfRounding(field, exact, stored, noise);
  const place = `frame ${frameNumber}, texel ${texel % N} east, ${Math.floor(texel / N)} north`;
  return { share, sentence: `${field.quantity} at ${place}: ${stored} stored, ${exact} by the sum` };
}
