import { describe, expect, test } from 'vitest';
import { InputError } from '../../../src/errors.ts';
import { parseSea, seaFromObject } from '../../../src/sea/parse.ts';
import { HEAD, placesOf, problemsOf, problemsOfObject, SOUND, SWELL, WIND_SEA } from './problems.ts';

describe('a sound sea', () => {
  test('water, current, output and seed have their defaults', () => {
    const sea = parseSea(SOUND);
    expect(sea).toMatchObject({
      seaFile: 1,
      title: 'Test',
      seed: 1,
      water: { depthM: Infinity, gravityMps2: 9.80665, densityKgpm3: 1025, surfaceTensionNpm: 0.0742 },
      current: { eastMps: 0, northMps: 0 },
      output: {
        axes: 'z-up',
        rowZero: 'north',
        normalGreen: 'north',
        lengthUnit: 'm',
        exrChannels: 'plain',
        padding: 4,
      },
    });
  });

  test('a current runs toward its direction', () => {
    const current = (text: string): unknown => parseSea(`${SOUND}water: { current: ${text} }`).current;
    expect(current('{ speed: 2, toward: 90 }')).toEqual({ eastMps: 2, northMps: 0 });
    expect(current('{ speed: 2, toward: 180 deg }')).toEqual({ eastMps: 0, northMps: -2 });
    expect(current('{ speed: 0 }')).toEqual({ eastMps: 0, northMps: 0 });
    const { eastMps, northMps } = parseSea(
      `${SOUND}water: { current: { speed: 5, toward: 323.1301 } }`,
    ).current;
    // A 3-4-5 triangle: the angle is given to 1e-4 degrees.
    expect(Math.hypot(eastMps + 3, northMps - 4)).toBeLessThan(1e-5);
  });

  test('JSON is read as YAML 1.2, a `$schema` key and all', () => {
    const document = {
      $schema: './sea.schema.json',
      seaFile: 1,
      title: 'Test',
      systems: [{ kind: 'wind-sea', from: '250 deg', windSpeed: 8, fetch: '20 km' }],
    };
    expect(parseSea(JSON.stringify(document))).toEqual(parseSea(SOUND));
    expect(seaFromObject(document)).toEqual(parseSea(SOUND));
  });

  test('words of YAML 1.1 are texts, not booleans', () => {
    expect(parseSea(`seaFile: 1\ntitle: no\n${WIND_SEA}`).title).toBe('no');
  });

  test('anchors and aliases are allowed', () => {
    const text = `${HEAD}systems:\n  - &a { kind: swell, from: 9, significantHeight: 1, peakPeriod: 9 }\n  - *a\n`;
    expect(parseSea(text).systems.map(({ name }) => name)).toEqual(['swell', 'swell-2']);
  });
});

describe('all problems at once, each at its place', () => {
  test('faults of the schema do not hide those between keys', () => {
    const text = [
      'seaFile: 2',
      'tilte: Test',
      'water: { depth: -3 }',
      'systems:',
      '  - kind: wind-sea',
      '    from: west',
      '    windSpeed: 8 m/s',
      '    fetch: 20 km',
      '  - kind: wind-sea',
      '    from: 250',
      '    windSpeed: 8 m/s',
      'loop: { seconds: 8 }',
      'cascades: { resolution: 200 }',
      'maps:',
      '  normal: { format: png, bits: 16, dither: true }',
    ].join('\n');
    expect(placesOf(text)).toEqual([
      '1:1 title',
      '1:10 seaFile',
      '2:1 tilte',
      '3:17 water.depth',
      '6:11 systems[0].from',
      '9:5 systems[1].fetch',
      '12:7 loop',
      '13:25 cascades.resolution',
      '15:44 maps.normal.dither',
    ]);
  });

  test('the message names file, place, path, what was expected, what was found and what to do', () => {
    const parse = (): unknown => parseSea(`${SOUND}water: { depth: -3 }`, { source: 'bay.yaml' });
    expect(parse).toThrow(InputError);
    expect(parse).toThrow(
      'bay.yaml:4:17: water.depth: expected `deep` or a depth from 0.01 m to 12000 m ' +
        '(a number in m or text in m, km, cm, mm, ft, nmi), found `-3`. Write `deep` or a number with its unit.',
    );
  });

  test.each([
    ['{ depth: 0 }', '.depth', 17],
    ['{ depth: depe }', '.depth', 17],
    ['{ density: 1 }', '.density', 19],
    ['{ surfaceTension: 2 }', '.surfaceTension', 26],
    ['{ gravity: 0 }', '.gravity', 19],
    ['{ current: { speed: 11, toward: 0 } }', '.current.speed', 28],
    ['{ current: { speed: 1 } }', '.current.toward', 19],
    ['{ current: { toward: 1 } }', '.current.speed', 19],
    ['{ salt: 35 }', '.salt', 10],
    ['5', '', 8],
  ])('water: %s', (text, path, column) => {
    expect(placesOf(`${SOUND}water: ${text}`)).toEqual([`4:${column} water${path}`]);
  });

  test.each([
    ['seed: -1', '4:7 seed'],
    ['seed: 4294967296', '4:7 seed'],
    ['seed: 1.5', '4:7 seed'],
    ['seed:', '4:1 seed'],
    ['output: { padding: 3 }', '4:20 output.padding'],
    ['output: { axes: x-up }', '4:17 output.axes'],
    ['outptu: {}', '4:1 outptu'],
    ['<<: {}', '4:1 <<'],
    ["'': 1", '4:1 '],
  ])('%s', (line, place) => {
    expect(placesOf(SOUND + line)).toEqual([place]);
  });

  test.each([
    ["''", 'an empty text'],
    ["'   '", '`   `'],
    ['"a\\nb"', '`a b`'],
    ['12', '`12`'],
    ['x'.repeat(201), `\`${'x'.repeat(60)}...\``],
  ])('title %.10s', (title, found) => {
    const [problem] = problemsOf(`seaFile: 1\ntitle: ${title}\n${WIND_SEA}`);
    expect(problem).toMatchObject({ path: 'title', line: 2, column: 8, found });
  });

  test('a long list of problems is cut', () => {
    const junk = Array.from({ length: 200 }, (_, i) => `junk${i}: 1`).join('\n');
    const problems = problemsOf(SOUND + junk);
    expect(problems).toHaveLength(51);
    expect(problems[50].found).toBe('200');
  });

  test('a problem under an alias is shown where the alias is used', () => {
    const text = `${HEAD}systems:\n  - &a { kind: swell, from: 9, significantHeight: 1, peakPeriod: 0 }\n  - *a\n`;
    expect(placesOf(text)).toEqual(['4:66 systems[0].peakPeriod', '4:66 systems[1].peakPeriod']);
  });
});

describe('seas built in memory', () => {
  test('problems have paths but no lines', () => {
    expect(problemsOfObject({ seaFile: 1, title: 'Test', systems: [] })).toMatchObject([
      { path: 'systems', line: 0, column: 0 },
    ]);
  });

  test.each([[null], [undefined], [3], ['sea'], [[]], [() => 1]])('%s is no sea', (value) => {
    expect(problemsOfObject(value)).toMatchObject([
      { path: '', expected: expect.stringContaining('sea file') },
    ]);
  });
});

test('a swell alone needs no wind', () => {
  expect(problemsOf(HEAD + SWELL)).toEqual([]);
});
