import { describe, expect, test } from 'vitest';
import { SEA_WATER_DEFAULTS } from '../../../src/physics/water.ts';
import { parseSea } from '../../../src/sea/parse.ts';
import { seaWarnings } from '../../../src/sea/warnings.ts';
import { peakWavelengthM } from '../../../src/sea/wave-heights.ts';
import { HEAD, problemsOf } from './problems.ts';

const swell = (Hs: number, Tp: number, from = 0): string =>
  `  - { kind: swell, from: ${from}, significantHeight: ${Hs}, peakPeriod: ${Tp} }\n`;
const sea = (systems: string, depth: number | string = 'deep'): string =>
  `${HEAD}water: { depth: ${depth} }\nsystems:\n${systems}`;

test('peak wavelength: g T^2 / 2 pi in deep water', () => {
  // Tension lengthens a 10 s wave by less than 1e-8 of itself.
  const lambda = peakWavelengthM({ significantHeightM: 1, peakPeriodS: 10 }, SEA_WATER_DEFAULTS);
  expect(Math.abs(lambda / ((9.80665 * 100) / (2 * Math.PI)) - 1)).toBeLessThan(1e-7);
});

describe('steepness', () => {
  // A wave of 5 s is 39.02 m long in deep water: 1/7 is 5.574 m, 1/20 is 1.951 m.
  test('beyond a seventh of the length is an error', () => {
    expect(problemsOf(sea(swell(5.57, 5)))).toEqual([]);
    const [problem, ...rest] = problemsOf(sea(swell(5.58, 5)));
    expect(rest).toEqual([]);
    expect(problem).toMatchObject({ path: 'systems[0].significantHeight', line: 5, column: 48 });
    expect(problem.expected).toMatch(/at most 5\.57 m, a seventh of the peak wavelength of 39 m/);
    expect(problem.found).toBe('5.58 m');
  });

  test('a swell above a twentieth is a warning', () => {
    expect(seaWarnings(parseSea(sea(swell(1.94, 5))))).toEqual([]);
    expect(seaWarnings(parseSea(sea(swell(1.96, 5))))).toEqual([
      expect.stringMatching(/^swell: a significant height of 1\.96 m is 1\/19\.9 .* 1\/20/),
    ]);
  });

  test('a wind sea may be twice as steep', () => {
    const wind = (Hs: number): string =>
      sea(`  - { kind: wind-sea, from: 0, significantHeight: ${Hs}, peakPeriod: 5 }\n`);
    expect(seaWarnings(parseSea(wind(3.9)))).toEqual([]);
    expect(seaWarnings(parseSea(wind(3.91)))).toHaveLength(1);
  });

  test('the length is that of the depth', () => {
    // A 5 s wave is 20.7 m long on 2 m (shallow: sqrt(g h) T = 22.1 m): 1.2 m is steeper than 1/20 there only.
    expect(seaWarnings(parseSea(sea(swell(1.2, 5))))).toEqual([]);
    expect(seaWarnings(parseSea(sea(swell(1.2, 5), 2.5)))).toHaveLength(1);
  });
});

describe('height against depth', () => {
  test('above 0.78 of the depth is an error, above half a warning', () => {
    expect(seaWarnings(parseSea(sea(swell(1, 12), 2.01)))).toEqual([]);
    expect(seaWarnings(parseSea(sea(swell(1, 12), 1.99)))).toEqual([
      expect.stringContaining('half the depth'),
    ]);
    expect(problemsOf(sea(swell(1, 12), 1.283))).toEqual([]);
    expect(problemsOf(sea(swell(1, 12), 1.281))).toMatchObject([{ path: 'systems[0].significantHeight' }]);
  });

  test('systems add in energy', () => {
    // sqrt(0.6^2 + 0.8^2) = 1 m, each of the two below 0.78 of 1.2 m.
    const [problem] = problemsOf(sea(swell(0.6, 12) + swell(0.8, 12, 90), 1.2));
    expect(problem).toMatchObject({ path: 'water.depth', line: 3, column: 17, found: '1.2 m' });
    expect(problem.expected).toContain('1.28 m for a significant height of 1 m');
  });
});

test('a fetch too short for its wind is a warning', () => {
  const wind = (fetch: string): string =>
    sea(`  - { kind: wind-sea, from: 0, windSpeed: 30, fetch: ${fetch} }\nfoam: off`);
  // g X / U^2 = 10 at 917.7 m.
  expect(seaWarnings(parseSea(wind('918 m')))).toEqual([]);
  expect(seaWarnings(parseSea(wind('10 m')))).toEqual([
    expect.stringMatching(
      /fetch of 10 m is too short for a wind of 30 m\/s: g X \/ U\^2 is 0\.11.*at least 918 m/,
    ),
  ]);
});

test('a spreading that runs both ways is told, unless one way was taken out', () => {
  const both = sea('  - { kind: wind-sea, from: 0, windSpeed: 10, fetch: 20 km, spreading: elfouhaily }\n');
  expect(seaWarnings(parseSea(both))).toEqual([
    expect.stringMatching(/^wind-sea: .* either way.*againstWind: 0/),
  ]);
  expect(seaWarnings(parseSea(`${both}shaping: { againstWind: 0 }\n`))).toEqual([]);
});
