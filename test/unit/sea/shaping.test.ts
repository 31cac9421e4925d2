import { expect, test } from 'vitest';
import { parseSea } from '../../../src/sea/parse.ts';
import { problemsOf, SOUND } from './problems.ts';

test('defaults leave the sea as physics has it', () => {
  expect(parseSea(SOUND).shaping).toEqual({
    bandGains: [],
    againstWind: 1,
    horizontalScale: 1,
    matchHeight: true,
    amplitudes: 'gaussian',
  });
});

test('bands may touch', () => {
  const bands = '[{ longest: 20, shortest: 5, gain: 150 % }, { longest: 5, shortest: 1, gain: 0 }]';
  expect(parseSea(`${SOUND}shaping: { bandGains: ${bands} }`).shaping.bandGains).toEqual([
    { longestWavelengthM: 20, shortestWavelengthM: 5, gain: 1.5 },
    { longestWavelengthM: 5, shortestWavelengthM: 1, gain: 0 },
  ]);
});

test.each([
  [
    'bandGains: [{ longest: 20, shortest: 5, gain: 2 }, { longest: 9, shortest: 1, gain: 2 }]',
    '.bandGains[1]',
    /clear of bandGains\[0\] \(5 m to 20 m\)/,
  ],
  ['bandGains: [{ longest: 2, shortest: 5, gain: 2 }]', '.bandGains[0].shortest', /shorter than the longest/],
  ['bandGains: [{ longest: 9, shortest: 5, gain: -1 }]', '.bandGains[0].gain', /from 0 to 10/],
  ['bandGains: [{ longest: 9, shortest: 5 }]', '.bandGains[0].gain', /from 0 to 10/],
  ['againstWind: 1.1', '.againstWind', /from 0 to 1/],
  ['horizontalScale: -1', '.horizontalScale', /from 0 to 3/],
  ['matchHeight: "yes"', '.matchHeight', /true or false/],
  ['amplitudes: gausian', '.amplitudes', /one of gaussian, deterministic/],
])('%s', (text, path, expected) => {
  const problems = problemsOf(`${SOUND}shaping: { ${text} }`);
  expect(problems.map((problem) => problem.path)).toEqual([`shaping${path}`]);
  expect(problems[0].expected).toMatch(expected);
});
