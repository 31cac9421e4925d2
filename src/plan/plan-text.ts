import { InputError, type InputProblem } from '../errors.ts';
import { sha256 } from '../hash.ts';
import { OUTPUT_VERSION, VERSION } from '../version.ts';
import { canonicalJson, reviveInfinity } from './canonical-json.ts';
import type { Plan } from './plan.ts';
import { planHash } from './plan-bake.ts';
import { planFault } from './plan-shape.ts';
import { described } from './shape.ts';

/**
 * A plan as the text of a file that `parsePlan` reads back to the same plan. The last key holds a hash of the report,
 * which the plan's own hash leaves out: a manifest takes figures from it.
 */
export function planText(plan: Plan): string {
  return `${canonicalJson({ ...plan, reportHash: reportHash(plan) }, 2)}\n`;
}

function reportHash({ report }: Plan): string {
  return sha256(canonicalJson(report));
}

/** Whether a text looks like a saved plan rather than a sea file. */
export function isPlanText(text: string): boolean {
  return /^\s*\{\s*"format"\s*:\s*"loopswell-plan"/.test(text);
}

const ALTERED = 'The file was altered after it was saved: plan the sea again.';

/**
 * Reads a saved plan. It may come from a shared disk: its shape is checked whole, its names and sizes are those that a
 * sea can lead to, and its hashes have to fit.
 *
 * @param source file name for messages
 * @throws InputError where it is no plan, was altered, or belongs to a version that writes other bytes
 */
export function parsePlan(text: string, source: string): Plan {
  const refuse = (problem: Omit<InputProblem, 'line' | 'column'>): InputError =>
    new InputError(source, [{ line: 0, column: 0, ...problem }]);
  let document: unknown;
  try {
    document = JSON.parse(text, reviveInfinity);
  } catch (error) {
    throw refuse({
      path: '',
      expected: 'JSON of a saved plan',
      found: (error as Error).message,
      remedy: 'Save the plan again.',
    });
  }
  const { format, version, generator } = (document ?? {}) as Partial<Plan>;
  if (format !== 'loopswell-plan' || version !== 1) {
    throw refuse({
      path: 'format',
      expected: 'loopswell-plan version 1',
      found: `${described(format)} version ${described(version)}`,
      remedy: 'Give a file that `plan --save` wrote.',
    });
  }
  if (generator?.outputVersion !== OUTPUT_VERSION) {
    throw refuse({
      path: 'generator.outputVersion',
      expected: `${OUTPUT_VERSION} (this is loopswell ${VERSION})`,
      found: `${described(generator?.outputVersion)} (saved by loopswell ${described(generator?.version)})`,
      remedy: 'Bake with the version that saved the plan, or plan the sea again with this one.',
    });
  }
  const { reportHash: foundReportHash, ...plan } = document as Plan & { readonly reportHash?: unknown };
  const fault = planFault(plan);
  if (fault !== null) throw refuse({ ...fault, remedy: ALTERED });
  const hash = planHash(plan);
  if (hash !== plan.hash) {
    throw refuse({ path: 'hash', expected: hash, found: plan.hash, remedy: ALTERED });
  }
  if (foundReportHash !== reportHash(plan)) {
    throw refuse({
      path: 'reportHash',
      expected: reportHash(plan),
      found: described(foundReportHash),
      remedy: ALTERED,
    });
  }
  return plan;
}
