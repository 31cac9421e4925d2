import type { CheckResult } from './report.ts';

/** What a check says of one question: a row of the report without the names that its place gives it. */
export interface Verdict extends Omit<CheckResult, 'name' | 'question' | 'cascade'> {
  /** Where a check asks more than one question; else the check's own. */
  readonly question?: string;
}

/** What a limit is and why. */
export interface Limit {
  readonly limit: number;
  readonly unit: string;
  readonly reason: string;
}

/** The verdict on a figure: passed while it is not above its limit. A figure that is no number fails. */
export function verdict(measured: number, limit: Limit, details: readonly string[] = []): Verdict {
  const finite = Number.isFinite(measured);
  return {
    measured: finite ? measured : null,
    unit: limit.unit,
    limit: limit.limit,
    reason: limit.reason,
    passed: finite && measured <= limit.limit,
    details,
  };
}

/** The verdict of a check that cannot be made here: neither passed nor failed. */
export function notApplicable(reason: string): Verdict {
  return { measured: null, unit: '', limit: null, reason, passed: null, details: [] };
}

/** Why flat water says nothing about waves. */
export const FLAT = 'the water is flat';

/** The same verdict as the answer to a question of its own. */
export function answering(question: string, answer: Verdict): Verdict {
  return { ...answer, question };
}

/** The first few of many sentences, and how many there are besides. */
export function firstOf(sentences: readonly string[], most = 8): readonly string[] {
  if (sentences.length <= most) return sentences;
  return [...sentences.slice(0, most), `and ${sentences.length - most} more`];
}
