import { describe, expect, test } from 'vitest';
import { parseSea } from '../../../src/sea/parse.ts';
import { MAP_NAMES } from '../../../src/sea/sea.ts';
import { problemsOf, SOUND } from './problems.ts';

const NATURAL = { policy: 'natural' };
const SIGMAS = { policy: 'sigmas', sigmas: 6 };
const SURVEY = { policy: 'survey' };

test('the default is displacement as half EXR, normal and foam as 8-bit PNG', () => {
  expect(parseSea(SOUND).maps).toEqual([
    { map: 'displacement', format: 'exr', sample: 'half', range: NATURAL, dither: false },
    { map: 'normal', format: 'png', sample: 'uint8', range: NATURAL, dither: true },
    { map: 'foam', format: 'png', sample: 'uint8', range: NATURAL, dither: false },
  ]);
});

describe('one map', () => {
  test.each([
    ['displacement: png', { sample: 'uint16', range: SIGMAS, dither: false }],
    ['displacement: { format: png, bits: 8 }', { sample: 'uint8', range: SURVEY, dither: true }],
    [
      'displacement: { format: png, bits: 8, dither: false }',
      { sample: 'uint8', range: SURVEY, dither: false },
    ],
    ['displacement: { format: png, range: 2.5 m }', { range: { policy: 'extent', extent: 2.5 } }],
    ['displacement: { format: png, range: 250 cm }', { range: { policy: 'extent', extent: 2.5 } }],
    ['displacement: { format: png, range: 2.5 }', { range: { policy: 'extent', extent: 2.5 } }],
    ['displacement: { format: png, range: 4.5 sigmas }', { range: { policy: 'sigmas', sigmas: 4.5 } }],
    ['displacement: { format: exr, sample: float }', { sample: 'float', range: NATURAL, dither: false }],
    ['height: png', { sample: 'uint16', range: SIGMAS }],
    ['velocity: { format: png, range: 10 kn }', { range: { policy: 'extent', extent: (10 * 1852) / 3600 } }],
    ['slope: { format: png, range: 0.8 }', { sample: 'uint16', range: { policy: 'extent', extent: 0.8 } }],
    ['jacobian: png', { sample: 'uint16', range: NATURAL }],
    ['jacobian: { format: png, range: survey }', { range: SURVEY }],
    [
      'normal: { format: png, bits: 16, range: natural }',
      { sample: 'uint16', range: NATURAL, dither: false },
    ],
    ['foam: { format: png, bits: 8, dither: true }', { sample: 'uint8', dither: true }],
  ])('%s', (text, map) => {
    const { maps } = parseSea(`${SOUND}maps: { ${text} }`);
    expect(maps).toHaveLength(1);
    expect(maps[0]).toMatchObject(map);
  });

  test('no map has 8 bits of what moves geometry unless they are asked for', () => {
    const text = MAP_NAMES.map((map) => `${map}: png`).join(', ');
    const eightBit = parseSea(`${SOUND}maps: { ${text} }`).maps.filter(({ sample }) => sample === 'uint8');
    expect(eightBit.map(({ map }) => map)).toEqual(['normal', 'foam']);
  });
});

test('maps come in one order whatever the file has', () => {
  const text = [...MAP_NAMES]
    .reverse()
    .map((map) => `${map}: exr`)
    .join(', ');
  expect(parseSea(`${SOUND}maps: { ${text} }`).maps.map(({ map }) => map)).toEqual(MAP_NAMES);
});

describe('maps that cannot be', () => {
  test.each([
    ['{}', '', /at least one of displacement/, /displacement: exr/],
    ['{ displacment: exr }', '.displacment', /one of the keys displacement/, /Did you mean `displacement`/],
    ['{ displacement: tiff }', '.displacement', /exr, png or a group/, /normal: png/],
    ['{ displacement: { bits: 8 } }', '.displacement.format', /one of exr, png/, /Add `format`/],
    ['{ displacement: { format: png, bits: 12 } }', '.displacement.bits', /8 or 16/, /bits: 16/],
    ['{ displacement: { format: png, bits: 32 } }', '.displacement.bits', /8 or 16/, /bits: 16/],
    [
      '{ displacement: { format: png, sample: half } }',
      '.displacement.sample',
      /no sample for png/,
      /Remove/,
    ],
    ['{ displacement: { format: exr, bits: 16 } }', '.displacement.bits', /no bits for exr/, /Remove/],
    ['{ displacement: { format: exr, range: survey } }', '.displacement.range', /no range for exr/, /Remove/],
    [
      '{ displacement: { format: exr, dither: true } }',
      '.displacement.dither',
      /no dithering for exr/,
      /Remove/,
    ],
    [
      '{ displacement: { format: png, dither: true } }',
      '.displacement.dither',
      /no dithering for 16 bits/,
      /Remove/,
    ],
    [
      '{ displacement: { format: png, range: natural } }',
      '.displacement.range',
      /2 to 20 sigmas/,
      /6 sigmas/,
    ],
    ['{ displacement: { format: png, range: 2 m/s } }', '.displacement.range', /with m, km, cm/, /6 sigmas/],
    ['{ displacement: { format: png, range: 0 } }', '.displacement.range', /largest magnitude/, /6 sigmas/],
    [
      '{ displacement: { format: png, range: 50 sigmas } }',
      '.displacement.range',
      /2 to 20 sigmas/,
      /6 sigmas/,
    ],
    [
      '{ displacement: { format: png, range: surwey } }',
      '.displacement.range',
      /survey/,
      /Did you mean `survey`/,
    ],
    ['{ normal: { format: png, range: survey } }', '.normal.range', /`natural`, the one range/, /remove it/],
  ])('%s', (text, path, expected, remedy) => {
    const problems = problemsOf(`${SOUND}maps: ${text}`);
    expect(problems.map((problem) => problem.path)).toEqual([`maps${path}`]);
    expect(problems[0].line).toBe(4);
    expect(problems[0].expected).toMatch(expected);
    expect(problems[0].remedy).toMatch(remedy);
  });
});
