import type { BakeFacts } from './bake-facts.ts';
import type { CascadeFacts } from './cascade-facts.ts';
import type { SeenFrame } from './frame-reader.ts';
import type { MeasuredWaves } from './measured-waves.ts';
import type { Verdict } from './verdict.ts';

/**
 * One check of a finished bake.
 *
 * To add one, write one file in `checks/` that exports a `Check` and add it to `CHECKS` in registry.ts. Nothing a check
 * uses may come from the code that made the frames (bake, maps, field); a test in test/architecture holds that.
 */
export interface Check {
  readonly name: string;
  /** What the check asks, as a sentence. */
  readonly question: string;
  /** Whether it is one of the quick checks, which see a few frames only. */
  readonly quick: boolean;
  readonly begin: (bake: BakeFacts) => Inspection;
}

/** A check at work on one bake. */
interface Inspection {
  /** Takes up a cascade; cascades come one after another. */
  readonly cascade: (facts: CascadeFacts) => CascadeInspection;
  /** Verdicts on the bake as a whole, after all cascades. */
  readonly whole?: () => readonly Verdict[];
}

/** A check at work on one cascade. */
export interface CascadeInspection {
  /** Sees every frame once, in order. What a frame lends is valid until the next one. */
  readonly frame?: (frame: SeenFrame) => void;
  /** After that sees a few keyed frames again, now that the whole loop is known. */
  readonly keyedFrame?: (frame: SeenFrame, loop: SeenLoop) => void;
  readonly verdicts: (loop: SeenLoop) => readonly Verdict[];
}

/** What the first pass over a cascade found. */
export interface SeenLoop {
  /** Whether any file of the cascade could be used. */
  readonly readable: boolean;
  /** The waves as the height frames show them; null where frames or the height itself are missing. */
  readonly waves: MeasuredWaves | null;
  /** Why there are none. */
  readonly withoutWaves: string;
}
