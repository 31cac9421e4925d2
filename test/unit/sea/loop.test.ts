import { describe, expect, test } from 'vitest';
import { parseSea } from '../../../src/sea/parse.ts';
import type { ListedCascades } from '../../../src/sea/sea.ts';
import { placesOf, problemsOf, SOUND } from './problems.ts';

function loopOf(text: string): string {
  const { frameCount, frameRate, firstFrame, askedSeconds } = parseSea(`${SOUND}loop: ${text}\n`).loop;
  return `${frameCount} at ${frameRate.join('/')} from ${firstFrame}, asked ${askedSeconds}`;
}

describe('any two of seconds, frameRate and frames', () => {
  test.each([
    ['{ seconds: 8, frameRate: 24 }', '192 at 24/1 from 1, asked 8'],
    ['{ seconds: 8 s, frameRate: 24 fps, firstFrame: 1001 }', '192 at 24/1 from 1001, asked 8'],
    // 8 s holds 191.808 frames of this rate: the loop is 8.008 s.
    ['{ seconds: 8, frameRate: 24000/1001 }', '192 at 24000/1001 from 1, asked 8'],
    ['{ seconds: 8.008, frames: 192 }', '192 at 24000/1001 from 1, asked 8.008'],
    ['{ frames: 192, frameRate: 30 }', '192 at 30/1 from 1, asked null'],
    ['{ frames: 192, frameRate: 12.5 }', '192 at 25/2 from 1, asked null'],
    ['{ frames: 192, frameRate: 24.0 }', '192 at 24/1 from 1, asked null'],
    ['{ seconds: 8, frames: 192, frameRate: 24 }', '192 at 24/1 from 1, asked 8'],
    ['{ seconds: 8, frames: 192, frameRate: 24000 / 1001 }', '192 at 24000/1001 from 1, asked 8'],
    ['{ firstFrame: 0 }', '192 at 24/1 from 0, asked 8'],
    ['{}', '192 at 24/1 from 1, asked 8'],
    ['{ frames: 1, frameRate: 1 }', '1 at 1/1 from 1, asked null'],
  ])('%s', (text, loop) => {
    expect(loopOf(text)).toBe(loop);
  });

  test('a sea without a loop has 8 s at 24 frames a second', () => {
    expect(parseSea(SOUND).loop).toEqual(parseSea(`${SOUND}loop: { seconds: 8, frameRate: 24 }`).loop);
  });
});

describe('a loop that cannot be', () => {
  test.each([
    ['{ seconds: 8 }', 'loop', /two of seconds, frameRate and frames/, /frameRate/],
    ['{ frames: 0, frameRate: 24 }', 'loop.frames', /whole number from 1 to 100000/, /fraction or unit/],
    ['{ frames: 2.5, frameRate: 24 }', 'loop.frames', /whole number/, /fraction/],
    ['{ seconds: 0.01, frameRate: 24 }', 'loop', /1 to 100000 frames/, /Lengthen/],
    ['{ seconds: 3600, frameRate: 1000 }', 'loop', /1 to 100000 frames/, /Shorten/],
    ['{ seconds: 0, frameRate: 24 }', 'loop.seconds', /above 0/, /8 s/],
    ['{ seconds: -8, frameRate: 24 }', 'loop.seconds', /above 0/, /8 s/],
    ['{ seconds: 8, frameRate: 23.976 }', 'loop.frameRate', /exact/, /24000\/1001/],
    ['{ seconds: 8, frameRate: "23.98 fps" }', 'loop.frameRate', /exact/, /24000\/1001/],
    ['{ seconds: 8, frameRate: 29.97 }', 'loop.frameRate', /exact/, /30000\/1001/],
    ['{ seconds: 8, frameRate: 59.94 }', 'loop.frameRate', /exact/, /60000\/1001/],
    ['{ seconds: 8, frameRate: 0 }', 'loop.frameRate', /0.1 to 1000/, /24/],
    ['{ seconds: 8, frameRate: 24/0 }', 'loop.frameRate', /0.1 to 1000/, /24/],
    ['{ seconds: 8, frameRate: 5000/1 }', 'loop.frameRate', /0.1 to 1000/, /24/],
    ['{ seconds: 8, frameRate: fast }', 'loop.frameRate', /0.1 to 1000/, /24/],
    ['{ seconds: 8, frames: 190, frameRate: 24 }', 'loop.frames', /192 frames/, /Leave one/],
    ['{ seconds: 7.1234567, frames: 99991 }', 'loop', /0.1 to 1000/, /frameRate/],
    ['{ seconds: 3.00000000001, frames: 71 }', 'loop', /32-bit/, /frameRate/],
  ])('%s', (text, path, expected, remedy) => {
    const problems = problemsOf(`${SOUND}loop: ${text}\n`);
    expect(problems.map((problem) => problem.path)).toEqual([path]);
    expect(problems[0].line).toBe(4);
    expect(problems[0].expected).toMatch(expected);
    expect(problems[0].remedy).toMatch(remedy);
  });
});

describe('loops of single cascades', () => {
  const listed = (loop: string): string =>
    `${SOUND}loop: { seconds: 8, frameRate: 24 }\ncascades:\n  - { patch: 100, loop: ${loop} }\n`;

  test.each([
    // What is left out is as in the whole loop.
    ['{ seconds: 4 }', 96, [24, 1]],
    ['{ frames: 64 }', 64, [24, 1]],
    ['{ frameRate: 12 }', 96, [12, 1]],
    ['{ seconds: 4, frameRate: 12 }', 48, [12, 1]],
    ['{ seconds: 2, frames: 30 }', 30, [15, 1]],
  ])('%s', (text, frameCount, frameRate) => {
    const { cascades } = parseSea(listed(text));
    const [{ loop }] = (cascades as ListedCascades).list;
    expect(loop).toMatchObject({ frameCount, frameRate, firstFrame: 1 });
  });

  test('one that does not fit names the nearest that does', () => {
    const [problem] = problemsOf(listed('{ frames: 100 }'));
    expect(problem).toMatchObject({ path: 'cascades[0].loop', line: 6, column: 25 });
    expect(problem.expected).toContain('8 s');
    expect(problem.found).toContain('1.9200 times');
    expect(problem.remedy).toBe('Take 96 frames, which fit 2 times.');
  });

  test('one longer than the whole loop does not fit', () => {
    const [problem] = problemsOf(listed('{ seconds: 16 }'));
    expect(problem.remedy).toBe('Take 192 frames, which fit once.');
  });

  test('frames must be whole, and the whole loop is compared exactly', () => {
    const text = `${SOUND}loop: { frames: 192, frameRate: 24000/1001 }\ncascades:\n  - { patch: 100, loop: `;
    // 8.008 s holds 4.004 s twice, but 4 s not.
    expect(problemsOf(`${text}{ seconds: 4.004 } }`)).toEqual([]);
    expect(placesOf(`${text}{ seconds: 4, frames: 96 } }`)).toEqual(['6:25 cascades[0].loop']);
    expect(problemsOf(`${text}{ frameRate: 12 } }`)[0].found).toBe('96.096 frames');
  });

  test('planned cascades take loops by index, `whole` among them', () => {
    const { cascades } = parseSea(`${SOUND}cascades: { loops: [whole, { seconds: 4 }] }`);
    expect(cascades).toMatchObject({ plan: 'auto', loops: [null, { frameCount: 96 }] });
  });
});
