import { describe, expect, test } from 'vitest';
import { editDistance, nearestOrPrefix, nearestWord } from '../../../src/sea/nearest.ts';

test.each([
  ['', '', 0],
  ['abc', '', 3],
  // The textbook pair of Levenshtein's distance.
  ['kitten', 'sitting', 3],
  ['peakPeroid', 'peakPeriod', 1],
  ['abcd', 'acbd', 1],
])('editDistance(%j, %j) = %i', (a, b, distance) => {
  expect(editDistance(a, b)).toBe(distance);
  expect(editDistance(b, a)).toBe(distance);
});

describe('nearestWord', () => {
  const keys = ['title', 'seed', 'water', 'windSpeed', 'fetch', 's'];

  test.each([
    ['tilte', 'title'],
    ['WATER', 'water'],
    ['windspeed', 'windSpeed'],
    ['fetsch', 'fetch'],
  ])('%s is near %s', (word, nearest) => {
    expect(nearestWord(word, keys)).toBe(nearest);
  });

  test.each(['colour', 'q', '', 'x'.repeat(100000)])('nothing is near %.10s', (word) => {
    expect(nearestWord(word, keys)).toBeNull();
  });
});

test('the beginning of one word counts as that word, of two as none', () => {
  expect(nearestOrPrefix('pierson', ['pierson-moskowitz', 'tma'])).toBe('pierson-moskowitz');
  expect(nearestOrPrefix('band', ['bandGainsOfOne', 'bandGainsOfTwo'])).toBeNull();
});
