import type { Loop } from './sea.ts';

/** Length of a loop, s: exactly frames * denominator / numerator, rounded once. */
export function loopSeconds({ frameCount, frameRate: [numerator, denominator] }: Loop): number {
  return (frameCount * denominator) / numerator;
}
