import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { isPlanText, parsePlan, planText } from '../../../src/plan/plan-text.ts';
import { tinyCurrentSea, tinyEveryMapSea, tinySea } from '../../support/tiny-seas.ts';

function refusal(text: string): InputError {
  try {
    parsePlan(text, 'sea.plan.json');
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error('was not refused');
}

describe('a plan as text', () => {
  it.each([
    ['in deep water', tinySea()],
    ['on a current', tinyCurrentSea()],
    ['with every map', tinyEveryMapSea()],
    ['of the name Infinity', tinySea({ title: 'Infinity' })],
    ['with a survey to come', tinySea({ maps: { displacement: { format: 'png', bits: 8 } } })],
  ])('%s comes back as it was', (_, sea) => {
    const { plan } = planBake(sea);
    const text = planText(plan);
    expect(parsePlan(text, 'plan')).toEqual(plan);
    expect(planText(parsePlan(text, 'plan'))).toBe(text);
  });

  it('is told from a sea file', () => {
    expect(isPlanText(planText(planBake(tinySea()).plan))).toBe(true);
    expect(isPlanText('{ "format" : "loopswell-plan" }')).toBe(true);
    for (const text of ['seaFile: 1\n', '{ "seaFile": 1 }', '', '{ "format": "loopswell-manifest" }']) {
      expect(isPlanText(text)).toBe(false);
    }
  });
});

describe('a plan that is refused', () => {
  const text = planText(planBake(tinySea()).plan);

  it.each([
    ['the seed', '"seed": 3', '"seed": 4'],
    ['a patch', '"patchLengthM": 30', '"patchLengthM": 31'],
    ['the depth', '"depthM": "Infinity"', '"depthM": 1000'],
    ['the hash', '"hash": "sha256:', '"hash": "sha256:0'],
  ])('was altered in %s', (_, from, to) => {
    expect(text).toContain(from);
    const { problems } = refusal(text.replace(from, to));
    expect(problems[0]).toMatchObject({ path: 'hash', remedy: expect.stringContaining('altered') });
  });

  it('was altered in its report, from which the manifest takes figures', () => {
    const { problems } = refusal(text.replace('"warnings": [', '"warnings": [ "look", '));
    expect(problems[0]).toMatchObject({ path: 'reportHash', remedy: expect.stringContaining('altered') });
  });

  it('is of another output version', () => {
    const { problems } = refusal(text.replace(/"outputVersion": \d+/, '"outputVersion": 999'));
    expect(problems[0]).toMatchObject({
      path: 'generator.outputVersion',
      found: expect.stringContaining('999'),
    });
  });

  it.each([
    ['no JSON', 'seaFile: 1'],
    ['no plan', '{ "seaFile": 1 }'],
    ['nothing', 'null'],
    ['cut short', text.slice(0, 3000)],
    ['of another version', text.replace('"version": 1,', '"version": 2,')],
  ])('is %s', (_, wrong) => {
    const error = refusal(wrong);
    expect(error.source).toBe('sea.plan.json');
    expect(error.exitStatus).toBe(65);
    expect(error.problems[0].remedy).not.toBe('');
  });
});
