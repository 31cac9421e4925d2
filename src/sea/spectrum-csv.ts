import { type DataFile, dataError, numberedLines, plainNumber } from './data-file.ts';
import { shortened } from './findings.ts';
import { nearestOrPrefix } from './nearest.ts';
import { halfwayBandwidths, type SpectralRecord, spreadMoments } from './spectral-record.ts';

const COLUMNS = ['frequency', 'energy', 'direction', 'spread'] as const;
type Column = (typeof COLUMNS)[number];

/** What a table's columns may hold, in the unit of the file. */
const RANGES: Readonly<
  Record<Column, { readonly least: number; readonly most: number; readonly words: string }>
> = {
  frequency: { least: 1e-4, most: 10, words: 'a frequency from 0.0001 to 10 Hz' },
  energy: { least: 0, most: 1e4, words: 'an energy from 0 to 10000 m2/Hz' },
  direction: { least: -360, most: 360, words: 'a direction from -360 to 360 deg' },
  spread: { least: 3, most: 80, words: 'a spread from 3 to 80 deg' },
};

const FEWEST_ROWS = 3;
const MOST_ROWS = 2000;
const DEGREE = Math.PI / 180;

/** What a table without a column of directions or spreads takes for all its rows, rad. */
export interface CsvDirections {
  readonly fromRad: number | null;
  readonly spreadRad: number;
}

/** A table and which of its optional columns it has. */
export interface SpectrumTable {
  readonly record: SpectralRecord;
  readonly hasDirection: boolean;
  readonly hasSpread: boolean;
}

/**
 * A spectrum from a table of comma-separated values: `frequency` (Hz), `energy` (m^2/Hz) and, if measured, `direction`
 * (degrees clockwise from north, where waves come from) and `spread` (circular standard deviation, degrees), named in
 * any order in the first line. Lines that begin with # are comments. Rows without energy may leave directions empty.
 *
 * @throws InputError at the first line that is not so
 */
export function spectrumTable(file: DataFile, given: CsvDirections): SpectrumTable {
  const lines = numberedLines(file.text).filter(({ text }) => !text.trimStart().startsWith('#'));
  const columns = tableColumns(file, lines[0]);
  const rows = lines.slice(1).map((line) => tableRow(file, columns, line));
  if (rows.length < FEWEST_ROWS || rows.length > MOST_ROWS) {
    throw dataError(file, {
      line: lines.at(-1)?.line ?? 1,
      expected: `${FEWEST_ROWS} to ${MOST_ROWS} rows of frequencies`,
      found: `${rows.length}`,
      remedy: 'Check that the table is whole.',
    });
  }
  rows.forEach(({ frequency, line }, i) => {
    if (i === 0 || frequency > rows[i - 1].frequency) return;
    throw dataError(file, {
      line,
      expected: `a frequency above that of the row before, ${rows[i - 1].frequency} Hz`,
      found: `${frequency} Hz`,
      remedy: 'Sort the rows by frequency, each once.',
    });
  });
  const hasDirection = columns.includes('direction');
  const hasSpread = columns.includes('spread');
  const frequencyHz = rows.map(({ frequency }) => frequency);
  const directions = rows.map(({ direction, spread }) => {
    const fromRad = hasDirection ? radians(direction) : given.fromRad;
    const spreadRad = hasSpread ? radians(spread) : given.spreadRad;
    return fromRad === null || spreadRad === null ? null : spreadMoments(fromRad, spreadRad);
  });
  const densityM2PerHz = rows.map(({ energy }) => energy);
  const record = { frequencyHz, bandwidthHz: halfwayBandwidths(frequencyHz), densityM2PerHz, directions };
  if (densityM2PerHz.every((S) => S === 0)) throw withoutEnergy(file, lines[0].line);
  return { record, hasDirection, hasSpread };
}

function radians(degrees: number | null): number | null {
  return degrees === null ? null : degrees * DEGREE;
}

/** The error of a spectrum in which nothing moves. */
export function withoutEnergy(file: DataFile, line: number): Error {
  return dataError(file, {
    line,
    expected: 'energy at some frequency',
    found: 'none at any',
    remedy: 'Choose another record: this one is flat water or a failed instrument.',
  });
}

interface NumberedLine {
  readonly line: number;
  readonly text: string;
}

function tableColumns(file: DataFile, header: NumberedLine | undefined): readonly Column[] {
  const expected =
    'a first line that names the columns frequency, energy and, if measured, direction and spread';
  const remedy = 'Begin the table with for example `frequency,energy,direction,spread`.';
  if (header === undefined) throw dataError(file, { line: 1, expected, found: 'an empty file', remedy });
  const { line } = header;
  const names = cellsOf(header.text).map((name) => name.toLowerCase());
  for (const name of names) {
    if ((COLUMNS as readonly string[]).includes(name)) continue;
    if (plainNumber(name) !== null) throw dataError(file, { line, expected, found: 'numbers', remedy });
    const nearest = nearestOrPrefix(name, COLUMNS);
    throw dataError(file, {
      line,
      expected: `one of the columns ${COLUMNS.join(', ')}`,
      found: `the column \`${shortened(name)}\``,
      remedy: nearest === null ? 'Remove the column.' : `Did you mean \`${nearest}\`?`,
    });
  }
  if (new Set(names).size < names.length)
    throw dataError(file, { line, expected: 'each column once', found: 'one twice', remedy: 'Remove it.' });
  for (const needed of needs(names)) {
    if (names.includes(needed)) continue;
    throw dataError(file, { line, expected: `a column \`${needed}\``, found: 'none', remedy });
  }
  return names as Column[];
}

/** A spread is about a direction. */
function needs(names: readonly string[]): Column[] {
  return names.includes('spread') ? ['frequency', 'energy', 'direction'] : ['frequency', 'energy'];
}

interface TableRow {
  readonly line: number;
  readonly frequency: number;
  readonly energy: number;
  readonly direction: number | null;
  readonly spread: number | null;
}

function tableRow(file: DataFile, columns: readonly Column[], { line, text }: NumberedLine): TableRow {
  const cells = cellsOf(text);
  if (cells.length !== columns.length) {
    throw dataError(file, {
      line,
      expected: `${columns.length} values, one for each column`,
      found: `${cells.length}`,
      remedy: 'Check that the line is whole.',
    });
  }
  const energyCell = cells[columns.indexOf('energy')];
  const isFlat = plainNumber(energyCell) === 0;
  const value = (column: Column): number | null => {
    const at = columns.indexOf(column);
    if (at < 0) return null;
    const { least, most, words } = RANGES[column];
    const word = cells[at];
    const isOptional = isFlat && (column === 'direction' || column === 'spread');
    if (word === '' && isOptional) return null;
    const number = plainNumber(word);
    if (number !== null && number >= least && number <= most) return number;
    throw dataError(file, {
      line,
      column: columnOf(text, at),
      expected: words,
      found: word === '' ? 'a missing value' : `\`${shortened(word)}\``,
      remedy: 'Correct or remove the row: missing values are not filled in.',
    });
  };
  return {
    line,
    frequency: value('frequency') as number,
    energy: value('energy') as number,
    direction: value('direction'),
    spread: value('spread'),
  };
}

function cellsOf(text: string): string[] {
  return text.split(',').map((cell) => cell.trim());
}

/** Column of the text, counted from 1, at which a cell begins. */
function columnOf(text: string, cell: number): number {
  const cells = text.split(',');
  const start = cells.slice(0, cell).reduce((sum, own) => sum + own.length + 1, 0);
  return start + cells[cell].length - cells[cell].trimStart().length + 1;
}
