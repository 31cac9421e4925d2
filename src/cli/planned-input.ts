import {
  isPlanText,
  type PlannedBake,
  parsePlan,
  parseSea,
  planBake,
  plannedBakeOf,
  seaText,
} from '../index.ts';

/** What a command was given to work on: a preset, a sea file or a saved plan. */
export interface PlannedInput {
  /** Names the bake's folder where none is given. */
  readonly name: string;
  readonly planned: PlannedBake;
}

/**
 * Reads what the user named and plans it.
 *
 * @throws InputError, ReadWriteError
 */
export function plannedInput(pathOrPreset: string): PlannedInput {
  const { name, source, text } = seaText(pathOrPreset);
  const planned = isPlanText(text)
    ? plannedBakeOf(parsePlan(text, source), source)
    : planBake(parseSea(text, { source }));
  return { name, planned };
}
