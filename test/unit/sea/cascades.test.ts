import { describe, expect, test } from 'vitest';
import { parseSea } from '../../../src/sea/parse.ts';
import { seaWarnings } from '../../../src/sea/warnings.ts';
import { problemsOf, SOUND } from './problems.ts';

const AUTO = {
  plan: 'auto',
  count: 3,
  resolution: 256,
  shortestWavelengthM: 0.25,
  longestPatchM: null,
  headRoom: 0.5,
  loops: [],
};

test('planned cascades and their defaults', () => {
  expect(parseSea(SOUND).cascades).toEqual(AUTO);
  expect(parseSea(`${SOUND}cascades: auto`).cascades).toEqual(AUTO);
  const keys = '{ count: 2, resolution: 512, shortestWavelength: 5 cm, longestPatch: 1 km, headRoom: 70 % }';
  expect(parseSea(`${SOUND}cascades: ${keys}`).cascades).toEqual({
    ...AUTO,
    count: 2,
    resolution: 512,
    shortestWavelengthM: 0.05,
    longestPatchM: 1000,
    headRoom: 0.7,
  });
});

test('listed cascades and their defaults', () => {
  const text = `${SOUND}cascades:\n  - patch: 250\n  - { patch: 31, resolution: 128, band: { longest: 8, shortest: 1 } }`;
  const common = { loop: null };
  expect(parseSea(text).cascades).toEqual({
    plan: 'list',
    headRoom: 0.5,
    list: [
      { ...common, patchLengthM: 250, resolution: 256, longestWavelengthM: null, shortestWavelengthM: null },
      { ...common, patchLengthM: 31, resolution: 128, longestWavelengthM: 8, shortestWavelengthM: 1 },
    ],
  });
});

describe('cascades that cannot be', () => {
  test.each([
    ['{ resolution: 200 }', '.resolution', /power of two from 16 to 8192/, /256/],
    ['{ resolution: 8 }', '.resolution', /power of two/, /Take 16/],
    ['{ resolution: 16384 }', '.resolution', /power of two/, /8192/],
    ['{ resolution: 0 }', '.resolution', /whole number from 1/, /fraction/],
    ['{ count: 0 }', '.count', /from 1 to 8/, /Write/],
    ['{ headRoom: 0.9 }', '.headRoom', /from 0.1 to 0.85/, /0.5/],
    [
      '{ longestPatch: 10, shortestWavelength: 10 }',
      '.shortestWavelength',
      /shorter than the longest patch/,
      /lengthen/,
    ],
    ['{ count: 1, loops: [whole, whole] }', '.loops', /at most 1 loops/, /raise count/],
    ['{ loops: [hole] }', '.loops[0]', /`whole` or a loop/, /Did you mean `whole`/],
    ['{ cuont: 1 }', '.cuont', /one of the keys count/, /Did you mean `count`/],
    ['manual', '', /`auto`, a group of keys/, /cascades: auto/],
    ['[]', '', /list of 1 to 8/, /line of its own/],
    ['[{ resolution: 64 }]', '[0].patch', /length from 0.05 to 100000 m/, /Add `patch`/],
    ['[{ patch: 50, resolution: 48 }]', '[0].resolution', /power of two/, /64/],
    ['[{ patch: 50 }, { patch: 50 }]', '[1].patch', /shorter than the 50 m/, /longest patch to the shortest/],
    ['[{ patch: 5 }, { patch: 50 }]', '[1].patch', /shorter than the 5 m/, /longest patch to the shortest/],
    ['[{ patch: 50, band: { longest: 60 } }]', '[0].band.longest', /at most 50 m/, /tile cannot hold/],
    [
      '[{ patch: 50, band: { longest: 9, shortest: 9 } }]',
      '[0].band.shortest',
      /shorter than the longest/,
      /Exchange/,
    ],
    // Two texels of 50 m / 256 are 0.39 m.
    [
      '[{ patch: 50, band: { shortest: 0.39 } }]',
      '[0].band.shortest',
      /at least 0.391 m, two texels/,
      /0.781 m/,
    ],
    [
      '[{ patch: 50, band: { longest: 0.5 } }]',
      '[0].band.longest',
      /longer than 0.781 m/,
      /raise the resolution/,
    ],
  ])('%s', (text, path, expected, remedy) => {
    const problems = problemsOf(`${SOUND}cascades: ${text}\n`);
    expect(problems.map((problem) => problem.path)).toEqual([`cascades${path}`]);
    expect(problems[0].line).toBe(4);
    expect(problems[0].expected).toMatch(expected);
    expect(problems[0].remedy).toMatch(remedy);
  });
});

test('a band above 0.85 of the Nyquist wavenumber is a warning', () => {
  const sea = (shortest: number): string =>
    `${SOUND}cascades: [{ patch: 64, resolution: 64, band: { shortest: ${shortest} } }]`;
  // Texels of 1 m: 2 / 0.85 = 2.353 m.
  expect(seaWarnings(parseSea(sea(2.36)))).toEqual([]);
  expect(seaWarnings(parseSea(sea(2.35)))).toEqual([
    expect.stringMatching(/^c0: .* 2\.35 texels .* 4 m would span four/),
  ]);
});
