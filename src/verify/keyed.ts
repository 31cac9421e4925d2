import { key32, uniform } from '../math/random.ts';

/**
 * Different whole numbers of 0 .. count-1 in ascending order, that look random and follow from a name: what is looked at
 * more closely cannot be known by whoever tampers with one file, and is the same in every run.
 */
export function keyedIndices(wanted: number, count: number, name: string): readonly number[] {
  const chosen = new Set<number>();
  const key: [number, number] = [key32(name), key32('verify')];
  for (let draw = 0; chosen.size < Math.min(wanted, count); draw++) {
    chosen.add(Math.floor(uniform([draw, 0, 0, 0], key) * count));
  }
  return [...chosen].sort((a, b) => a - b);
}
