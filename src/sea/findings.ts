import type { InputProblem } from '../errors.ts';

/** Steps from the top of a document to a value in it. */
export type DocumentPath = readonly (string | number)[];

/** A problem before its line and column are looked up. */
export interface Finding {
  readonly path: DocumentPath;
  /** Point at the key itself rather than at its value (unknown and duplicate keys). */
  readonly atKey?: boolean;
  readonly expected: string;
  readonly found: string;
  readonly remedy: string;
}

/** Line and column counted from 1; both 0 where there is no text. */
export interface Place {
  readonly line: number;
  readonly column: number;
}

/** A path as the user would write it: `systems[0].peakPeriod`. */
export function pathText(path: DocumentPath): string {
  return path
    .map((step, i) => (typeof step === 'number' ? `[${step}]` : i === 0 ? step : `.${step}`))
    .join('');
}

/** A value as messages show it: short, on one line, unmistakable. */
export function valueText(value: unknown): string {
  if (value === undefined) return 'nothing';
  if (value === null) return 'an empty value';
  if (Array.isArray(value)) return value.length === 0 ? 'an empty list' : `a list of ${value.length}`;
  if (typeof value === 'object') return 'a group of keys';
  if (typeof value === 'string') return value === '' ? 'an empty text' : `\`${shortened(value)}\``;
  return `\`${String(value)}\``;
}

const LONGEST_SHOWN = 60;

/** Text from a file is not to be trusted on a terminal: control characters become spaces, long text is cut. */
export function shortened(text: string): string {
  const cut = text.length <= LONGEST_SHOWN ? text : `${text.slice(0, LONGEST_SHOWN)}...`;
  return cut.replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}]/gu, ' ');
}

export function problemOf(finding: Finding, place: Place): InputProblem {
  const { expected, found, remedy } = finding;
  return {
    path: shortPathText(finding.path),
    line: place.line,
    column: place.column,
    expected,
    found,
    remedy,
  };
}

function shortPathText(path: DocumentPath): string {
  return pathText(path.map((step) => (typeof step === 'string' ? shortened(step) : step)));
}
