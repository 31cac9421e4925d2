import { describe, expect, it } from 'vitest';
import { formWords } from '../../../src/cli/plan-report-sea.ts';
import {
  bearing,
  byteSize,
  counted,
  degrees,
  duration,
  percent,
  rounded,
  wrapped,
} from '../../../src/cli/wording.ts';

const RAD = Math.PI / 180;

describe('numbers in words', () => {
  it.each([
    [66.234, 3, '66.2'],
    [1241, 3, '1240'],
    [1241, 6, '1241'],
    [0.5, 3, '0.5'],
    [14.000000000000002, 3, '14'],
    [0, 3, '0'],
  ])('%d to %d digits', (value, digits, text) => {
    expect(rounded(value, digits)).toBe(text);
  });

  it.each([
    [0, '0 %'],
    [5e-220, '0 %'],
    [0.00005, '<0.01 %'],
    [-0.00005, '<0.01 %'],
    [0.0123, '1.2 %'],
    [-0.0123, '-1.2 %'],
    [0.43, '43 %'],
    [0.98765, '98.8 %'],
    [1, '100 %'],
  ])('a share of %d', (share, text) => {
    expect(percent(share)).toBe(text);
  });

  it.each([
    [0, '0 deg'],
    [359.96, '0 deg'],
    [249.99999999999997, '250 deg'],
    [-90, '270 deg'],
    [420, '60 deg'],
    [12.34, '12.3 deg'],
  ])('a bearing of %d deg', (angle, text) => {
    expect(bearing(angle * RAD)).toBe(text);
  });

  it('keeps the sign of an angle', () => {
    expect(degrees(-5.04 * RAD)).toBe('-5 deg');
  });

  it.each([
    [0, '0 bytes'],
    [999, '999 bytes'],
    [1000, '1 kB'],
    [999_600, '1 MB'],
    [117_021_082, '117 MB'],
    [2_041_451_643, '2.04 GB'],
  ])('%d bytes', (bytes, text) => {
    expect(byteSize(bytes)).toBe(text);
  });

  it.each([
    [0.44, '0.4 s'],
    [9.96, '10 s'],
    [59.6, '1 min 00 s'],
    [200, '3 min 20 s'],
    [3599.6, '1 h 00 min'],
    [3900, '1 h 05 min'],
  ])('a duration of %d s', (time, text) => {
    expect(duration(time)).toBe(text);
  });

  it('counts', () => {
    expect([0, 1, 2].map((n) => counted(n, 'frame'))).toEqual(['0 frames', '1 frame', '2 frames']);
  });
});

describe('wrapped', () => {
  it('breaks between words, and never between a number and its unit', () => {
    expect(wrapped('a patch of 66.2 m and 256 texels', 15)).toEqual([
      'a patch of',
      '66.2 m and',
      '256 texels',
    ]);
  });

  it('leaves a word that is too long on a line of its own, and an empty text empty', () => {
    expect(wrapped('hash 0123456789abcdef!', 10)).toEqual(['hash', '0123456789abcdef!']);
    expect(wrapped('', 10)).toEqual(['']);
  });
});

describe('formWords', () => {
  it('tells lists by their length and range, and every unit there is', () => {
    const table = { form: 'tabulated', frequencyHz: [0.03, 0.1, 0.2], densityM2PerHz: [0, 4.25, 1] };
    expect(formWords(table as { form: string })).toBe(
      'tabulated, frequency 3 values of 0.03 to 0.2 Hz, density 3 values of 0 to 4.25 m2/Hz',
    );
    const narrow = { form: 'wrapped-normal', standardDeviationRad: 0.4, gravityMps2: 9.81 };
    expect(formWords(narrow as { form: string })).toBe(
      'wrapped-normal, standard deviation 0.4 rad, gravity 9.81 m/s2',
    );
  });

  it('reads units off the suffixes of whatever parameters a form has', () => {
    const parameters = {
      form: 'new-form',
      omegaPeakRadPerS: 2,
      significantHeightM: 1.5,
      s: 25,
      alpha: 0.0081,
    };
    expect(formWords(parameters)).toBe(
      'new-form, omega peak 2 rad/s, significant height 1.5 m, s 25, alpha 0.0081',
    );
    expect(formWords({ form: 'old', windSpeed19p5Mps: 8.2 } as { form: string })).toBe(
      'old, wind speed at 19.5 m 8.2 m/s',
    );
  });
});
