import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { GROWTH_LAW_NAMES, waveGrowth } from '../../src/physics/growth-laws/registry.ts';
import { between, spread } from '../support/form-arbitraries.ts';

const conditions = fc.record({
  windSpeedMps: between(1, 40),
  fetchM: fc.oneof(spread(10, 1e7), fc.constant(Infinity)),
  depthM: fc.oneof(spread(0.5, 1e4), fc.constant(Infinity)),
  gravityMps2: between(9.7, 9.9),
});

describe.each(GROWTH_LAW_NAMES)('%s', (law) => {
  it('waves are finite, no higher than .3 U^2/g, and do not shrink with fetch or wind', () => {
    fc.assert(
      fc.property(conditions, between(1, 3), (given, factor) => {
        const sea = waveGrowth(law, given);
        const longer = waveGrowth(law, { ...given, fetchM: factor * given.fetchM });
        const windier = waveGrowth(law, { ...given, windSpeedMps: factor * given.windSpeedMps });
        const U = given.windSpeedMps;
        expect(sea.significantHeightM).toBeGreaterThan(0);
        expect(sea.peakPeriodS).toBeGreaterThan(0);
        // The adjusted wind of the Shore Protection Manual is up to 1.66 U at 40 m/s.
        const limit = law === 'shore-protection-manual' ? 0.25 * (0.71 * U ** 0.23) ** 2 : 0.3 * (1 + 1e-12);
        expect((sea.significantHeightM * given.gravityMps2) / U ** 2).toBeLessThanOrEqual(limit);
        // Rounding only.
        const slack = 1 + 1e-12;
        expect(longer.significantHeightM * slack).toBeGreaterThanOrEqual(sea.significantHeightM);
        expect(longer.peakPeriodS * slack).toBeGreaterThanOrEqual(sea.peakPeriodS);
        expect(windier.significantHeightM * slack).toBeGreaterThanOrEqual(sea.significantHeightM);
        expect(windier.peakPeriodS * slack).toBeGreaterThanOrEqual(sea.peakPeriodS);
      }),
      { numRuns: 200 },
    );
  });
});
