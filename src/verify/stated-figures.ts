import { firstOf, type Verdict, verdict } from './verdict.ts';

/** A figure of the manifest and what it should be. */
export interface StatedFigure {
  readonly what: string;
  readonly stated: number | null;
  /** Found anew; null where there should be no figure. */
  readonly found: number | null;
  /** What a difference is compared with; the figure itself where it is not said. */
  readonly size?: number;
}

/** A figure as the manifest states it and as it was found. */
export function figure(
  what: string,
  stated: number | null,
  found: number | null,
  size?: number,
): StatedFigure {
  return { what, stated, found, ...(size === undefined ? {} : { size }) };
}

/** The same numbers, added up in another order or by another runtime. */
const LIMIT = {
  limit: 1e-9,
  unit: 'relative',
  reason: 'the same numbers, but for the order in which they are added up',
} as const;

/** The verdict on some figures: the largest relative difference, and every one that is wrong. */
export function figuresVerdict(figures: readonly StatedFigure[]): Verdict {
  const differences = figures.map(difference);
  const wrong = figures
    .filter((_, f) => !(differences[f] <= LIMIT.limit))
    .map(({ what, stated, found }) => `${what} is ${found ?? 'no number'}, stated ${stated ?? 'no number'}`);
  return verdict(Math.max(0, ...differences), LIMIT, firstOf(wrong));
}

function difference({ stated, found, size }: StatedFigure): number {
  if (stated === found) return 0;
  if (stated === null || found === null) return Infinity;
  return Math.abs(stated - found) / Math.max(Math.abs(size ?? found), Number.MIN_VALUE);
}
