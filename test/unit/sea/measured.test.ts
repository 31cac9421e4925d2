import { describe, expect, test } from 'vitest';
import { InputError, type InputProblem } from '../../../src/errors.ts';
import { parseSea } from '../../../src/sea/parse.ts';
import type { MeasuredRequest } from '../../../src/sea/sea.ts';
import { seaWarnings } from '../../../src/sea/warnings.ts';
import { HEAD } from './problems.ts';

type Files = Readonly<Record<string, string>>;

function sea(keys: string, files: Files, more = '') {
  return parseSea(`${HEAD}systems:\n  - { kind: measured, ${keys} }\n${more}`, {
    source: 'test.yaml',
    readFile: (path) => (path in files ? { source: path, text: files[path] } : { problem: 'none there' }),
  });
}

function measured(keys: string, files: Files): MeasuredRequest {
  const [system] = sea(keys, files).systems;
  if (system.kind !== 'measured') throw new Error(`found a ${system.kind}`);
  return system;
}

function refusal(keys: string, files: Files): InputProblem & { readonly source: string } {
  try {
    sea(keys, files);
  } catch (error) {
    if (error instanceof InputError) return { source: error.source, ...error.problems[0] };
    throw error;
  }
  throw new Error('was accepted');
}

const degrees = (rad: number): number => (rad * 180) / Math.PI;

const TABLE = [
  '# A comment, and columns in another order.',
  'energy, frequency ,Direction,spread',
  '1,0.05,240,30',
  '4,0.06,250,20',
  '',
  '2,0.08,300,40',
  '0,0.1,,',
].join('\r\n');

describe('a table', () => {
  test('gives its own height, and directions about their mean', () => {
    const { source, spectrum, fromRad } = measured('file: a.csv', { 'a.csv': TABLE });
    expect(source).toBe('a.csv');
    expect(spectrum.frequencyHz).toEqual([0.05, 0.06, 0.08, 0.1]);
    expect(spectrum.densityM2PerHz).toEqual([1, 4, 2, 0]);
    // Bands meet half way: .01, .015, .02 and .02 Hz wide.
    expect(spectrum.significantHeightM).toBeCloseTo(4 * Math.sqrt(0.01 + 0.06 + 0.04), 12);
    expect(degrees(spectrum.peakFromRad)).toBeCloseTo(250, 9);
    // Vector mean of energies .01, .06, .04 with r1 = 1 - spread^2 / 2.
    const parts = [
      [0.01, 240, 30],
      [0.06, 250, 20],
      [0.04, 300, 40],
    ].map(([m0, from, spread]) => [m0 * (1 - 0.5 * (spread * (Math.PI / 180)) ** 2), from * (Math.PI / 180)]);
    const east = parts.reduce((sum, [w, from]) => sum + w * Math.sin(from), 0);
    const north = parts.reduce((sum, [w, from]) => sum + w * Math.cos(from), 0);
    expect(fromRad).toBeCloseTo(Math.atan2(east, north) + 2 * Math.PI, 12);
  });

  test('moments turn against the compass, the bands without energy take their neighbours', () => {
    const { spectrum, fromRad } = measured('file: a.csv', { 'a.csv': TABLE });
    const off = (300 * Math.PI) / 180 - fromRad;
    const r1 = 1 - 0.5 * ((40 * Math.PI) / 180) ** 2;
    expect(spectrum.cos1[2]).toBeCloseTo(r1 * Math.cos(off), 12);
    expect(spectrum.sin1[2]).toBeCloseTo(-r1 * Math.sin(off), 12);
    const s = r1 / (1 - r1);
    const r2 = (s * (s - 1)) / ((s + 1) * (s + 2));
    expect(spectrum.cos2[2]).toBeCloseTo(r2 * Math.cos(2 * off), 12);
    expect(spectrum.sin2[2]).toBeCloseTo(-r2 * Math.sin(2 * off), 12);
    for (const key of ['cos1', 'sin1', 'cos2', 'sin2'] as const)
      expect(spectrum[key][3]).toBe(spectrum[key][2]);
  });

  const PLAIN = 'frequency,energy\n0.1,1\n0.2,2\n0.3,1\n';

  test('without directions takes the one that is stated', () => {
    const { fromRad, spectrum } = measured('file: a.csv, from: -90, spread: 20', { 'a.csv': PLAIN });
    expect(degrees(fromRad)).toBeCloseTo(270, 12);
    expect(spectrum.cos1[1]).toBeCloseTo(1 - 0.5 * ((20 * Math.PI) / 180) ** 2, 12);
    expect(spectrum.sin1[1]).toBeCloseTo(0, 12);
    const broad = measured('file: a.csv, from: 0', { 'a.csv': PLAIN }).spectrum;
    expect(broad.cos1[1]).toBeCloseTo(1 - 0.5 * (Math.PI / 6) ** 2, 12);
    const turned = 'frequency,energy,direction\n0.1,1,10\n0.2,2,20\n0.3,1,30\n';
    expect(degrees(measured('file: a.csv', { 'a.csv': turned }).spectrum.peakFromRad)).toBeCloseTo(20, 9);
  });

  test('may be scaled, and knows a wind for whitecaps', () => {
    const system = measured('file: a.csv, from: 0, scaleTo: 2 m, beaufort: 4', { 'a.csv': PLAIN });
    expect(system).toMatchObject({ scaleToM: 2, wind: { by: 'beaufort', force: 4 } });
    expect(system.windSpeedMps).toBeCloseTo(6.688, 3);
    expect(sea('file: a.csv, from: 0, beaufort: 4', { 'a.csv': PLAIN }).foam.target.by).toBe('wind');
  });

  test('warns where the cascades want waves that no record holds', () => {
    // .3 Hz is 17.3 m in deep water.
    const [warning] = seaWarnings(sea('file: a.csv, from: 0', { 'a.csv': PLAIN }));
    expect(warning).toMatch(/ends at 0\.3 Hz: of waves shorter than 17\.3 m .* reach 0\.25 m/);
    const coarse = sea('file: a.csv, from: 0', { 'a.csv': PLAIN }, 'cascades: { shortestWavelength: 9 m }\n');
    expect(seaWarnings(coarse)).toEqual([]);
    const listed = sea(
      'file: a.csv, from: 0',
      { 'a.csv': PLAIN },
      'cascades: [{ patch: 300 m, resolution: 64 }]\n',
    );
    expect(seaWarnings(listed)).toEqual([]);
  });

  test.each([
    ['', 1, 1, /a first line that names the columns/, /an empty file/],
    ['0.1,1\n0.2,1\n0.3,2', 1, 1, /a first line that names/, /numbers/],
    ['frequency,energie\n', 1, 1, /one of the columns/, /`energie`/],
    ['frequency,energy,period\n', 1, 1, /one of the columns/, /`period`/],
    ['frequency,energy,energy\n', 1, 1, /each column once/, /twice/],
    ['frequency,direction\n', 1, 1, /a column `energy`/, /none/],
    ['frequency,energy,spread\n', 1, 1, /a column `direction`/, /none/],
    ['frequency,energy\n0.1,1\n0.2,1\n', 3, 1, /3 to 2000 rows/, /2/],
    ['frequency,energy\n0.1,1\n0.2\n0.3,1', 3, 1, /2 values/, /1/],
    ['frequency,energy\n0.1,1\n0.2,1,7\n0.3,1', 3, 1, /2 values/, /3/],
    ['frequency,energy\n0.1,1\n0.2, MM\n0.3,1', 3, 6, /an energy from 0/, /`MM`/],
    ['frequency,energy\n0.1,1\n0.2,\n0.3,1', 3, 5, /an energy from 0/, /a missing value/],
    ['frequency,energy\n0.1,1\n0.2,-1\n0.3,1', 3, 5, /an energy from 0/, /`-1`/],
    ['frequency,energy\n0.1,1\n0.2,nan\n0.3,1', 3, 5, /an energy from 0/, /`nan`/],
    ['frequency,energy\n0.1,1\n0,2\n0.3,1', 3, 1, /a frequency from 0.0001/, /`0`/],
    ['frequency,energy\n0.1,1\n0.1,2\n0.3,1', 3, 1, /above that of the row before/, /0.1 Hz/],
    ['frequency,energy,direction\n0.1,1,10\n0.2,2,999\n0.3,1,10', 3, 7, /a direction from -360/, /`999`/],
    ['frequency,energy,direction\n0.1,1,10\n0.2,2,\n0.3,1,10', 3, 7, /a direction/, /a missing value/],
    ['frequency,energy,direction,spread\n0.1,1,10,0\n', 2, 10, /a spread from 3 to 80/, /`0`/],
    ['frequency,energy\n0.1,0\n0.2,0\n0.3,0', 1, 1, /energy at some frequency/, /none/],
  ])('%j is refused at %d:%d', (text, line, column, expected, found) => {
    const problem = refusal('file: a.csv, from: 0', { 'a.csv': text });
    expect(problem).toMatchObject({ source: 'a.csv', line, column });
    expect(problem.expected).toMatch(expected);
    expect(problem.found).toMatch(found);
  });

  test.each([
    ['file: a.csv', /^systems\[0\]\.from$/, /the direction the waves come from/],
    ['from: 0', /\.file$/, /either file or ndbc/],
    ['file: a.csv, ndbc: { density: d }, from: 0', /\.ndbc$/, /either file or ndbc/],
    ['file: a.csv, from: 0, time: 2020-01-01T00:00Z', /\.time$/, /no time for a table/],
    ['file: b.csv, from: 0', /\.file$/, /a file that can be read/],
    ['file: a.csv, from: 0, spread: 1', /\.spread$/, /from 3 to 80/],
    ['file: full.csv, from: 0', /\.from$/, /no from beside/],
    ['file: full.csv, spread: 20', /\.spread$/, /no spread beside/],
    ['file: "", from: 0', /\.file$/, /1 to 500 characters/],
    ['file: a.csv, from: 0, windHeight: 5', /\.windHeight$/, /windSpeed/],
    ['file: a.csv, from: 0, peakPeriod: 5', /\.peakPeriod$/, /one of the keys/],
    ['file: a.csv, from: 0, scaleTo: 0', /\.scaleTo$/, /above 0/],
  ])('%s is refused in the sea file', (keys, path, expected) => {
    const problem = refusal(keys, { 'a.csv': PLAIN, 'full.csv': TABLE });
    expect(problem).toMatchObject({ source: 'test.yaml', line: 4 });
    expect(problem.path).toMatch(path);
    expect(problem.expected).toMatch(expected);
  });

  test('without a way to read files is refused, not read', () => {
    expect(() => parseSea(`${HEAD}systems: [{ kind: measured, file: a.csv, from: 0 }]`)).toThrow(/readFile/);
  });

  test('higher than its water is refused', () => {
    const files = { 'a.csv': 'frequency,energy\n0.1,9\n0.2,9\n0.3,9\n' };
    expect(() => sea('file: a.csv, from: 0', files, 'water: { depth: 5 m }\n')).toThrow(
      /systems\[0\]: expected at most 3\.9 m, 0\.78 of the depth, found 6\.57 m/,
    );
  });
});
