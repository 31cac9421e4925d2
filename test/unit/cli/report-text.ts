import { planReport } from '../../../src/cli/plan-report.ts';
import type { Plan } from '../../../src/index.ts';

export const THREADS = 4;

/** The text under a heading, on one line. */
export function section(plan: Plan, heading: string): string {
  const parts = planReport(plan, { threads: THREADS }).split(/\n\n(?=\S)/);
  const part = parts.find((text) => text.startsWith(`${heading}\n`));
  if (part === undefined) throw new Error(`no section ${heading}`);
  return part.replaceAll(/\s+/g, ' ');
}

/** The table row or field that begins with a word, cut where the next begins. */
export function line(plan: Plan, heading: string, start: string): string {
  const parts = planReport(plan, { threads: THREADS }).split(/\n\n(?=\S)/);
  const part = parts.find((text) => text.startsWith(`${heading}\n`)) ?? '';
  const found = part.split('\n').find((text) => text.trimStart().startsWith(start));
  if (found === undefined) throw new Error(`no line ${start} under ${heading}`);
  return found;
}

export function numbersIn(text: string): number[] {
  return [...text.matchAll(/-?\d+(?:\.\d+)?(?:e-?\d+)?/g)].map(([number]) => Number(number));
}

/** The number that stands behind some words. */
export function numberAfter(text: string, words: string): number {
  const at = text.indexOf(words);
  if (at < 0) throw new Error(`"${words}" is not in: ${text}`);
  return numbersIn(text.slice(at + words.length))[0];
}
