import type { z } from 'zod';
import { type DocumentPath, type Finding, shortened, valueText } from './findings.ts';
import { nearestOrPrefix } from './nearest.ts';

type Issue = z.core.$ZodIssue;

/** What a schema found wrong with a document, in our words. */
export function schemaFindings(issues: readonly Issue[], document: unknown): Finding[] {
  return issues.flatMap((issue) => issueFindings(issue, [], document));
}

function issueFindings(issue: Issue, base: DocumentPath, document: unknown): Finding[] {
  const path = [...base, ...(issue.path as (string | number)[])];
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((key) => unknownKey([...path, key], issue.message));
  }
  if (issue.code === 'invalid_union') {
    const branch = chosenBranch(issue.errors);
    if (branch) return branch.flatMap((inner) => issueFindings(inner, path, document));
  }
  const value = valueAt(document, path);
  const words = wordsOf(issue);
  const nearest = typeof value === 'string' ? nearestOrPrefix(value, words) : null;
  const [expected, advice] = issue.message.includes('\n')
    ? issue.message.split('\n', 2)
    : [`one of ${words.join(', ')}`, 'Choose one of these.'];
  const remedy =
    nearest !== null
      ? `Did you mean \`${nearest}\`?`
      : value === undefined
        ? `Add \`${String(path.at(-1) ?? '')}\`. ${advice}`
        : advice;
  return [{ path, expected, found: valueText(value), remedy }];
}

function unknownKey(path: DocumentPath, keys: string): Finding {
  const key = String(path.at(-1));
  const nearest = nearestOrPrefix(key, keys.split(', '));
  return {
    path,
    atKey: true,
    expected: `one of the keys ${keys}`,
    found: `the key \`${shortened(key)}\``,
    remedy: nearest === null ? 'Remove it.' : `Did you mean \`${nearest}\`?`,
  };
}

/** Of the alternatives of a union, the one whose kind of value was written, if that is plain. */
function chosenBranch(branches: readonly (readonly Issue[])[]): readonly Issue[] | undefined {
  const fitting = branches.filter((issues) =>
    issues.every((issue) => issue.path.length > 0 || issue.code === 'unrecognized_keys'),
  );
  return fitting.length === 1 ? fitting[0] : undefined;
}

/** The words an issue would have accepted. */
function wordsOf(issue: Issue): string[] {
  if (issue.code === 'invalid_value') return issue.values.map(String);
  if (issue.code !== 'invalid_union') return [];
  const options = 'options' in issue && Array.isArray(issue.options) ? issue.options.map(String) : [];
  return [
    ...options,
    ...issue.errors.flat().flatMap((inner) => (inner.path.length === 0 ? wordsOf(inner) : [])),
  ];
}

/** The value at a path; undefined where there is none. Own properties only. */
export function valueAt(document: unknown, path: DocumentPath): unknown {
  let value = document;
  for (const step of path) {
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, step)) return undefined;
    value = (value as Record<string | number, unknown>)[step];
  }
  return value;
}
