import { describe, expect, test } from 'vitest';
import { InputError, type InputProblem } from '../../../src/errors.ts';
import { parseSea } from '../../../src/sea/parse.ts';
import type { MeasuredRequest } from '../../../src/sea/sea.ts';
import { BUOY_FILES, buoyText } from '../../support/buoy-day.ts';
import { HEAD } from './problems.ts';

type Texts = { readonly [K in keyof typeof BUOY_FILES]?: string | undefined };

const REAL: Texts = Object.fromEntries(
  Object.entries(BUOY_FILES).map(([key, file]) => [key, buoyText(file)]),
);

function system(texts: Texts, keys = 'time: 2020-06-08T03:50Z'): MeasuredRequest {
  const ndbc = Object.keys(texts).map((key) => `${key}: ${key}.txt`);
  const text = `${HEAD}systems:\n  - { kind: measured, ndbc: { ${ndbc.join(', ')} }, ${keys} }\n`;
  const { systems } = parseSea(text, {
    source: 'test.yaml',
    readFile: (path) => ({ source: path, text: texts[path.slice(0, -4) as keyof Texts] ?? '' }),
  });
  return systems[0] as MeasuredRequest;
}

function refusal(texts: Texts, keys?: string): InputProblem & { readonly source: string } {
  try {
    system(texts, keys);
  } catch (error) {
    if (error instanceof InputError) return { source: error.source, ...error.problems[0] };
    throw error;
  }
  throw new Error('was accepted');
}

/** Rows of the real files written as a yearly history: frequencies once, oldest first, r1 and r2 in hundredths. */
function history(key: keyof typeof BUOY_FILES, stamp: 'minutes' | 'hours' = 'minutes'): string {
  const rows = (REAL[key] as string).trim().split('\n').slice(1).reverse();
  const parts = rows.map((row) => row.replace(/[()]/g, '').trim().split(/\s+/));
  const from = key === 'density' ? 6 : 5;
  const pairs = parts.map((words) => words.slice(from));
  const exact = (f: string): string =>
    (Number(f) < 0.095 ? (Number(f) - 0.0005).toFixed(4) : `${f}0`).slice(1);
  const head = pairs[0].filter((_, i) => i % 2 === 1).map(exact);
  const scale = key === 'r1' || key === 'r2' ? 100 : 1;
  const lines = parts.map((words, r) => {
    const values = pairs[r]
      .filter((_, i) => i % 2 === 0)
      .map((value) =>
        Number(value) === 999 ? '999.0' : String(Math.round(Number(value) * scale * 1e4) / 1e4),
      );
    const time = stamp === 'minutes' ? words.slice(0, 5) : [words[0].slice(2), ...words.slice(1, 4)];
    return [...time, ...values].join(' ');
  });
  const names = stamp === 'minutes' ? '#YY  MM DD hh mm' : 'YY MM DD hh';
  return [`${names} ${head.join(' ')}`, ...lines, ''].join('\n');
}

const HISTORY: Texts = Object.fromEntries(
  (Object.keys(BUOY_FILES) as (keyof typeof BUOY_FILES)[]).map((key) => [key, history(key)]),
);

describe('the two layouts', () => {
  test('say the same: bands, energies and moments', () => {
    const [realTime, yearly] = [system(REAL).spectrum, system(HISTORY).spectrum];
    expect(yearly.frequencyHz).toEqual(realTime.frequencyHz);
    expect(yearly.densityM2PerHz).toEqual(realTime.densityM2PerHz);
    for (const key of ['cos1', 'sin1', 'cos2', 'sin2'] as const)
      yearly[key].forEach((value, i) => {
        expect(value).toBeCloseTo(realTime[key][i], 12);
      });
    expect(yearly.significantHeightM).toBe(realTime.significantHeightM);
  });

  test('frequencies printed to three decimals are those of the bands', () => {
    expect(system(REAL).spectrum.frequencyHz.slice(0, 3)).toEqual([0.0325, 0.0375, 0.0425]);
    expect(system(REAL).spectrum.frequencyHz.slice(-2)).toEqual([0.465, 0.485]);
  });

  test('the moments are those of the four-term form', () => {
    const { spectrum, fromRad } = system(REAL);
    // 2020-06-08 03:50, .18 Hz: alpha1 196, r1 .78, alpha2 208, r2 .42.
    const i = spectrum.frequencyHz.indexOf(0.18);
    const off = (degrees: number): number => fromRad - (degrees * Math.PI) / 180;
    expect(spectrum.cos1[i]).toBeCloseTo(0.78 * Math.cos(off(196)), 12);
    expect(spectrum.sin1[i]).toBeCloseTo(0.78 * Math.sin(off(196)), 12);
    expect(spectrum.cos2[i]).toBeCloseTo(0.42 * Math.cos(2 * off(208)), 12);
    expect(spectrum.sin2[i]).toBeCloseTo(0.42 * Math.sin(2 * off(208)), 12);
  });

  test('old files of two digits without minutes, in bands of their own', () => {
    const density = 'YY MM DD hh .03 .04 .05 .06\n91 02 03 04 0.0 1.0 2.0 0.5\n91 02 03 05 0.0 1.0 2.0 0.5\n';
    const { spectrum, source } = system({ density }, 'time: 1991-02-03T05:00Z, from: 270');
    expect(source).toBe('density.txt, record of 1991-02-03 05:00 UTC');
    expect(spectrum.frequencyHz).toEqual([0.03, 0.04, 0.05, 0.06]);
    expect(spectrum.significantHeightM).toBeCloseTo(4 * Math.sqrt(0.035), 12);
  });

  test('density alone takes the direction that is stated', () => {
    const { fromRad, spectrum } = system({ density: REAL.density }, 'time: 2020-06-08T03:50Z, from: 120 deg');
    expect(fromRad).toBeCloseTo((120 * Math.PI) / 180, 12);
    expect(spectrum.cos1[10]).toBeCloseTo(1 - 0.5 * (Math.PI / 6) ** 2, 12);
  });

  test('one record needs no time', () => {
    const only = (text = ''): string => text.split('\n').slice(0, 2).join('\n');
    const texts = Object.fromEntries(Object.entries(REAL).map(([key, text]) => [key, only(text)]));
    expect(system(texts, 'scaleTo: 2').source).toContain('record of 2020-06-08 03:50 UTC');
  });
});

describe('times', () => {
  test.each([
    ['scaleTo: 2', /from 2020-06-07 04:50 UTC to 2020-06-08 03:50 UTC, that of the 24 records/, 'nothing'],
    ['time: 2020-06-08T03:51Z', /from 2020-06-07/, '2020-06-08 03:51 UTC'],
    ['time: 2020-06-07T04:49Z', /from 2020-06-07/, '2020-06-07 04:49 UTC'],
    ['time: 2020-06-31T04:49Z', /a moment of the calendar/, '`2020-06-31T04:49Z`'],
  ])('%s is refused in the sea file', (keys, expected, found) => {
    const problem = refusal(REAL, keys);
    expect(problem).toMatchObject({ source: 'test.yaml', line: 4, path: 'systems[0].time', found });
    expect(problem.expected).toMatch(expected);
  });

  test('records too far apart are not blended', () => {
    const gap = (text = ''): string =>
      text
        .split('\n')
        .filter((line) => !/2020 06 0[78] (?:2[0-3]|00) 50/.test(line))
        .join('\n');
    const texts = Object.fromEntries(Object.entries(REAL).map(([key, text]) => [key, gap(text)]));
    const problem = refusal(texts, 'time: 2020-06-07T21:00Z');
    expect(problem).toMatchObject({ source: 'density.txt', line: 5 });
    expect(problem.expected).toMatch(/at most 3 h apart/);
    expect(problem.found).toMatch(/2020-06-07 19:50 UTC and 2020-06-08 01:50 UTC/);
  });
});

/** The real files with one text replaced in one of them, at the record of 03:50 (line 2) unless it is in the first line. */
function changed(key: keyof typeof BUOY_FILES, from: string | RegExp, to: string, base: Texts = REAL): Texts {
  const text = base[key] as string;
  const replaced = text.replace(from, to);
  if (replaced === text) throw new Error(`no ${from} in ${key}`);
  return { ...base, [key]: replaced };
}

describe('files that are not whole', () => {
  test.each([
    [
      'r1',
      '0.37 (0.063)',
      '999.00 (0.063)',
      2,
      /a r1 at 0\.063 Hz, where there is energy/,
      /a missing value/,
    ],
    ['density', '0.060 (0.063)', 'MM (0.063)', 2, /a spectral density C11 from 0/, /`MM`/],
    ['density', '0.060 (0.063)', '999.00 (0.063)', 2, /a spectral density at 0\.063 Hz/, /missing/],
    ['density', '0.060 (0.063)', '-0.060 (0.063)', 2, /from 0 to 10000/, /`-0\.060`/],
    ['direction1', '36.0 (0.063)', '361 (0.063)', 2, /alpha1 from 0 to 360/, /`361`/],
    ['r2', '0.50 (0.063)', '1.50 (0.063)', 2, /r2 from 0 to 1,/, /`1\.50`/],
    ['r1', '0.37 (0.063)', '0.37 0.063', 2, /a \(frequency\) after each value/, /`0\.063`/],
    ['r1', '0.37 (0.063)', '0.37', 2, /in pairs/, /words/],
    ['r1', / 999\.00 \(0\.485\) \n/, '\n', 2, /the 46 frequencies of density\.txt/, /45/],
    ['r1', '0.37 (0.063)', '0.37 (0.064)', 2, /the 46 frequencies of density\.txt/, /46 others/],
    ['density', '(0.063)', '(0.057)', 2, /ascending order/, /another order/],
    [
      'r1',
      '2020 06 08 03 50',
      '2020 06 08 03 40',
      1,
      /a record of 2020-06-08 03:50 UTC, as in density/,
      /none/,
    ],
    ['r1', '2020 06 08 02 50', '2020 06 08 03 50', 3, /each time once/, /03:50 UTC again/],
    ['r1', '2020 06 08 02 50', '2020 06 31 02 50', 3, /a time of 5 numbers/, /2020 06 31/],
    ['r1', '2020 06 08 02 50', '2020 06', 3, /a time of 5 numbers/, /2020 06/],
    ['r1', '#YY', 'x', 1, /first line of an NDBC/, /x {2}MM/],
    ['r1', /[\s\S]*/, '', 1, /first line of an NDBC/, /an empty file/],
    ['r1', /\n[\s\S]*/, '\n', 1, /records below/, /none/],
    ['r1', 'r1_1', 'r2_1', 1, /columns r1_1/, /columns of r2/],
    ['direction2', /[\s\S]*/, '#YY  MM DD hh mm WVHT  SwH\n', 1, /columns alpha2_1/, /WVHT SwH/],
  ] as const)('%s with %s for %s', (key, from, to, line, expected, found) => {
    const problem = refusal(changed(key, from, to));
    expect(problem).toMatchObject({ source: `${key}.txt`, line });
    expect(problem.expected).toMatch(expected);
    expect(problem.found).toMatch(found);
  });

  test.each([
    ['density', / 0 *\n/, '\n', /46 values, one for each frequency/, /45/],
    ['r1', ' 37 ', ' 137 ', /r1 from 0 to 100,/, /`137`/],
  ] as const)('history: %s with %s for %s', (key, from, to, expected, found) => {
    const last = (HISTORY[key] as string).trimEnd().split('\n');
    const row = `${last.at(-1)}\n`;
    const texts = { ...HISTORY, [key]: [...last.slice(0, -1), row.replace(from, to)].join('\n') };
    const problem = refusal(texts);
    expect(problem).toMatchObject({ source: `${key}.txt`, line: 25 });
    expect(problem.expected).toMatch(expected);
    expect(problem.found).toMatch(found);
  });

  test('a record of flat water', () => {
    const flat = '#YY MM DD hh mm .03 .04 .05\n2020 01 01 00 00 0.0 0.0 0.0\n';
    expect(refusal({ density: flat }, 'from: 0')).toMatchObject({
      source: 'density.txt',
      line: 2,
      found: 'none at any',
    });
  });

  test('some of the direction files without the others', () => {
    const { density, r1 } = REAL;
    const problem = refusal({ density, r1 }, 'time: 2020-06-08T03:50Z');
    expect(problem).toMatchObject({ source: 'test.yaml', path: 'systems[0].ndbc.direction1' });
    expect(problem.found).toBe('no direction1, direction2, r2');
  });
});
