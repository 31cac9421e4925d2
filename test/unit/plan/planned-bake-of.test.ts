import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors.ts';
import { planBake, plannedBakeOf } from '../../../src/plan/plan-bake.ts';
import { parsePlan, planText } from '../../../src/plan/plan-text.ts';
import { tinyCurrentSea, tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

describe('plannedBakeOf', () => {
  it.each([
    ['two cascades', tinyTwoCascadeSea()],
    ['a current', tinyCurrentSea()],
  ])('draws the waves of a saved plan anew, to the bit: %s', (_name, sea) => {
    const planned = planBake(sea);
    const again = plannedBakeOf(parsePlan(planText(planned.plan), 'plan.json'));
    expect(again.plan).toEqual(planned.plan);
    for (const [c, { amplitudes }] of planned.waves.entries()) {
      expect(again.waves[c].amplitudes.amplitude).toEqual(amplitudes.amplitude);
      expect(again.waves[c].amplitudes.turns).toEqual(amplitudes.turns);
    }
  });

  it('refuses where the waves come out otherwise, naming every cascade that does', () => {
    const { plan } = planBake(tinyTwoCascadeSea());
    const [first, second] = plan.cascades;
    const other = { ...plan, cascades: [first, { ...second, amplitudesHash: first.amplitudesHash }] };
    const refusal = ((): unknown => {
      try {
        return plannedBakeOf(other, 'plan.json');
      } catch (error) {
        return error;
      }
    })();
    expect(refusal).toBeInstanceOf(InputError);
    const { problems, source } = refusal as InputError;
    expect(source).toBe('plan.json');
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({
      path: 'cascades[1].amplitudesHash',
      expected: first.amplitudesHash,
      found: second.amplitudesHash,
    });
  });
});
