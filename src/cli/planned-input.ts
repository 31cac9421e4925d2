import {
  type EngineName,
  isPlanText,
  PLAN_DEFAULTS,
  type Plan,
  type PlannedBake,
  parsePlan,
  parseSea,
  planBake,
  plannedBakeOf,
  seaText,
  UsageError,
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
 * @param engine the engine asked for, if one was
 * @throws InputError, ReadWriteError; UsageError where a saved plan has another engine
 */
export function plannedInput(
  io: ProgramIo,
  pathOrPreset: string,
  engine: EngineName | undefined,
): PlannedInput {
  const { name, source, text, readFile } = seaText(pathOrPreset);
  const isWatched = isTerminal(io.stderr, io.env);
  if (isWatched) io.stderr.write(`planning ${name} ...`);
  try {
    const planned = isPlanText(text)
      ? plannedBakeOf(planWithEngine(parsePlan(text, source), engine, source), source)
      : planBake(parseSea(text, { source, readFile }), { engine: engine ?? PLAN_DEFAULTS.engine });
    return { name, planned };
  } finally {
    if (isWatched) io.stderr.write(CLEARED_LINE);
  }
}

/** Back to the first column and everything behind it erased (ECMA-48: CR, EL). */
const CLEARED_LINE = '\r\u001b[K';

function planWithEngine(plan: Plan, engine: EngineName | undefined, source: string): Plan {
  if (engine === undefined || engine === plan.engine) return plan;
  throw new UsageError(
    `${source} was planned for the ${plan.engine} engine: plan the sea again with --engine ${engine}.`,
  );
}
