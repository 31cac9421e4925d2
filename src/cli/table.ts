import { WIDTH, wrapped } from './wording.ts';

/** A column: its heading, of one or more lines, and the side its cells keep to. */
export interface Column {
  readonly heading: readonly string[];
  readonly align: 'left' | 'right';
}

const GAP = '  ';
const INDENT = '  ';

/** A column of words. */
export function words(...heading: string[]): Column {
  return { heading, align: 'left' };
}

/** A column of numbers. */
export function numbers(...heading: string[]): Column {
  return { heading, align: 'right' };
}

/** A table as lines: headings, then one line a row; columns as wide as they need to be, nearer where room is scarce. */
export function tableLines(columns: readonly Column[], rows: readonly (readonly string[])[]): string[] {
  const headingHeight = Math.max(...columns.map(({ heading }) => heading.length));
  const headings = Array.from({ length: headingHeight }, (_, line) =>
    columns.map(({ heading }) => heading[line] ?? ''),
  );
  const all = [...headings, ...rows];
  const widths = columns.map((_, c) => Math.max(...all.map((row) => row[c].length)));
  const width = widths.reduce((sum, own) => sum + GAP.length + own, 0);
  const gap = width > WIDTH ? ' ' : GAP;
  return all.map((row) =>
    row
      .map((cell, c) => (columns[c].align === 'left' ? cell.padEnd(widths[c]) : cell.padStart(widths[c])))
      .join(gap)
      .trimEnd(),
  );
}

/** A named value. */
export type Field = readonly [name: string, value: string];

/** Named values, one below the other; long values are wrapped and hang. `depth` is how often they will be indented. */
export function fieldLines(fields: readonly Field[], depth = 1): string[] {
  const width = Math.max(...fields.map(([name]) => name.length));
  return fields.flatMap(([name, value]) =>
    wrapped(value, WIDTH - depth * INDENT.length - width - GAP.length).map(
      (line, i) => `${(i === 0 ? name : '').padEnd(width)}${GAP}${line}`,
    ),
  );
}

/** Lines moved in from the margin. */
export function indented(lines: readonly string[]): string[] {
  return lines.map((line) => (line === '' ? '' : INDENT + line));
}

/** Sentences as a paragraph that fits an indented report. */
export function paragraph(text: string): string[] {
  return wrapped(text, WIDTH - INDENT.length);
}
