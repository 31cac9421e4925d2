import type { Plan } from '../plan/plan.ts';
import type { JournalContents } from '../store/journal.ts';
import { type FrameEntry, isOfPlan, type JournalLine, type LevelEntry } from './journal-entry.ts';

/** What journals tell of one plan's bake. */
export interface Told {
  readonly frames: readonly FrameEntry[];
  readonly levels: readonly LevelEntry[];
  /** Sentences about what could not be used. */
  readonly notices: readonly string[];
}

/**
 * Sifts what journals tell. A line that is damaged, of another plan, or of no frame of this one is left out, and what
 * it told of is made again: a journal can cost work but not spoil a bake.
 */
export function toldOf(plan: Plan, journals: readonly JournalContents<JournalLine>[]): Told {
  const frames: FrameEntry[] = [];
  const levels: LevelEntry[] = [];
  const notices: string[] = [];
  for (const { path, entries, damagedLines } of journals) {
    let unusable = damagedLines;
    for (const line of entries) {
      if (line.kind === 'begin' || line.kind === 'end') continue;
      if (line.plan !== plan.hash) unusable++;
      else if (line.kind === 'level' && plan.cascades.at(line.cascade)?.foam != null) levels.push(line);
      else if (line.kind !== 'level' && isOfPlan(plan, line)) frames.push(line);
      else unusable++;
    }
    if (unusable > 0) {
      const lines = unusable === 1 ? '1 line' : `${unusable} lines`;
      notices.push(`${lines} of the journal ${path} cannot be used; what they told of is made again.`);
    }
  }
  return { frames, levels, notices };
}
