import { describe, expect, test } from 'vitest';
import { yamlDocument } from '../../../src/sea/yaml-document.ts';
import { placesOf, problemsOf, SOUND } from './problems.ts';

describe('texts that are not to be trusted', () => {
  test('an alias bomb', () => {
    const level = (name: string, of: string): string =>
      `${name}: &${name} [${Array(9).fill(`*${of}`).join(', ')}]\n`;
    const bomb = `a: &a [x, x, x, x, x, x, x, x, x]\n${'bcdefghi'.replace(/./g, (c) => level(c, String.fromCharCode(c.charCodeAt(0) - 1)))}`;
    const [problem, ...rest] = problemsOf(SOUND + bomb);
    expect(rest).toEqual([]);
    expect(problem.expected).toContain('at most 50 aliases');
  });

  test.each(['*nowhere', '&a [*a]', '&a { b: *a }'])('an alias that leads nowhere: %s', (text) => {
    expect(problemsOf(`${SOUND}water: ${text}`).length).toBeGreaterThan(0);
  });

  test.each(['__proto__', 'constructor', 'prototype'])('the key %s', (key) => {
    expect(placesOf(`${SOUND}water: { ${key}: { polluted: true } }`)).toEqual([`4:10 water.${key}`]);
    expect(placesOf(`${SOUND}"${key}": 1`)).toEqual([`4:1 ${key}`]);
    // Refused in the text itself, before any object is made of it.
    expect(yamlDocument(`a: { ${key}: 1 }`)).toMatchObject({
      value: undefined,
      problems: [{ path: `a.${key}` }],
    });
    expect(({} as Record<string, unknown>).polluted).toBeUndefined();
  });

  test('a key twice', () => {
    const [problem] = problemsOf(`${SOUND}seed: 1\nseed: 2\n`);
    expect(problem).toMatchObject({ path: 'seed', line: 5, column: 1, found: '`seed` again' });
  });

  test.each([
    ['? [a, b]\n: 1', '4:3 '],
    ['1: 2', '4:1 '],
    [': 2', '4:1 '],
  ])('a key that is no text: %s', (text, place) => {
    expect(placesOf(SOUND + text)).toEqual([place]);
  });

  test.each([
    ['seed: [1', /fault in the text/],
    ['\tseed: 1', /fault in the text/],
    ['seed: "open', /fault in the text/],
    ['seed: !!js/function x', /fault in the text/],
    ['seed: !!binary aGk=', /fault in the text/],
    ['---\nsecond: 1', /fault in the text/],
    ['%', /fault in the text/],
  ])('%s', (text, found) => {
    const problems = problemsOf(SOUND + text);
    expect(problems[0].found).toMatch(found);
    expect(problems[0].line).toBeGreaterThanOrEqual(4);
  });

  test('another version of YAML', () => {
    expect(problemsOf(`%YAML 1.1\n---\n${SOUND}`)[0].found).toBe('YAML 1.1');
    expect(problemsOf(`%YAML 1.2\n---\n${SOUND}`)).toEqual([]);
  });

  test('nesting', () => {
    expect(problemsOf(`${SOUND}water: ${'['.repeat(20)}${']'.repeat(20)}`)[0].expected).toContain(
      '16 levels',
    );
    expect(problemsOf(`${SOUND}water: ${'['.repeat(20000)}`).length).toBeGreaterThan(0);
  });

  test('size', () => {
    const comment = `# ${'x'.repeat(1 << 20)}`;
    expect(problemsOf(SOUND + comment)[0]).toMatchObject({ expected: 'a file of at most 1 MiB', line: 1 });
    // Within the limit a hundred thousand keys must not take quadratic time (the test's own limit is a minute).
    const keys = Array.from({ length: 100000 }, (_, i) => `k${i}:`).join('\n');
    expect(problemsOf(keys)).toHaveLength(51);
  });

  test('control characters of a file do not reach the terminal', () => {
    const [problem] = problemsOf(`${SOUND}"a\\u001b[31mb": 1`);
    expect(problem.path).toBe('a [31mb');
    expect(problem.found).toBe('the key `a [31mb`');
  });

  test('an empty file', () => {
    expect(problemsOf('')).toMatchObject([{ line: 1, column: 1, found: 'an empty value' }]);
    expect(problemsOf('# nothing\n')).toMatchObject([{ found: 'an empty value' }]);
  });
});

describe('places', () => {
  const document = yamlDocument('a:\n  b: [1, { c: 2 }]\n  d:\n');
  test.each([
    [['a'], false, 2, 3],
    [['a'], true, 1, 1],
    [['a', 'b'], false, 2, 6],
    [['a', 'b', 1, 'c'], false, 2, 15],
    [['a', 'b', 1, 'c'], true, 2, 12],
    // An empty value is shown at its key, a missing one at the group around it.
    [['a', 'd'], false, 3, 3],
    [['a', 'e'], false, 2, 3],
    [['a', 'b', 7], false, 2, 6],
    [[], false, 1, 1],
  ])('%j (key: %s) is at %i:%i', (path, atKey, line, column) => {
    expect(document.place(path, atKey)).toEqual({ line, column });
  });
});
