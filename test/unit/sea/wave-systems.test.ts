import { describe, expect, test } from 'vitest';
import { parseSea } from '../../../src/sea/parse.ts';
import type { WaveSystemRequest } from '../../../src/sea/sea.ts';
import { HEAD, problemsOf } from './problems.ts';

function systems(lines: string, above = ''): readonly WaveSystemRequest[] {
  return parseSea(`${HEAD}${above}systems:\n${lines}`).systems;
}

describe('what a system may leave out', () => {
  test('a wind sea by wind and fetch', () => {
    expect(systems('  - { kind: wind-sea, from: 250, windSpeed: 10, fetch: 20 km }')).toEqual([
      {
        kind: 'wind-sea',
        name: 'wind-sea',
        fromRad: (250 * Math.PI) / 180,
        spectrum: 'jonswap',
        peakEnhancement: null,
        spreading: { form: 'hasselmann', s: null, swellNarrowing: 0 },
        growth: { windSpeedMps: 10, fetchM: 20000 },
        stated: null,
        windSpeedMps: 10,
      },
    ]);
  });

  test('a wind sea by height and period keeps a wind for whitecaps', () => {
    const [system] = systems(
      '  - { kind: wind-sea, from: 0, windSpeed: 10, significantHeight: 1, peakPeriod: 5 }',
    );
    expect(system).toMatchObject({
      growth: null,
      stated: { significantHeightM: 1, peakPeriodS: 5 },
      windSpeedMps: 10,
    });
  });

  test('a swell is narrow', () => {
    expect(systems('  - { kind: swell, from: 0, significantHeight: 1, peakPeriod: 10 }')).toMatchObject([
      { name: 'swell', spectrum: 'jonswap', spreading: { form: 'cos-2s', s: 25, swellNarrowing: 0 } },
    ]);
  });

  test('a wind sea over a bed is TMA, a swell stays JONSWAP', () => {
    const lines =
      '  - { kind: wind-sea, from: 0, windSpeed: 10, fetch: 20 km }\n' +
      '  - { kind: swell, from: 0, significantHeight: 1, peakPeriod: 10 }';
    expect(systems(lines, 'water: { depth: 10 }\n').map(({ spectrum }) => spectrum)).toEqual([
      'tma',
      'jonswap',
    ]);
  });

  test('fully developed', () => {
    const unlimited = systems('  - { kind: wind-sea, from: 0, windSpeed: 10, fetch: unlimited }');
    expect(unlimited).toMatchObject([{ growth: { fetchM: Infinity } }]);
    const published = systems('  - { kind: wind-sea, from: 0, windSpeed: 10, spectrum: pierson-moskowitz }');
    expect(published).toMatchObject([{ growth: { fetchM: Infinity } }]);
  });

  test.each([
    ['hasselmann', { form: 'hasselmann', s: null, swellNarrowing: 0 }],
    ['{ swellNarrowing: 0.4 }', { form: 'hasselmann', s: null, swellNarrowing: 0.4 }],
    ['{ s: 12 }', { form: 'cos-2s', s: 12, swellNarrowing: 0 }],
    ['cos-2s', { form: 'cos-2s', s: 10, swellNarrowing: 0 }],
    ['mitsuyasu', { form: 'mitsuyasu', s: null, swellNarrowing: 0 }],
  ])('spreading %s', (text, spreading) => {
    const lines = `  - { kind: wind-sea, from: 0, windSpeed: 10, fetch: 20 km, spreading: ${text} }`;
    expect(systems(lines)[0].spreading).toEqual(spreading);
  });

  test('names are numbered and never taken twice', () => {
    const swell = 'kind: swell, from: 0, significantHeight: 0.1, peakPeriod: 10';
    const lines = `  - { ${swell} }\n  - { ${swell}, name: swell-2 }\n  - { ${swell} }\n  - { ${swell} }`;
    expect(systems(lines).map(({ name }) => name)).toEqual(['swell', 'swell-2', 'swell-3', 'swell-4']);
  });

  test.each([
    [0, 0],
    [360, 0],
    [-360, 0],
    [-90, 1.5 * Math.PI],
    [270, 1.5 * Math.PI],
  ])('direction %d', (degrees, radians) => {
    const [{ fromRad }] = systems(
      `  - { kind: swell, from: ${degrees}, significantHeight: 1, peakPeriod: 10 }`,
    );
    expect(Object.is(fromRad, radians)).toBe(true);
  });
});

describe('systems that cannot be', () => {
  const swell = 'kind: swell, from: 0, significantHeight: 1, peakPeriod: 10';
  test.each([
    ['kind: wind-sea, from: 0, windSpeed: 10', '.fetch', /fetch beside/, /unlimited/],
    ['kind: wind-sea, from: 0, fetch: 10 km', '.windSpeed', /windSpeed and fetch/, /windSpeed: 20 kn/],
    ['kind: wind-sea, from: 0', '.windSpeed', /windSpeed and fetch/, /fetch/],
    ['kind: wind-sea, from: 0, significantHeight: 1', '.peakPeriod', /together/, /Add peakPeriod/],
    ['kind: wind-sea, from: 0, peakPeriod: 4', '.significantHeight', /together/, /Add significantHeight/],
    ['kind: wind-sea, from: 0, windSpeed: 9, fetch: 9 km, peakPeriod: 4', '', /either/, /Remove fetch/],
    ['kind: wind-sea, windSpeed: 9, fetch: 9 km', '.from', /direction from -360 to 360 deg/, /Add `from`/],
    ['kind: wind-sea, from: 0, windSpeed: 0, fetch: 9 km', '.windSpeed', /above 0/, /24 kn/],
    ['kind: wind-sea, from: 0, windSpeed: 90, fetch: 9 km', '.windSpeed', /to 60 m\/s/, /24 kn/],
    ['kind: wind-sea, from: 0, windSpeed: 9, fetch: 0', '.fetch', /above 0 m/, /unlimited/],
    [
      'kind: wind-sea, from: 0, windSpeed: 9, fetch: unlimted',
      '.fetch',
      /`unlimited`/,
      /Did you mean `unlimited`/,
    ],
    ['kind: swell, from: 0, significantHeight: 0, peakPeriod: 10', '.significantHeight', /above 0/, /2.5 m/],
    ['kind: swell, from: 0, significantHeight: -1, peakPeriod: 10', '.significantHeight', /above 0/, /2.5 m/],
    ['kind: swell, from: 0, significantHeight: 1, peakPeriod: 0', '.peakPeriod', /from 0.1 to 40 s/, /9 s/],
    ['kind: swell, from: 0, significantHeight: 1, peakPeriod: -9', '.peakPeriod', /from 0.1 to 40 s/, /9 s/],
    [
      'kind: swell, from: 0, significantHeight: 1, peakPeriod: .nan',
      '.peakPeriod',
      /from 0.1 to 40 s/,
      /9 s/,
    ],
    ['kind: swell, from: 0, significantHeight: 1, peakPeriod: 1e999 s', '.peakPeriod', /to 40 s/, /9 s/],
    [`${swell}, windSpeed: 9`, '.windSpeed', /one of the keys/, /Remove it/],
    [`${swell}, peakPeroid: 9`, '.peakPeroid', /one of the keys/, /Did you mean `peakPeriod`/],
    [
      `${swell}, spectrum: jonswop`,
      '.spectrum',
      /one of pierson-moskowitz, jonswap/,
      /Did you mean `jonswap`/,
    ],
    [`${swell}, spectrum: pierson-moskowitz`, '.spectrum', /height and period/, /bretschneider/],
    [`${swell}, spectrum: bretschneider, peakEnhancement: 2`, '.peakEnhancement', /no peak/, /Remove/],
    [`${swell}, peakEnhancement: 0.5`, '.peakEnhancement', /from 1 to 20/, /3.3/],
    [`${swell}, spreading: mitsuyasu`, '.spreading', /windSpeed/, /cos-2s/],
    [`${swell}, spreading: { form: hasselmann, s: 9 }`, '.spreading.s', /no exponent/, /cos-2s/],
    [`${swell}, spreading: { swellNarrowing: 2 }`, '.spreading.swellNarrowing', /from 0 to 1/, /0.5/],
    [`${swell}, name: '../north'`, '.name', /1 to 40 letters/, /short name/],
    [
      'kind: wind-sea, from: 0, windSpeed: 9, fetch: 9 km, spectrum: bretschneider',
      '.spectrum',
      /peakPeriod/,
      /jonswap/,
    ],
    [
      'kind: wind-sea, from: 0, windSpeed: 9, fetch: 9 km, spectrum: pierson-moskowitz',
      '.spectrum',
      /fetch/,
      /unlimited/,
    ],
    [
      'kind: wind-sea, from: 0, significantHeight: 1, peakPeriod: 5, spectrum: pierson-moskowitz',
      '.spectrum',
      /height/,
      /bretschneider/,
    ],
    ['kind: tide, from: 0', '.kind', /one of wind-sea, swell/, /which kind/],
    ['from: 0', '.kind', /one of wind-sea, swell/, /Add `kind`/],
  ])('%s', (text, path, expected, remedy) => {
    const problems = problemsOf(`${HEAD}systems:\n  - { ${text} }\n`);
    expect(problems.map((problem) => problem.path)).toEqual([`systems[0]${path}`]);
    expect(problems[0].line).toBe(4);
    expect(problems[0].expected).toMatch(expected);
    expect(problems[0].remedy).toMatch(remedy);
  });

  test('two systems of one name', () => {
    const [problem] = problemsOf(`${HEAD}systems:\n  - { ${swell}, name: a }\n  - { ${swell}, name: a }\n`);
    expect(problem).toMatchObject({ path: 'systems[1].name', line: 5, found: '`a` again' });
  });

  test('no system at all', () => {
    expect(problemsOf(`${HEAD}systems: []`)[0]).toMatchObject({ path: 'systems', found: 'an empty list' });
    expect(problemsOf(`${HEAD}systems: 3`)[0].expected).toContain('list');
    expect(problemsOf(`${HEAD}systems:\n  - 3`)[0].expected).toContain('wave system');
  });
});
