import { describe, expect, it } from 'vitest';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { tinyCurrentSea, tinySea, tinyTwoCascadeSea } from '../../support/tiny-seas.ts';
import { expectRelative } from '../../support/tolerances.ts';

const reportOf = (sea: ReturnType<typeof tinySea>) => planBake(sea).plan.report;
const swell = { kind: 'swell', from: 250, significantHeight: 0.3, peakPeriod: 2.4 };

describe('shares of cascades', () => {
  it('of height and of slope sum, with what is left out, to the whole', () => {
    const { cascades, losses } = reportOf(tinyTwoCascadeSea());
    const height = cascades.reduce((sum, { heightVarianceShare }) => sum + heightVarianceShare, 0);
    expectRelative(height + losses.notInAnyCascade, 1, 1e-12, 'height');
    const slope = cascades.reduce((sum, { slopeVarianceShare }) => sum + slopeVarianceShare, 0);
    expect(slope).toBeLessThan(1);
    // What is left out of the slope, as a share, and in the square of a slope.
    expect(losses.slopeVarianceLeftOut / (1 - slope)).toBeGreaterThan(0.01);
  });

  it('belong to the waves of their bands', () => {
    const [first, second] = reportOf(tinyTwoCascadeSea()).cascades;
    expect(first.longestWavelengthM).toBe(30);
    expect(first.shortestWavelengthM).toBeCloseTo((4 * 30) / 32, 9);
    expect(second.longestWavelengthM).toBeCloseTo(first.shortestWavelengthM * 1.25 ** 2, 9);
    expect(second.wavesAcross).toBeCloseTo(6.3 / second.longestWavelengthM, 12);
    expect(second.vertexSpacingM).toBeCloseTo(second.shortestWavelengthM / 4, 12);
    expect(first.repetition).toBeNull();
    expect(second.repetition).toBeGreaterThan(0.2);
  });
});

describe('what the lattice does to a system', () => {
  it('is little on a patch of many waves', () => {
    const systems = [{ ...swell, peakPeriod: 1.6 }];
    const [{ meanFrequencyShift, meanDirectionShiftRad, effectiveWaves, zeroCellShare }] = reportOf(
      tinySea({ systems, cascades: [{ patch: 40, resolution: 128 }] }),
    ).systems;
    expect(Math.abs(meanFrequencyShift)).toBeLessThan(0.002);
    expect(Math.abs(meanDirectionShiftRad)).toBeLessThan(0.002);
    expect(effectiveWaves).toBeGreaterThan(40);
    expect(zeroCellShare).toBeLessThan(1e-9);
  });

  it('is much on a patch hardly longer than the waves', () => {
    const cascades = [{ patch: 8.5, resolution: 64 }];
    const [{ meanDirectionShiftRad, effectiveWaves, zeroCellShare }] = reportOf(
      tinySea({ systems: [{ ...swell, from: 255, spreading: { form: 'cos-2s', s: 200 } }], cascades }),
    ).systems;
    expect(Math.abs(meanDirectionShiftRad)).toBeGreaterThan(0.1);
    expect(effectiveWaves).toBeLessThan(4);
    expect(zeroCellShare).toBeGreaterThan(0.01);
  });

  it('is no turn for waves that run all round', () => {
    const systems = [{ ...swell, spreading: { form: 'cos-2s', s: 0 } }];
    expect(reportOf(tinySea({ systems })).systems[0].meanDirectionShiftRad).toBe(0);
  });

  it('is told of every system, with its share of the energy', () => {
    const { systems } = reportOf(tinyCurrentSea());
    expect(systems.map(({ name }) => name)).toEqual(['wind-sea', 'swell']);
    expectRelative(systems[0].heightVarianceShare + systems[1].heightVarianceShare, 1, 1e-12, 'shares');
  });
});

describe('losses', () => {
  it('name energy at k = 0, in gaps and beyond the frames', () => {
    const gap = [
      { patch: 30, resolution: 64, band: { shortest: 8 } },
      { patch: 20, resolution: 64, band: { longest: 4 } },
    ];
    const { gaps, notInAnyCascade } = reportOf(tinySea({ cascades: gap })).losses;
    expect(gaps).toHaveLength(1);
    expect(notInAnyCascade).toBeGreaterThan(0.1);
    const slow = reportOf(tinySea({ loop: { frames: 8, frameRate: 0.7 } })).losses;
    expect(slow.tooFastForFrames).toBeGreaterThan(0.1);
    expect(reportOf(tinySea({ cascades: [{ patch: 7, resolution: 32 }] })).losses.zeroCells).toBeGreaterThan(
      0.05,
    );
  });
});

describe('the sum of the cells', () => {
  const cellSum = (band: Record<string, number>): number =>
    reportOf(tinySea({ cascades: [{ patch: 30, resolution: 64, band }] })).cascades[0].cellSumError;

  it('is the integral of the band where the cells resolve it', () => {
    expect(Math.abs(cellSum({}))).toBeLessThan(1e-3);
  });
});
