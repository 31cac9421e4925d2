import type { BakeStage } from '../index.ts';
import { duration, rounded } from './wording.ts';

/** What a progress display can be about. */
export type ShownStage = BakeStage | 'verify';

export const STAGE_WORDS: Readonly<Record<ShownStage, string>> = {
  check: 'checked',
  survey: 'ranges',
  frames: 'frames',
  'foam-level': 'foam level',
  foam: 'foam',
  verify: 'verified',
};

/** A moment of a stage: when, and how much was done. */
export interface Mark {
  readonly timeS: number;
  readonly done: number;
}

/** How fast a stage goes; null before anything can be told. */
export interface Pace {
  readonly perSecond: number;
  readonly secondsLeft: number;
}

/** Measures a stage from its first mark on: what an earlier run had done does not count. */
export function paceOf(first: Mark): (now: Mark, total: number) => Pace | null {
  return (now, total) => {
    const made = now.done - first.done;
    const spent = now.timeS - first.timeS;
    if (made <= 0 || spent <= 0) return null;
    const perSecond = made / spent;
    return { perSecond, secondsLeft: Math.max(0, total - now.done) / perSecond };
  };
}

/** `, 12.3/s, 8 s left`; empty where nothing is known yet. */
export function paceWords(pace: Pace | null): string {
  return pace === null ? '' : `, ${rounded(pace.perSecond)}/s, ${duration(pace.secondsLeft)} left`;
}
