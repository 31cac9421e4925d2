import { describe, expect, test } from 'vitest';
import { parseSea } from '../../../src/sea/parse.ts';
import { seaWarnings } from '../../../src/sea/warnings.ts';
import { HEAD, problemsOf, SOUND, SWELL } from './problems.ts';

const foamMaps = (text: string): string[] => parseSea(text).maps.map(({ map }) => map);

describe('without a word on foam', () => {
  test('it follows the wind', () => {
    expect(parseSea(SOUND).foam).toEqual({
      target: { by: 'wind' },
      decayTimeS: null,
      residue: 'remove',
      shares: null,
    });
    expect(foamMaps(SOUND)).toEqual(['displacement', 'normal', 'foam']);
  });

  test('it is off where no wind is known, and its map is not written', () => {
    expect(parseSea(HEAD + SWELL).foam.target).toEqual({ by: 'off' });
    expect(foamMaps(HEAD + SWELL)).toEqual(['displacement', 'normal']);
  });
});

test.each([
  ['off', { target: { by: 'off' } }],
  ['{ coverage: wind }', { target: { by: 'wind' } }],
  ['{ coverage: 2.5 % }', { target: { by: 'coverage', coverage: 0.025 } }],
  [
    '{ breakingLevel: 0.6, residue: keep }',
    { target: { by: 'breaking-level', breakingJ: 0.6 }, residue: 'keep' },
  ],
  ['{ decayTime: 2 s }', { target: { by: 'wind' }, decayTimeS: 2 }],
  ['{ coverage: 0.1, shares: [0.333, 0.333, 0.333] }', { shares: [0.333, 0.333, 0.333] }],
])('foam: %s', (text, foam) => {
  expect(parseSea(`${SOUND}foam: ${text}`).foam).toMatchObject(foam);
});

describe('foam that cannot be', () => {
  const gale = `${HEAD}systems: [{ kind: wind-sea, from: 250, windSpeed: 26, fetch: 300 km }]\n`;
  test.each([
    [`${SOUND}foam: none`, 'foam', /`off` or a group/, /foam: off/],
    [`${SOUND}foam: { coverage: 2 }`, 'foam.coverage', /`wind` or a share/, /wind/],
    [`${SOUND}foam: { coverage: 0 }`, 'foam.coverage', /above 0/, /wind/],
    [`${SOUND}foam: { coverage: 0.1, breakingLevel: 0.5 }`, 'foam.breakingLevel', /or/, /Remove one/],
    [`${SOUND}foam: { breakingLevel: 0.95 }`, 'foam.breakingLevel', /-1 to 0.9/, /0.7/],
    [`${SOUND}foam: { coverage: 0.1, shares: [0.5, 0.4] }`, 'foam.shares', /add up to 1/, /Scale/],
    [
      `${SOUND}cascades: [{ patch: 9 }]\nfoam: { coverage: 0.1, shares: [0.5, 0.5] }`,
      'foam.shares',
      /1 shares/,
      /each/,
    ],
    [`${SOUND}foam: off\nmaps: { foam: png }`, 'maps.foam', /no foam map/, /coverage: 2 %/],
    [`${HEAD}${SWELL}foam: { decayTime: 2 }`, 'foam.coverage', /windSpeed/, /foam: off/],
    [`${HEAD}${SWELL}maps: { foam: png }`, 'foam.coverage', /windSpeed/, /coverage: 2 %/],
    [gale, 'foam.coverage', /at most 25 m\/s/, /coverage: 20 %/],
  ])('%s', (text, path, expected, remedy) => {
    const problems = problemsOf(text);
    expect(problems.map((problem) => problem.path)).toEqual([path]);
    expect(problems[0].line).toBeGreaterThan(0);
    expect(problems[0].expected).toMatch(expected);
    expect(problems[0].remedy).toMatch(remedy);
  });

  test('a storm with a coverage of its own, or without foam, is sound', () => {
    expect(problemsOf(`${gale}foam: { coverage: 20 % }`)).toEqual([]);
    expect(problemsOf(`${gale}foam: off`)).toEqual([]);
  });
});

test('foam described but not written is a warning', () => {
  expect(seaWarnings(parseSea(`${SOUND}foam: { coverage: 2 % }\nmaps: { normal: png }`))).toHaveLength(1);
  expect(seaWarnings(parseSea(`${SOUND}maps: { normal: png }`))).toEqual([]);
});
