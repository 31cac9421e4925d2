import { describe, expect, it } from 'vitest';
import { fieldLines, indented, numbers, tableLines, words } from '../../../src/cli/table.ts';

describe('tableLines', () => {
  it('sets words left and numbers right under headings of several lines', () => {
    const lines = tableLines(
      [words('', 'tile'), numbers('patch', 'length'), words('note')],
      [
        ['c0', '1241 m', ''],
        ['c1', '9 m', 'fine'],
      ],
    );
    expect(lines).toEqual([
      '       patch  note', //
      'tile  length',
      'c0    1241 m',
      'c1       9 m  fine',
    ]);
  });

  it('draws columns nearer where they would be wider than a report', () => {
    const columns = Array.from({ length: 10 }, () => words('h'));
    const width = (cell: string): number => tableLines(columns, [columns.map(() => cell)])[1].length;
    expect(width('x'.repeat(8))).toBe(98);
    expect(width('x'.repeat(9))).toBe(99);
  });
});

describe('fieldLines', () => {
  it('hangs long values within 100 columns, however deep they will stand', () => {
    const value = 'word '.repeat(60).trim();
    for (const depth of [1, 2, 3]) {
      const lines = fieldLines(
        [
          ['name', value],
          ['a', 'b'],
        ],
        depth,
      );
      const widest = Math.max(...lines.map((line) => line.length)) + 2 * depth;
      expect(widest).toBeLessThanOrEqual(100);
      expect(widest).toBeGreaterThan(90);
      expect(lines.at(-1)).toBe('a     b');
      expect(lines[1]).toMatch(/^ {6}word/);
    }
  });
});

describe('indented', () => {
  it('leaves empty lines empty', () => {
    expect(indented(['a', '', 'b'])).toEqual(['  a', '', '  b']);
  });
});
