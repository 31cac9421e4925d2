import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bandGaps,
  type CascadeLayout,
  cascadeLayouts,
  largestPatchRatio,
} from '../../src/plan/cascade-layout.ts';
import { distanceToFractions } from '../../src/plan/patch-ratios.ts';
import type { ListedCascade, Sea } from '../../src/sea/sea.ts';
import { bandLimits, bandWeight, energyAbove } from '../../src/waves/band.ts';
import { nyquistWavenumber } from '../../src/waves/lattice.ts';
import { between, spread } from '../support/form-arbitraries.ts';
import { laidOut, seaOf, windSeaKeys, withCascades } from '../support/planned-seas.ts';

const SEA = seaOf([windSeaKeys(10, 100)]);
const TABLES = laidOut(SEA).tables;

/** Expects weights within 0..1 whose sum is what is above the first border and not above the last. */
function expectPartition(layouts: readonly CascadeLayout[]): void {
  const first = layouts[0].band.low;
  const last = layouts[layouts.length - 1].band.high;
  const hasGap = bandGaps(layouts).length > 0;
  let [least, most, missing] = [0, 1, 0];
  for (let k = 0.005; k < 300; k *= 1.07) {
    const weights = layouts.map(({ band }) => bandWeight(k, band));
    const sum = weights.reduce((a, b) => a + b, 0);
    const whole = (first === null ? 1 : energyAbove(k, first)) - energyAbove(k, last);
    least = Math.min(least, ...weights);
    most = Math.max(most, sum - whole + 1);
    if (!hasGap) missing = Math.max(missing, whole - sum);
  }
  expect(least).toBe(0);
  expect(most).toBeLessThan(1 + 1e-12);
  expect(missing).toBeLessThan(1e-12);
}

/** A cascade that a sea file may list: its band within its patch and its texels. */
const anyListed: fc.Arbitrary<ListedCascade> = fc
  .record({
    patchLengthM: spread(2, 2000),
    resolution: fc.constantFrom(16, 64, 256, 1024),
    longest: fc.option(between(0, 1)),
    shortest: fc.option(between(0, 1)),
  })
  .map(({ patchLengthM, resolution, longest, shortest }) => {
    const longestWavelengthM = longest === null ? null : patchLengthM * (4 / resolution) ** (0.9 * longest);
    const top = longestWavelengthM ?? patchLengthM;
    const shortestWavelengthM = shortest === null ? null : (2 * patchLengthM) / resolution;
    return {
      patchLengthM,
      resolution,
      longestWavelengthM,
      shortestWavelengthM:
        shortestWavelengthM === null
          ? null
          : shortestWavelengthM * (top / shortestWavelengthM) ** (0.95 * (shortest ?? 0)),
      loop: null,
    };
  });

describe('cascades in any list', () => {
  it('count every wave once: weights sum to 1 but for gaps, which are reported', () => {
    fc.assert(
      fc.property(fc.array(anyListed, { minLength: 1, maxLength: 5 }), (cascades) => {
        const list = [...cascades].sort((a, b) => b.patchLengthM - a.patchLengthM);
        const sea: Sea = { ...SEA, cascades: { plan: 'list', list, headRoom: 0.5 } };
        expectPartition(cascadeLayouts(sea, TABLES));
      }),
      { numRuns: 500 },
    );
  });
});

describe('cascades of any plan', () => {
  const anyRequest = fc.record({
    count: fc.integer({ min: 1, max: 8 }),
    resolution: fc.constantFrom(64, 128, 256, 512, 1024),
    shortestWavelengthM: spread(0.05, 20),
    longestPatchM: spread(20, 3000),
    headRoom: between(0.3, 0.85),
  });
  const planned = fc.record({ request: anyRequest }).map(({ request }) => ({
    request,
    layouts: cascadeLayouts(withCascades(SEA, request), TABLES),
  }));

  it('count every wave once', () => {
    fc.assert(
      fc.property(planned, ({ layouts }) => expectPartition(layouts)),
      { numRuns: 300 },
    );
  });

  it('keep five waves across at the long end, clear ratios, and their head room', () => {
    fc.assert(
      fc.property(planned, ({ request, layouts }) => {
        layouts.forEach((layout, c) => {
          const { kMinRadPerM, kMaxRadPerM } = bandLimits(layout.band);
          expect(kMaxRadPerM / nyquistWavenumber(layout)).toBeCloseTo(request.headRoom, 9);
          if (c === 0) return;
          // Written lengths lie up to half a per cent off the ideal ones.
          expect((kMinRadPerM * layout.patchLengthM) / (2 * Math.PI)).toBeGreaterThan(4.97);
          const ratio = layouts[c - 1].patchLengthM / layout.patchLengthM;
          expect(ratio).toBeGreaterThan(1.33);
          // The worst of 6700 ratios, in a plan of eight cascades, was .05; of plans of two .10.
          expect(distanceToFractions(ratio)).toBeGreaterThan(0.03);
        });
      }),
      { numRuns: 300 },
    );
  });

  it('reach the shortest wave asked for, unless there are too few for it', () => {
    fc.assert(
      fc.property(planned, ({ request, layouts }) => {
        const last = layouts[layouts.length - 1];
        const shortest = (2 * Math.PI) / bandLimits(last.band).kMaxRadPerM;
        expect(layouts.length).toBeLessThanOrEqual(request.count);
        // Small tiles have no room for five waves across at the long end of a finer band.
        if (largestPatchRatio(request.resolution, request.headRoom) < 1.5) expect(layouts).toHaveLength(1);
        else if (layouts.length < request.count) {
          expect(shortest / request.shortestWavelengthM).toBeLessThan(1.51);
        }
      }),
      { numRuns: 300 },
    );
  });
});
