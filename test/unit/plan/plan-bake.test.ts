import { describe, expect, it } from 'vitest';
import type { Plan } from '../../../src/plan/plan.ts';
import { amplitudesHash, planBake, planHash, wavesOfPlan } from '../../../src/plan/plan-bake.ts';
import { fieldDeviations } from '../../../src/waves/field-deviations.ts';
import { tinyCurrentSea, tinyEveryMapSea, tinySea, tinyTwoCascadeSea } from '../../support/tiny-seas.ts';
import { expectRelative } from '../../support/tolerances.ts';

const { plan, waves } = planBake(tinyTwoCascadeSea());
const tinyHash = planBake(tinySea()).plan.hash;

describe('planBake', () => {
  it('decides the same twice', () => {
    expect(planBake(tinyTwoCascadeSea())).toEqual({ plan, waves });
  });

  it('draws waves of the height that the plan expects', () => {
    for (const [c, cascade] of plan.cascades.entries()) {
      expectRelative(cascade.deviations.height, cascade.expectedHeightDeviationM, 1e-12, cascade.id);
      expectRelative(waves[c].expectedVariance, cascade.expectedHeightDeviationM ** 2, 1e-12, cascade.id);
      expect(cascade.deviations).toEqual(fieldDeviations(waves[c].amplitudes, Infinity, 1));
      expect(cascade.amplitudesHash).toBe(amplitudesHash(waves[c].amplitudes));
    }
    const whole =
      4 * Math.hypot(...plan.cascades.map(({ expectedHeightDeviationM }) => expectedHeightDeviationM));
    expectRelative(plan.report.sea.expectedHeightM, whole, 1e-12, 'height');
    expectRelative(plan.report.sea.significantHeightM, 0.35, 1e-4, 'height asked for');
    expectRelative(plan.systems[0].significantHeightM, 0.35, 1e-4, 'height of the system');
  });

  it('is frozen all the way down', () => {
    const thawed: string[] = [];
    const visit = (value: unknown, path: string): void => {
      if (typeof value !== 'object' || value === null) return;
      if (!Object.isFrozen(value)) thawed.push(path);
      for (const [key, inner] of Object.entries(value)) visit(inner, `${path}.${key}`);
    };
    visit(plan, 'plan');
    expect(thawed).toEqual([]);
  });

  it('names every map of every cascade, foam only where it has a share', () => {
    const every = planBake(tinyEveryMapSea()).plan;
    expect(every.cascades[0].maps.map(({ pattern }) => pattern)).toEqual([
      'c0/displacement.%04d.png',
      'c0/height.%04d.png',
      'c0/velocity.%04d.exr',
      'c0/slope.%04d.png',
      'c0/strain.%04d.exr',
      'c0/normal.%04d.png',
      'c0/jacobian.%04d.png',
      'c0/foam.%04d.png',
    ]);
    const shares = planBake(tinyTwoCascadeSea({ foam: { coverage: 0.02, shares: [1, 0] } })).plan.cascades;
    expect(shares.map(({ maps }) => maps.some(({ map }) => map === 'foam'))).toEqual([true, false]);
    expect(shares[1].foam).toBeNull();
  });

  it('waves of a plan are drawn from its numbers alone', () => {
    const current = planBake(tinyCurrentSea());
    expect(wavesOfPlan(current.plan)).toEqual(current.waves);
    expect(wavesOfPlan(structuredClone(current.plan))).toEqual(current.waves);
  });
});

describe('hash of a plan', () => {
  it('is that of its content', () => {
    expect(planHash(plan)).toBe(plan.hash);
    expect(plan.hash).toMatch(/^sha256:[0-9a-f]{64}$/);
  });

  it('does not know the report', () => {
    const { report } = plan;
    expect(planHash({ ...plan, report: { ...report, warnings: ['other'] }, hash: '' })).toBe(plan.hash);
  });

  it('changes with every number and word outside the report', () => {
    const leaves: string[] = [];
    const unseen: string[] = [];
    const visit = (value: unknown, path: readonly string[]): void => {
      if (path[0] === 'report' || path[0] === 'hash') return;
      if (typeof value === 'object' && value !== null) {
        for (const [key, inner] of Object.entries(value)) visit(inner, [...path, key]);
        return;
      }
      leaves.push(path.join('.'));
      if (planHash(withLeaf(plan, path, value)) === plan.hash) unseen.push(path.join('.'));
    };
    visit(plan, []);
    expect(unseen).toEqual([]);
    expect(leaves.length).toBeGreaterThan(150);
  });

  // Whatever a sea file says that changes a byte of the files changes the plan that they belong to.
  it.each<[string, Readonly<Record<string, unknown>>]>([
    ['seed', { seed: 4 }],
    ['title', { title: 'Other title' }],
    [
      'system',
      { systems: [{ kind: 'wind-sea', from: 251, significantHeight: 0.35, peakPeriod: 2.4, windSpeed: 7 }] },
    ],
    ['depth', { water: { depth: 8 } }],
    ['current', { water: { current: { speed: 0.1, toward: 0 } } }],
    ['horizontal scale', { shaping: { horizontalScale: 1.1 } }],
    ['matching of the height', { shaping: { matchHeight: false } }],
    ['amplitudes', { shaping: { amplitudes: 'deterministic' } }],
    ['gain', { shaping: { bandGains: [{ shortest: 1, longest: 3, gain: 1.5 }] } }],
    ['against the wind', { shaping: { againstWind: 0.5 } }],
    ['frame rate', { loop: { frames: 8, frameRate: 2 } }],
    ['frame count', { loop: { frames: 10, frameRate: 1 } }],
    ['first frame', { loop: { frames: 8, frameRate: 1, firstFrame: 0 } }],
    ['padding', { output: { padding: 5 } }],
    ['patch', { cascades: [{ patch: 31, resolution: 32 }] }],
    ['resolution', { cascades: [{ patch: 30, resolution: 64 }] }],
    ['coverage', { foam: { coverage: 0.03 } }],
    ['residue', { foam: { coverage: 0.02, residue: 'keep' } }],
    ['decay', { foam: { coverage: 0.02, decayTime: 1 } }],
    ['maps', { maps: { displacement: 'exr', normal: 'png' } }],
    ['sample', { maps: { displacement: { format: 'exr', sample: 'float' }, normal: 'png', foam: 'png' } }],
    ['dithering', { maps: { displacement: 'exr', normal: { format: 'png', dither: false }, foam: 'png' } }],
    ['axes', { output: { axes: 'y-up' } }],
    ['rows', { output: { rowZero: 'south' } }],
    ['green', { output: { normalGreen: 'south' } }],
    ['unit', { output: { lengthUnit: 'cm' } }],
  ])('changes with the %s of a sea', (_, changes) => {
    expect(planBake(tinySea(changes)).plan.hash).not.toBe(tinyHash);
  });
});

/** A plan with one leaf changed to something else of its kind. */
function withLeaf(whole: Plan, path: readonly string[], value: unknown): Plan {
  const copy = structuredClone(whole) as unknown as Record<string, unknown>;
  const last = path[path.length - 1];
  const holder = path.slice(0, -1).reduce((at, key) => at[key] as Record<string, unknown>, copy);
  if (typeof value === 'number') holder[last] = value === Infinity ? 10 : value + 1;
  else holder[last] = typeof value === 'boolean' ? !value : `${value}x`;
  return copy as unknown as Plan;
}
