import { expect, it } from 'vitest';
import { keyedIndices } from '../../../src/verify/keyed.ts';

it('gives different numbers in order, the same for the same name', () => {
  const chosen = keyedIndices(8, 192, 'a plan c0');
  expect(chosen).toEqual(keyedIndices(8, 192, 'a plan c0'));
  expect(chosen).not.toEqual(keyedIndices(8, 192, 'a plan c1'));
  expect(new Set(chosen).size).toBe(8);
  expect([...chosen].sort((a, b) => a - b)).toEqual(chosen);
  for (const index of chosen) expect(index >= 0 && index < 192 && Number.isInteger(index)).toBe(true);
});

it('gives all there are where that is fewer', () => {
  expect(keyedIndices(8, 3, 'x')).toEqual([0, 1, 2]);
  expect(keyedIndices(8, 0, 'x')).toEqual([]);
});
