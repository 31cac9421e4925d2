import { InputError, type InputProblem } from '../errors.ts';
import { OUTPUT_VERSION, VERSION } from '../version.ts';
import { canonicalJson, reviveInfinity } from './canonical-json.ts';
import type { Plan } from './plan.ts';
import { planHash } from './plan-bake.ts';

/** A plan as the text of a file that `parsePlan` reads back to the same plan. */
export function planText(plan: Plan): string {
  return `${canonicalJson(plan, 2)}\n`;
}

/** Whether a text looks like a saved plan rather than a sea file. */
export function isPlanText(text: string): boolean {
  return /^\s*\{\s*"format"\s*:\s*"loopswell-plan"/.test(text);
}

/**
 * Reads a saved plan.
 *
 * @param source file name for messages
 * @throws InputError where it is no plan, was altered, or belongs to a version that writes other bytes
 */
export function parsePlan(text: string, source: string): Plan {
  const refuse = (problem: Omit<InputProblem, 'line' | 'column'>): InputError =>
    new InputError(source, [{ line: 0, column: 0, ...problem }]);
  let plan: Plan;
  try {
    plan = JSON.parse(text, reviveInfinity) as Plan;
  } catch (error) {
    throw refuse({
      path: '',
      expected: 'JSON of a saved plan',
      found: (error as Error).message,
      remedy: 'Save the plan again.',
    });
  }
  if (plan?.format !== 'loopswell-plan' || plan.version !== 1) {
    throw refuse({
      path: 'format',
      expected: 'loopswell-plan version 1',
      found: `${plan?.format} version ${plan?.version}`,
      remedy: 'Give a file that `plan --save` wrote.',
    });
  }
  if (plan.generator?.outputVersion !== OUTPUT_VERSION) {
    throw refuse({
      path: 'generator.outputVersion',
      expected: `${OUTPUT_VERSION} (this is loopswell ${VERSION})`,
      found: `${plan.generator?.outputVersion} (saved by loopswell ${plan.generator?.version})`,
      remedy: 'Bake with the version that saved the plan, or plan the sea again with this one.',
    });
  }
  const hash = planHash(plan);
  if (hash !== plan.hash) {
    throw refuse({
      path: 'hash',
      expected: hash,
      found: String(plan.hash),
      remedy: 'The file was altered after it was saved: plan the sea again.',
    });
  }
  return plan;
}
