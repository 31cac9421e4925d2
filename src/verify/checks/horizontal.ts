import type { Check } from '../check.ts';
import { residual } from '../residual.ts';
import { notApplicable } from '../verdict.ts';

/**
 * The horizontal displacement is made anew from the height, in the spectrum,
 *
 *     D(k) = i khat coth(kh) horizontalScale h(k),
 *
 * so that points gather at crests, and compared texel by texel on a few keyed frames.
 */
export const HORIZONTAL: Check = {
  name: 'horizontal',
  question: 'Does the horizontal displacement follow from the height?',
  quick: true,
  begin({ manifest }) {
    return {
      cascade(facts) {
        const difference = residual(manifest.generator.engine);
        return {
          keyedFrame(frame) {
            const surface = facts.surface(frame);
            const east = frame.field('displacement-east');
            const north = frame.field('displacement-north');
            if (surface === null || east === null || north === null) return;
            difference.add(east, surface.east, surface.noise.east);
            difference.add(north, surface.north, surface.noise.north);
          },
          verdicts() {
            if (difference.frames() === 0) return [notApplicable('there is no displacement map to be read')];
            return [difference.verdict()];
          },
        };
      },
    };
  },
};
