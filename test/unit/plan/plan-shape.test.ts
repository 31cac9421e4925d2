import { describe, expect, it } from 'vitest';
import type { Plan } from '../../../src/plan/plan.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { planFault } from '../../../src/plan/plan-shape.ts';
import { tinyCurrentSea, tinyEveryMapSea, tinySea, tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

// Of a depth that JSON can say.
const { plan } = planBake(tinyTwoCascadeSea({ water: { depth: 50 } }));

/** The plan with something below one of its keys replaced. */
function changed(path: string, value: unknown): Plan {
  // A clone that shares nothing: cascades may have the plan's own loop.
  const copy = JSON.parse(JSON.stringify(plan)) as Record<string, unknown>;
  const keys = path.split('.');
  const last = keys.pop() as string;
  const parent = keys.reduce((object, key) => object[key] as Record<string, unknown>, copy);
  parent[last] = value;
  return copy as unknown as Plan;
}

describe('the shape of a plan', () => {
  it('is that of every plan we make', () => {
    for (const sea of [
      tinySea(),
      tinyTwoCascadeSea(),
      tinyEveryMapSea(),
      tinyCurrentSea(),
      tinySea({ foam: 'off', maps: { height: 'png' } }),
    ]) {
      expect(planFault(planBake(sea).plan)).toBeNull();
    }
  });

  it.each([
    ['cascades.0.id', '../c0'],
    ['cascades.0.id', 'c1'],
    ['cascades.0.maps.0.pattern', '../../escaped.%04d.exr'],
    ['cascades.0.maps.0.pattern', '/etc/passwd'],
    ['cascades.0.maps.0.pattern', 'c0/displacement.%0999999999d.exr'],
    ['cascades.0.maps.0.pattern', 'c1/displacement.%04d.exr'],
    ['cascades.0.maps.0.map', 'normal'],
    ['cascades.0.maps.0.format', 'exe'],
    ['cascades.0.maps.0.channels.0.name', '../R'],
    ['cascades.0.maps.0.channels', []],
    ['cascades.0.resolution', 100_000],
    ['cascades.0.resolution', 33],
    ['cascades.0.resolution', '32'],
    ['cascades.0.loop.frameCount', 1e9],
    ['cascades.0.loop.frameCount', 2.5],
    ['cascades.0.loop.frameRate', [24, 0]],
    ['cascades.0.patchLengthM', 0],
    ['cascades.0.patchLengthM', Infinity],
    ['cascades.0.foam.rampJ', 0],
    ['cascades.0.amplitudesHash', 'sha256:0'],
    ['cascades', []],
    ['cascades', Array.from({ length: 17 }, () => plan.cascades[0])],
    ['cascades', { length: 2 }],
    ['systems', []],
    ['systems.0.spectrum', null],
    ['loop.firstFrame', -1],
    ['output.padding', 1e6],
    ['output.rowZero', 'up'],
    ['water.depthM', 0],
    ['water.gravityMps2', Number.NaN],
    ['engine', 'float16'],
    ['seed', 2 ** 32],
    ['extra', 1],
    ['report.cost.outputBytes', -1],
    ['report.loop', undefined],
    ['report.warnings', ['x'.repeat(3000)]],
    ['report.cascades.0.repetition', 'often'],
  ])('has no %s of %j', (path, value) => {
    const fault = planFault(changed(path, value));
    expect(fault).not.toBeNull();
    const place = path.replaceAll(/\.(\d+)/g, '[$1]');
    // A kind of map that does not fit its pattern is told of at the pattern.
    expect(fault?.path.startsWith(place) || place.endsWith('.map') || place.endsWith('.format')).toBe(true);
    expect(fault?.found.length).toBeLessThan(100);
  });

  it('is an object', () => {
    for (const value of [null, 1, 'plan', [], [plan], undefined]) expect(planFault(value)).not.toBeNull();
  });
});
