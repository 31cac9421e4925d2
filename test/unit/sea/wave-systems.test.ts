import { describe, expect, test } from 'vitest';
import { parseSea } from '../../../src/sea/parse.ts';
import type { SwellRequest, WindSeaRequest } from '../../../src/sea/sea.ts';
import { HEAD, problemsOf } from './problems.ts';

function systems(lines: string, above = ''): readonly (WindSeaRequest | SwellRequest)[] {
  return parseSea(`${HEAD}${above}systems:\n${lines}`).systems.map((system) => {
    if (system.kind === 'measured') throw new Error('no file was given');
    return system;
  });
}

describe('what a system may leave out', () => {
  test('a wind sea by wind and fetch', () => {
    expect(systems('  - { kind: wind-sea, from: 250, windSpeed: 10, fetch: 20 km }')).toEqual([
      {
        kind: 'wind-sea',
        name: 'wind-sea',
        fromRad: (250 * Math.PI) / 180,
        spectrum: 'jonswap',
        spectrumRow: null,
        peakEnhancement: null,
        spreading: { form: 'hasselmann', s: null, widthRad: null, swellNarrowing: 0 },
        scaleToM: null,
        growth: { windSpeedMps: 10, fetchM: 20000, durationS: Infinity, law: 'jonswap' },
        stated: null,
        windSpeedMps: 10,
        wind: { by: 'speed', speedMps: 10, heightM: 10 },
        seaState: null,
        periodBy: null,
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
      {
        name: 'swell',
        spectrum: 'jonswap',
        spreading: { form: 'cos-2s', s: 25, widthRad: null, swellNarrowing: 0 },
      },
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
    ['hasselmann', { form: 'hasselmann', s: null, widthRad: null, swellNarrowing: 0 }],
    ['{ swellNarrowing: 0.4 }', { form: 'hasselmann', s: null, widthRad: null, swellNarrowing: 0.4 }],
    ['{ s: 12 }', { form: 'cos-2s', s: 12, widthRad: null, swellNarrowing: 0 }],
    ['cos-2s', { form: 'cos-2s', s: 10, widthRad: null, swellNarrowing: 0 }],
    ['mitsuyasu', { form: 'mitsuyasu', s: null, widthRad: null, swellNarrowing: 0 }],
  ])('spreading %s', (text, spreading) => {
    const lines = `  - { kind: wind-sea, from: 0, windSpeed: 10, fetch: 20 km, spreading: ${text} }`;
    expect(systems(lines)[0].spreading).toEqual(spreading);
  });

  test.each([
    ['wrapped-normal', 'wind-sea', Math.sqrt(-2 * Math.log(10 / 11))],
    ['{ width: 20 deg }', 'wind-sea', (20 * Math.PI) / 180],
    ['{ form: wrapped-normal, width: 20 }', 'wind-sea', (20 * Math.PI) / 180],
    ['wrapped-normal', 'swell', Math.sqrt(-2 * Math.log(25 / 26))],
  ])('spreading %s of a %s', (text, kind, widthRad) => {
    const lines = `  - { kind: ${kind}, from: 0, significantHeight: 1, peakPeriod: 6, spreading: ${text} }`;
    const [{ spreading }] = systems(lines);
    expect(spreading).toMatchObject({ form: 'wrapped-normal', s: null });
    expect(spreading.widthRad).toBeCloseTo(widthRad, 14);
  });

  test('elfouhaily brings its own spreading, others do not', () => {
    const lines = '  - { kind: wind-sea, from: 0, windSpeed: 10, fetch: 20 km, spectrum: elfouhaily }';
    expect(systems(lines)).toMatchObject([
      { spreading: { form: 'elfouhaily' }, growth: { law: null }, spectrumRow: null },
    ]);
    const other = '  - { kind: wind-sea, from: 0, windSpeed: 10, fetch: 20 km, spreading: elfouhaily }';
    expect(systems(other)).toMatchObject([{ spectrum: 'jonswap', spreading: { form: 'elfouhaily' } }]);
  });

  test.each([
    ['ochi-hubble', 0],
    ['{ form: ochi-hubble }', 0],
    ['{ form: ochi-hubble, row: most-probable }', 0],
    ['{ form: ochi-hubble, row: 10 }', 10],
  ])('spectrum %s is row %d, at its own peak', (text, row) => {
    const [system] = systems(`  - { kind: wind-sea, from: 0, significantHeight: 7, spectrum: ${text} }`);
    expect(system).toMatchObject({ spectrum: 'ochi-hubble', spectrumRow: row, periodBy: 'spectrum' });
    // Row 0 of 7 m: omega_m1 = .70 exp(-.046 * 7) = .507 rad/s is the higher peak; row 10: .62 exp(-.039 * 7) = .472.
    const peak = row === 0 ? 0.507 : 0.472;
    expect(Math.abs((2 * Math.PI) / (system.stated?.peakPeriodS ?? 0) / peak - 1)).toBeLessThan(0.01);
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

describe('the words people are given', () => {
  test('a Beaufort force is a wind on the open sea', () => {
    const [system] = systems('  - { kind: wind-sea, from: 0, beaufort: 6 }');
    // .836 * 6^1.5 = 12.287 (Stewart 2008).
    expect(system).toMatchObject({
      wind: { by: 'beaufort', force: 6 },
      growth: { fetchM: Infinity, durationS: Infinity, law: 'jonswap' },
    });
    expect(system.kind === 'wind-sea' && system.windSpeedMps?.toFixed(3)).toBe('12.287');
    expect(systems('  - { kind: wind-sea, from: 0, beaufort: 6, fetch: 20 km }')).toMatchObject([
      { growth: { fetchM: 20000 } },
    ]);
  });

  test('a wind at another height is brought to 10 m', () => {
    // 10 + (.3808 / .4) ln 1.95 = 10.636 m/s with the friction velocity of Wu 1982 at 10 m/s.
    const [system] = systems(
      '  - { kind: wind-sea, from: 0, windSpeed: 10.636, windHeight: 19.5 m, fetch: 20 km }',
    );
    expect(system).toMatchObject({ wind: { by: 'speed', speedMps: 10.636, heightM: 19.5 } });
    expect(system.kind === 'wind-sea' && system.growth?.windSpeedMps.toFixed(3)).toBe('10.000');
  });

  test('at 10 m a wind is what it is, to the bit', () => {
    const lines = '  - { kind: wind-sea, from: 0, windSpeed: 7.3, windHeight: 10 m, fetch: 20 km }';
    expect(systems(lines)).toMatchObject([{ windSpeedMps: 7.3 }]);
  });

  test.each([
    [1, 0.05],
    [2, 0.3],
    [5, 3.25],
    [8, 11.5],
    [9, 14],
  ])('sea state %d is a height of %f m, as flat as wind makes it', (code, height) => {
    const [system] = systems(`  - { kind: wind-sea, from: 0, seaState: ${code} }`);
    expect(system).toMatchObject({ seaState: code, periodBy: 'full-development', growth: null });
    expect(system.stated?.significantHeightM).toBeCloseTo(height, 12);
    // Hs = .24133 U^2 / g and Tp = 7.5188 U / g: Tp = 15.305 sqrt(Hs / g).
    expect((system.stated?.peakPeriodS ?? 0) / Math.sqrt(height / 9.80665)).toBeCloseTo(15.305, 3);
  });

  test('a sea state keeps the period it is given', () => {
    const lines = '  - { kind: wind-sea, from: 0, seaState: 5, peakPeriod: 8, beaufort: 6 }';
    expect(systems(lines)).toMatchObject([
      { stated: { significantHeightM: 3.25, peakPeriodS: 8 }, periodBy: 'user', growth: null },
    ]);
  });

  test('duration, growth law and the height to scale to', () => {
    const wind = 'kind: wind-sea, from: 0, windSpeed: 10';
    expect(systems(`  - { ${wind}, duration: 6 h, growth: wilson, scaleTo: 2.5 m }`)).toMatchObject([
      { growth: { fetchM: Infinity, durationS: 21600, law: 'wilson' }, scaleToM: 2.5 },
    ]);
    expect(
      systems('  - { kind: swell, from: 0, significantHeight: 1, peakPeriod: 10, scaleTo: 2 }'),
    ).toMatchObject([{ stated: { significantHeightM: 1 }, scaleToM: 2 }]);
  });
});

describe('systems that cannot be', () => {
  const wind = 'kind: wind-sea, from: 0, windSpeed: 10, fetch: 9 km';
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
    [`${wind}, beaufort: 6`, '.beaufort', /either windSpeed or beaufort/, /Remove one/],
    ['kind: wind-sea, from: 0, beaufort: 0', '.beaufort', /from 1 to 12/, /without a fraction/],
    ['kind: wind-sea, from: 0, beaufort: 13', '.beaufort', /from 1 to 12/, /without a fraction/],
    ['kind: wind-sea, from: 0, beaufort: 6, windHeight: 5 m', '.windHeight', /a windSpeed/, /Remove it/],
    ['kind: wind-sea, from: 0, seaState: 4, windHeight: 5 m', '.windHeight', /a windSpeed/, /windSpeed/],
    [`${wind}, windHeight: 0.5 m`, '.windHeight', /from 1 to 100 m/, /19.5 m/],
    [
      'kind: wind-sea, from: 0, windSpeed: 55, windHeight: 2 m, fetch: 9 km',
      '.windSpeed',
      /at most .* 60 m\/s at 10 m/,
      /Check/,
    ],
    ['kind: wind-sea, from: 0, duration: 3 h', '.windSpeed', /windSpeed and fetch/, /windSpeed: 20 kn/],
    [`${wind}, growth: jonswop`, '.growth', /one of jonswap/, /Did you mean `jonswap`/],
    [`${wind}, spectrum: elfouhaily, growth: wilson`, '.growth', /has its own/, /Remove it/],
    [`${wind}, spectrum: torsethaugen`, '.spectrum', /significantHeight and peakPeriod/, /jonswap/],
    [`${wind}, spectrum: ochi-hubble`, '.spectrum', /a significantHeight for/, /jonswap/],
    [`${wind}, spectrum: { row: 3 }`, '.spectrum.form', /one of pierson-moskowitz/, /Add `form`/],
    [`${wind}, spectrum: { form: tma, row: 3 }`, '.spectrum.row', /no row/, /ochi-hubble/],
    [`${wind}, spectrum: { form: ochi-hubble, row: 11 }`, '.spectrum.row', /1 to 10/, /without a fraction/],
    ['kind: wind-sea, from: 0, seaState: 0', '.seaState', /from 1 to 9/, /without a fraction/],
    [
      'kind: wind-sea, from: 0, seaState: 4, significantHeight: 2, peakPeriod: 6',
      '.seaState',
      /either/,
      /one/,
    ],
    ['kind: wind-sea, from: 0, seaState: 4, duration: 3 h', '', /either/, /Remove duration/],
    ['kind: wind-sea, from: 0, seaState: 4, growth: wilson', '', /either/, /Remove growth/],
    [
      'kind: wind-sea, from: 0, significantHeight: 4, peakPeriod: 9, spectrum: ochi-hubble',
      '.peakPeriod',
      /follow from the height/,
      /torsethaugen/,
    ],
    [
      'kind: wind-sea, from: 0, significantHeight: 4, peakPeriod: 9, spectrum: elfouhaily, beaufort: 6',
      '.spectrum',
      /height and period/,
      /scaleTo/,
    ],
    [
      'kind: wind-sea, from: 0, significantHeight: 1, peakPeriod: 5, spectrum: donelan-hamilton-hui',
      '.spectrum',
      /age of the sea/,
      /windSpeed/,
    ],
    [`${swell}, spectrum: ochi-hubble`, '.spectrum', /height and period/, /wind-sea/],
    [`${swell}, spectrum: donelan-hamilton-hui`, '.spectrum', /height and period/, /wind-sea/],
    [`${swell}, spreading: elfouhaily`, '.spreading', /windSpeed/, /cos-2s/],
    [`${swell}, spreading: { form: cos-2s, width: 20 }`, '.spreading.width', /no width/, /wrapped-normal/],
    [`${swell}, spreading: { width: 200 }`, '.spreading.width', /from 1 to 120/, /25 deg/],
    [
      `${swell}, spreading: { form: donelan-banner, swellNarrowing: 0.5 }`,
      '.spreading.swellNarrowing',
      /no exponent/,
      /hasselmann/,
    ],
    [`${swell}, scaleTo: 0`, '.scaleTo', /above 0/, /2.5 m/],
    // 10 s waves are 156 m long: a seventh is 22.3 m.
    [`${swell}, scaleTo: 23`, '.scaleTo', /at most 22\.3 m/, /steeper/],
    ['kind: wind-sea, from: 0, seaState: 8, peakPeriod: 5', '.seaState', /at most 5\.57 m/, /steeper/],
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
