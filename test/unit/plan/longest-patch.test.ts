import { describe, expect, it } from 'vitest';
import { SEA_WATER_DEFAULTS } from '../../../src/physics/water.ts';
import { effectiveWaveCount, patchLengthFor, zeroCellShare } from '../../../src/plan/longest-patch.ts';
import { seaWaves, systemTables } from '../../../src/waves/cascade-waves.ts';
import { type RadialTable, radialIntegral } from '../../../src/waves/radial-table.ts';
import { jonswapSystem, loneCascade, seaRequest } from '../../support/tiny-waves.ts';
import { expectRelative } from '../../support/tolerances.ts';

function tableOf(s: number, gamma = 3.3, periodS = 6): RadialTable {
  const systems = [jonswapSystem('sea', 1, periodS, { s, gamma, towardRad: 0.3 })];
  return systemTables({ water: SEA_WATER_DEFAULTS, systems, gains: [] }, [])[0];
}

const peakLength = (table: RadialTable): number => (2 * Math.PI) / table.spectrum.peakWavenumberRadPerM;

describe('effectiveWaveCount', () => {
  it('is what a fine lattice counts', () => {
    for (const s of [3, 25, 200]) {
      const systems = [jonswapSystem('sea', 1, 6, { s, towardRad: 0.3 })];
      const patchLengthM = 900;
      const cascades = [loneCascade({ patchLengthM, resolution: 256 })];
      const [{ tallies }] = seaWaves(seaRequest({ systems, cascades }));
      // The lattice leaves out the tail, whose many waves count for little: the peak alone sets the sum of squares.
      const table = tableOf(s);
      const counted = radialIntegral(table, () => 1) ** 2 / tallies[0].squares;
      expectRelative(effectiveWaveCount(table, patchLengthM), counted, 0.03, `s ${s}`);
    }
  });

  it('grows with the area of the patch, whatever the spread', () => {
    for (const s of [10, 1000, 10_000]) {
      const table = tableOf(s);
      expectRelative(
        effectiveWaveCount(table, 2000),
        4 * effectiveWaveCount(table, 1000),
        1e-12,
        'twice as long',
      );
    }
    // A peak of angular width 1/sqrt(s): from s = 1000 to 10 000 the count falls by sqrt(10).
    const ratio = effectiveWaveCount(tableOf(1000), 1000) / effectiveWaveCount(tableOf(10_000), 1000);
    expectRelative(ratio, Math.sqrt(10), 0.01, 'narrowing');
  });
});

describe('patchLengthFor', () => {
  it('has a hundred effective waves or five of the peak across, whichever is longer', () => {
    const narrow = tableOf(25);
    expectRelative(effectiveWaveCount(narrow, patchLengthFor(narrow)), 100, 1e-9, 'effective waves');
    expect(patchLengthFor(narrow)).toBeGreaterThan(5 * peakLength(narrow));
    const broad = tableOf(1, 1);
    expectRelative(patchLengthFor(broad), 5 * peakLength(broad), 1e-9, 'peak waves');
  });

  it('is not stretched beyond 4 km for their number alone', () => {
    expect(patchLengthFor(tableOf(500, 8, 16))).toBe(4000);
    const longest = tableOf(10, 3.3, 26);
    expectRelative(patchLengthFor(longest), 5 * peakLength(longest), 1e-9, 'five across 5.3 km');
  });
});

describe('zeroCellShare', () => {
  // Means over direction, computed elsewhere: JONSWAP gamma 3.3 on a patch so many peak waves long.
  it.each([
    [0.75, 0.084],
    [1, 0.015],
    [1.25, 0.0023],
    [1.5, 0.0003],
  ])('on a patch of %f waves', (across, share) => {
    const table = tableOf(10);
    expect(Math.abs(zeroCellShare([table], across * peakLength(table)) - share)).toBeLessThan(
      0.03 * share + 6e-5,
    );
  });
});
