import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors.ts';
import { cothKh } from '../../../src/physics/dispersion.ts';
import { whitecapCoverage } from '../../../src/physics/whitecaps.ts';
import { cascadeFoam, foamShares, plannedFoam } from '../../../src/plan/foam-plan.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { resolvedSystems } from '../../../src/plan/systems.ts';
import { bandWeight } from '../../../src/waves/band.ts';
import { radialIntegral } from '../../../src/waves/radial-table.ts';
import { laidOut, seaOf, windSeaKeys } from '../../support/planned-seas.ts';
import { tinySea } from '../../support/tiny-seas.ts';

type Keys = Readonly<Record<string, unknown>>;

const foamOf = (systems: readonly Keys[], changes: Keys = {}) => {
  const sea = seaOf(systems, changes);
  return plannedFoam(sea, resolvedSystems(sea));
};

describe('amount of foam', () => {
  it('follows the strongest wind, a number, or a level', () => {
    const winds = [windSeaKeys(8, 20), { ...windSeaKeys(12, 5), name: 'gusts' }];
    expect(foamOf(winds)).toEqual({ by: 'wind', coverage: whitecapCoverage(12), residue: 'remove' });
    expect(foamOf(winds, { foam: { coverage: 0.07, residue: 'keep' } })).toEqual({
      by: 'coverage',
      coverage: 0.07,
      residue: 'keep',
    });
    expect(foamOf(winds, { foam: { breakingLevel: 0.6 } })).toMatchObject({
      by: 'breaking-level',
      coverage: null,
    });
  });

  it('is none without a wind, when off, and where no map shows it', () => {
    const swell = { kind: 'swell', significantHeight: 1, peakPeriod: 8 };
    expect(foamOf([swell])).toBeNull();
    expect(foamOf([windSeaKeys(10, 20)], { foam: 'off' })).toBeNull();
    expect(foamOf([windSeaKeys(10, 20)], { maps: { height: 'png' } })).toBeNull();
  });
});

describe('shares of foam', () => {
  const sea = seaOf([windSeaKeys(10, 100)], { water: { depth: 15 } });
  const { layouts, tables } = laidOut(sea);

  it('are those of the compression of waves of at least 1 m', () => {
    const shares = foamShares(sea.foam, layouts, tables, 15);
    expect(shares.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 14);
    const compression = layouts.map(({ band }) =>
      radialIntegral(tables[0], (k) =>
        k > 2 * Math.PI ? 0 : (k * cothKh(k, 15)) ** 2 * bandWeight(k, band),
      ),
    );
    const sum = compression.reduce((a, b) => a + b, 0);
    for (const [c, share] of shares.entries()) expect(share).toBeCloseTo(compression[c] / sum, 12);
    // The finest cascade holds a quarter of the compression, but hardly any of it in waves of a metre.
    expect(shares[2]).toBeLessThan(0.35 * shares[1]);
    expect(shares[0]).toBeGreaterThan(0.3);
  });

  it('are the ones given, if there is one for each cascade', () => {
    const given = (shares: readonly number[]) => foamShares({ ...sea.foam, shares }, layouts, tables, 15);
    expect(given([0.5, 0.3, 0.2])).toEqual([0.5, 0.3, 0.2]);
    expect(() => given([0.5, 0.5])).toThrow(InputError);
    expect(() => given([0.4, 0.3, 0.2, 0.1])).toThrow(/foam\.shares.* expected 3 shares.* found 4/);
  });
});

describe('foam of one cascade', () => {
  const { layouts } = laidOut(seaOf([windSeaKeys(10, 100)]));
  const deviations = { compression: 0.1 } as never;
  const request = seaOf([windSeaKeys(10, 100)]).foam;
  const byCoverage = { by: 'coverage', coverage: 0.2, residue: 'remove' } as const;

  it('screened with the others gives the whole', () => {
    const shares = [0.6, 0.3, 0.1];
    const clear = shares.map((share) => {
      const foam = cascadeFoam(byCoverage, request, share, layouts[0], deviations);
      return 1 - (foam?.coverage ?? Number.NaN);
    });
    expect(1 - clear[0] * clear[1] * clear[2]).toBeCloseTo(0.2, 14);
  });

  it('fades in 3.85 s, or a third of a short loop, or as given; and leaves its residue', () => {
    const faded = (frameCount: number, decayTimeS: number | null = null) => {
      const layout = { ...layouts[0], loop: { ...layouts[0].loop, frameCount } };
      const foam = cascadeFoam(byCoverage, { ...request, decayTimeS }, 1, layout, deviations);
      return [foam?.decayTimeS, foam?.loopResidue];
    };
    expect(faded(24 * 60)).toEqual([3.85, expect.closeTo(Math.exp(-60 / 3.85), 15)]);
    expect(faded(24 * 8)).toEqual([expect.closeTo(8 / 3, 14), expect.closeTo(Math.exp(-3), 14)]);
    expect(faded(24 * 8, 3.85)[1]).toBeCloseTo(0.125, 3);
  });

  it('is full half a standard deviation of J below the breaking level, in codes of the natural range', () => {
    const foam = cascadeFoam(byCoverage, request, 1, layouts[0], deviations);
    expect(foam?.rampJ).toBeCloseTo(0.05, 15);
    const { zeroJ = 0, stepJ = 0 } = foam?.jacobianCodes ?? {};
    expect(zeroJ).toBeCloseTo(0.45, 12);
    expect(zeroJ + 65535 * stepJ).toBeCloseTo(1.7, 12);
    expect(foam?.breakingJ).toBeNull();
  });

  it('is none where it has no share, unless a level decides', () => {
    expect(cascadeFoam(byCoverage, request, 0, layouts[0], deviations)).toBeNull();
    const byLevel = { by: 'breaking-level', coverage: null, residue: 'remove' } as const;
    const target = { by: 'breaking-level', breakingJ: 0.55 } as const;
    const foam = cascadeFoam(byLevel, { ...request, target }, 0, layouts[0], deviations);
    expect(foam).toMatchObject({ breakingJ: 0.55, coverage: null });
  });
});

describe('a plan', () => {
  it('of waves all shorter than a metre has no foam, and says why', () => {
    const ripples = { kind: 'wind-sea', from: 250, significantHeight: 0.001, peakPeriod: 0.15, windSpeed: 3 };
    const { plan } = planBake(tinySea({ systems: [ripples], cascades: [{ patch: 0.9, resolution: 32 }] }));
    expect(plan.cascades[0].maps.map(({ map }) => map)).not.toContain('foam');
    expect(plan.report.warnings.join('\n')).toMatch(/No cascade holds waves of a metre/);
  });
});
