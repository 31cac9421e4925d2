import {
  isPlanText,
  type PlannedBake,
  parsePlan,
  parseSea,
  planBake,
  plannedBakeOf,
  seaText,
} from '../index.ts';
import { isTerminal, type ProgramIo } from './io.ts';

/** What a command was given to work on: a preset, a sea file or a saved plan. */
export interface PlannedInput {
  /** Names the bake's folder where none is given. */
  readonly name: string;
  readonly planned: PlannedBake;
}

/**
 * Reads what the user named and plans it. A large sea takes seconds: a terminal says so meanwhile.
 *
 * @throws InputError, ReadWriteError
 */
export function plannedInput(io: ProgramIo, pathOrPreset: string): PlannedInput {
  const { name, source, text } = seaText(pathOrPreset);
  const isWatched = isTerminal(io.stderr, io.env);
  if (isWatched) io.stderr.write(`planning ${name} ...`);
  try {
    const planned = isPlanText(text)
      ? plannedBakeOf(parsePlan(text, source), source)
      : planBake(parseSea(text, { source }));
    return { name, planned };
  } finally {
    if (isWatched) io.stderr.write(CLEARED_LINE);
  }
}

/** Back to the first column and everything behind it erased (ECMA-48: CR, EL). */
const CLEARED_LINE = '\r\u001b[K';
