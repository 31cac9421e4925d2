import { describe, expect, it } from 'vitest';
import { costReport } from '../../../src/plan/cost.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { tinyEveryMapSea, tinySea, tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

const costOf = (sea: ReturnType<typeof tinySea>) => planBake(sea).plan.report.cost;

describe('costReport', () => {
  it('counts files, codes of J on scratch, and shared amplitudes', () => {
    // Three maps of eight frames; J in two bytes a texel and frame; A and m in twenty bytes a wave.
    expect(costOf(tinySea())).toMatchObject({
      files: 24,
      scratchBytes: 8 * 32 * 32 * 2,
      sharedBytes: 32 * 32 * 20,
    });
    expect(costOf(tinyTwoCascadeSea())).toMatchObject({ files: 48, sharedBytes: 2 * 32 * 32 * 20 });
    expect(costOf(tinySea({ foam: 'off', maps: { height: 'png' } }))).toMatchObject({
      files: 8,
      scratchBytes: 0,
    });
  });

  it('estimates no more bytes than there are samples, and not a tenth of them', () => {
    const { cascades } = planBake(tinyEveryMapSea()).plan;
    const [{ maps }] = cascades;
    const bytes = { uint8: 1, uint16: 2, half: 2, float: 4 };
    const raw = maps.reduce(
      (sum, { channels, sample }) => sum + 8 * 32 * 32 * channels.length * bytes[sample],
      0,
    );
    const { outputBytes } = costReport(cascades, 'float32');
    expect(outputBytes).toBeLessThan(raw);
    expect(outputBytes).toBeGreaterThan(raw / 10);
  });

  it('grows with texels and frames', () => {
    const [small, wide, long] = [
      costOf(tinySea()),
      costOf(tinySea({ cascades: [{ patch: 30, resolution: 64 }] })),
      costOf(tinySea({ loop: { frames: 16, frameRate: 1 } })),
    ];
    expect(wide.outputBytes / small.outputBytes).toBeCloseTo(4, 2);
    expect(wide.bytesPerThread / small.bytesPerThread).toBeCloseTo(4, 2);
    expect(long.outputBytes / small.outputBytes).toBeCloseTo(2, 2);
    expect(long.bytesPerThread).toBe(small.bytesPerThread);
    expect(long.coreSeconds).toBeGreaterThan(small.coreSeconds);
  });

  it('has the cascades of a thread share the memory of the float32 engine, and no other', () => {
    const engines = ['float32', 'float64'] as const;
    const [one, two] = [tinySea(), tinyTwoCascadeSea()].map((sea) =>
      engines.map((engine) => planBake(sea, { engine }).plan.report.cost.bytesPerThread),
    );
    expect(two[0]).toBe(one[0]);
    expect(two[1]).toBe(2 * one[1]);
    expect(one[0]).toBeLessThan(one[1]);
  });
});
