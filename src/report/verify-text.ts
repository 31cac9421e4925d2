import type { CheckResult, VerifyReport } from '../verify/report.ts';

/** A number for a table: four digits, without an exponent where it reads well without. */
function figure(value: number): string {
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (size >= 1e-3 && size < 1e6) return String(Number(value.toPrecision(4)));
  return value.toExponential(2);
}

/** What was measured against what is allowed, or that nothing was. */
function comparison({ measured, limit, unit, passed }: CheckResult): string {
  if (passed === null) return 'not applicable';
  if (limit === null) return '';
  if (measured === null) return `no number, at most ${figure(limit)} ${unit}`;
  return `${figure(measured)} of at most ${figure(limit)} ${unit}`;
}

const MARKS = { passed: 'ok', failed: 'FAIL', open: '-' } as const;

function mark({ passed }: CheckResult): string {
  if (passed === null) return MARKS.open;
  return passed ? MARKS.passed : MARKS.failed;
}

/**
 * A verification as lines of plain text: a row for each question, what is behind those that failed, and the sum.
 *
 * @param report of `verifyBake`
 * @returns lines without line ends; nothing in them depends on a terminal
 */
export function verifyReportLines(report: VerifyReport): readonly string[] {
  const { checks } = report;
  const cells = checks.map((check) => [
    mark(check),
    check.name,
    check.cascade ?? 'bake',
    check.question,
    comparison(check),
  ]);
  const widths = [0, 1, 2, 3].map((column) => Math.max(0, ...cells.map((row) => row[column].length)));
  const lines = [`${report.title}`, ''];
  cells.forEach((row, r) => {
    const padded = row.map((cell, column) => cell.padEnd(widths[column] ?? 0));
    lines.push(padded.join('  ').trimEnd());
    const check = checks[r];
    if (check.passed === true) return;
    const indent = ' '.repeat(widths[0] + 2);
    lines.push(`${indent}${check.reason}`);
    if (check.passed === false) lines.push(...check.details.map((detail) => `${indent}${detail}`));
  });
  const count = (passed: boolean | null): number => checks.filter((check) => check.passed === passed).length;
  const failed = [...new Set(checks.filter(({ passed }) => passed === false).map(({ name }) => name))];
  const sum = `${count(true)} passed, ${count(false)} failed, ${count(null)} not applicable`;
  lines.push('', failed.length === 0 ? `${sum}.` : `${sum}: ${failed.join(', ')}.`);
  return lines;
}
