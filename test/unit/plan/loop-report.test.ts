import { describe, expect, it } from 'vitest';
import { cascadeLayouts } from '../../../src/plan/cascade-layout.ts';
import { loopReport } from '../../../src/plan/loop-report.ts';
import type { LoopReport } from '../../../src/plan/plan.ts';
import { resolvedSystems } from '../../../src/plan/systems.ts';
import type { Sea } from '../../../src/sea/sea.ts';
import { seaWaves, systemTables } from '../../../src/waves/cascade-waves.ts';
import { seaOf, swellKeys, windSeaKeys } from '../../support/planned-seas.ts';
import { expectRelative } from '../../support/tolerances.ts';

/** The loop report of a sea with its waves drawn. */
function reportOf(sea: Sea): LoopReport {
  const spectra = { water: sea.water, systems: resolvedSystems(sea), gains: [] };
  const layouts = cascadeLayouts(sea, []);
  const tables = systemTables(spectra, layouts);
  const cascades = layouts.map((layout) => {
    const { frameCount, frameRate } = layout.loop;
    return { ...layout, frameCount, periodS: (frameCount * frameRate[1]) / frameRate[0] };
  });
  const waves = seaWaves({ ...sea, ...spectra, cascades, amplitudes: 'gaussian', matchHeight: true });
  const tallies = waves.map((cascade) => cascade.tallies);
  return loopReport(layouts, tallies, tables, sea.loop, sea.water, sea.current);
}

/** Swell of 5 s, 39 m long, on a patch eight of its waves across. */
function swellLoop(seconds: number, changes: Readonly<Record<string, unknown>> = {}): LoopReport {
  const cascades = [{ patch: 312, resolution: 256 }];
  const loop = { seconds, frameRate: 24 };
  return reportOf(seaOf([swellKeys(5, 3.3, 25)], { cascades, loop, ...changes }));
}

describe('frequency error of the drawn waves', () => {
  // The lattice has the errors of the continuous spectrum, for which test/published/loop-errors.test.ts has numbers.
  it.each([
    [1, 0.153],
    [1.5, 0.226],
    [2, 0.109],
    [3, 0.08],
  ])('in a loop of %f peak periods', (peakPeriods, error) => {
    const report = swellLoop(5 * peakPeriods);
    expectRelative(report.frequencyError, error, 0.03, 'frequency error');
    expect(report.cascades[0].frequencyError).toBe(report.frequencyError);
    // Slope belongs to the shorter waves, which turn more often and err less.
    if (peakPeriods > 1) expect(report.slopeFrequencyError).toBeLessThan(report.frequencyError);
  });

  it('in a loop shorter than the waves says how much energy is in those', () => {
    expect(swellLoop(4).longerThanLoop).toBeGreaterThan(0.5);
    expect(swellLoop(10).longerThanLoop).toBeLessThan(0.01);
  });
});

describe('main waves', () => {
  it('run as fast as whole turns make them', () => {
    // 1.3 turns of the peak become 1, 1.6 become 2.
    expectRelative(swellLoop(6.5).peakSpeedError, 1 / 1.3 - 1, 1e-6, 'slowed');
    expectRelative(swellLoop(8).peakSpeedError, 2 / 1.6 - 1, 1e-6, 'sped up');
  });
});

describe('frames', () => {
  it('blending loses (1 - cos)/3 of the variance of a wave', () => {
    // At 2 frames a second the peak of a 5 s swell makes a tenth of a turn a frame.
    const { blendingLoss, slopeBlendingLoss } = swellLoop(30, { loop: { seconds: 30, frameRate: 2 } });
    const peak = (1 - Math.cos(2 * Math.PI * 0.1)) / 3;
    expect(blendingLoss).toBeGreaterThan(peak);
    expect(blendingLoss).toBeLessThan(1.6 * peak);
    expect(slopeBlendingLoss).toBeGreaterThan(blendingLoss);
  });

  it('too few for a wave are counted', () => {
    const { aboveHalfFrames } = swellLoop(30, { loop: { seconds: 30, frameRate: 0.5 } });
    // Half a turn a frame is 4 s: the larger part of the energy beyond the peak is faster.
    expect(aboveHalfFrames).toBeGreaterThan(0.2);
    expect(aboveHalfFrames).toBeLessThan(0.5);
  });
});

describe('cascades of one sea', () => {
  it('weigh by energy, and by slope across tiles of different size', () => {
    const cascades = [
      { patch: 200, resolution: 64 },
      { patch: 50, resolution: 64 },
    ];
    const sea = seaOf([windSeaKeys(8, 20)], { cascades, loop: { seconds: 5, frameRate: 24 } });
    const report = reportOf(sea);
    const [first, second] = report.cascades;
    // The errors of the whole lie between those of its parts.
    expect(report.frequencyError).toBeLessThan(first.frequencyError);
    expect(report.frequencyError).toBeGreaterThan(second.frequencyError);
    expect(report.slopeFrequencyError).toBeLessThan(first.slopeFrequencyError);
    expect(report.slopeFrequencyError).toBeGreaterThan(second.slopeFrequencyError);
    expect(report.cascades.map(({ id }) => id)).toEqual(['c0', 'c1']);
  });

  it('suggest nothing where nothing near is better', () => {
    expect(swellLoop(20).suggestions.every(({ frequencyError }) => frequencyError < 0.05)).toBe(true);
  });
});
