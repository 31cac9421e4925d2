import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { foamRun, frameCost, wantedFrames } from '../../../src/bake/shard.ts';
import type { Plan } from '../../../src/plan/plan.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

const { plan } = planBake(tinyTwoCascadeSea());

/** The plan with cascades of other sizes and loops; only what shards look at. */
function planOf(cascades: readonly { readonly resolution: number; readonly frameCount: number }[]): Plan {
  const [first] = plan.cascades;
  return {
    ...plan,
    cascades: cascades.map(({ resolution, frameCount }) => ({
      ...first,
      resolution,
      loop: { ...first.loop, frameCount },
    })),
  };
}

const someCascades = fc.array(
  fc.record({ resolution: fc.constantFrom(16, 32, 256, 2048), frameCount: fc.integer({ min: 1, max: 40 }) }),
  { minLength: 1, maxLength: 4 },
);

describe('shards', () => {
  it('hold every frame of every cascade once, whatever their number', () => {
    fc.assert(
      fc.property(someCascades, fc.integer({ min: 1, max: 50 }), (cascades, count) => {
        const some = planOf(cascades);
        const dealt = Array.from({ length: count }, (_, i) =>
          wantedFrames(some, null, { index: i + 1, count }),
        ).flat();
        const key = ({ cascade, frame }: (typeof dealt)[number]) => `${cascade}/${frame}`;
        const all = wantedFrames(some, null, null);
        expect(all.length).toBe(cascades.reduce((sum, { frameCount }) => sum + frameCount, 0));
        expect(dealt.map(key).sort()).toEqual(all.map(key).sort());
      }),
    );
  });

  it('differ in work by no more than the dearest frame', () => {
    fc.assert(
      fc.property(someCascades, fc.integer({ min: 1, max: 50 }), (cascades, count) => {
        const some = planOf(cascades);
        const costs = some.cascades.map(frameCost);
        const loads = Array.from({ length: count }, (_, i) =>
          wantedFrames(some, null, { index: i + 1, count }).reduce(
            (sum, { cascade }) => sum + costs[cascade],
            0,
          ),
        );
        expect(Math.max(...loads) - Math.min(...loads)).toBeLessThanOrEqual(Math.max(...costs));
      }),
    );
  });

  it('weigh a frame by its work: one of 2048 texels against many of 256', () => {
    const some = planOf([
      { resolution: 2048, frameCount: 1 },
      { resolution: 256, frameCount: 60 },
    ]);
    const [large, small] = some.cascades.map(frameCost);
    expect(large / small).toBeGreaterThan(64);
    const counts = [1, 2].map((index) => wantedFrames(some, null, { index, count: 2 }).length);
    // All the small ones together are less than the large one.
    expect(counts).toEqual([1, 60]);
  });

  it('cost whole numbers, so that every machine deals alike', () => {
    for (const resolution of [16, 256, 8192]) {
      const [cascade] = planOf([{ resolution, frameCount: 1 }]).cascades;
      expect(Number.isSafeInteger(frameCost(cascade) * 1_000_000)).toBe(true);
      expect(frameCost(cascade)).toBeGreaterThan(resolution ** 2);
    }
  });

  it('are of a range of frames where one is given', () => {
    const range = { first: 3, last: 5 };
    const halves = [1, 2].map((index) => wantedFrames(plan, range, { index, count: 2 }));
    expect(halves.map(({ length }) => length)).toEqual([3, 3]);
    expect(
      halves
        .flat()
        .map(({ frame }) => frame + 1)
        .sort(),
    ).toEqual([3, 3, 4, 4, 5, 5]);
  });
});

it('parts of foam are runs that hold every frame once', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 300 }), fc.integer({ min: 1, max: 400 }), (frameCount, count) => {
      const runs = Array.from({ length: count }, (_, i) => foamRun(frameCount, { index: i + 1, count }));
      expect(runs[0][0]).toBe(0);
      expect(runs[count - 1][1]).toBe(frameCount);
      for (let i = 1; i < count; i++) expect(runs[i][0]).toBe(runs[i - 1][1]);
      const lengths = runs.map(([from, to]) => to - from);
      expect(Math.max(...lengths) - Math.min(...lengths)).toBeLessThanOrEqual(1);
    }),
  );
});
